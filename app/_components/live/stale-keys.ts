/** Events of one transaction come together; a key is fetched once for all of them. */
const gatherMs = 30;
/** How soon a key that is being fetched is looked at again. */
const againMs = 150;

type Key = readonly unknown[];

export interface StaleKeysParts {
  /** Whether a fetch of this key is on its way; what it brings may be older than the event. */
  isFetching: (key: Key) => boolean;
  invalidate: (key: Key) => void;
  later: (run: () => void, ms: number) => void;
}

/**
 * Keys that live events made stale. A fetch that is on its way is never cut short for a newer event (in a lively
 * room none would ever end); the key is fetched once more when it has ended.
 */
export class StaleKeys {
  private readonly waiting = new Map<string, Key>();
  private scheduled = false;

  constructor(private readonly parts: StaleKeysParts) {}

  add(keys: readonly Key[]): void {
    for (const key of keys) this.waiting.set(JSON.stringify(key), key);
    this.schedule(gatherMs);
  }

  private schedule(ms: number): void {
    if (this.scheduled || this.waiting.size === 0) return;
    this.scheduled = true;
    this.parts.later(() => {
      this.scheduled = false;
      for (const [name, key] of this.waiting) {
        if (this.parts.isFetching(key)) continue;
        this.waiting.delete(name);
        this.parts.invalidate(key);
      }
      this.schedule(againMs);
    }, ms);
  }
}
