import { ApiError } from '../api-client';
import type { KeyValueStore } from './key-value-store';
import type { NoteDocument, NotePin } from './note-draft';

/** A note on its way. It stays on this device until the server has answered for it. */
export interface OutgoingNote {
  clientKey: string;
  personId: string;
  workspaceId: string;
  revisionId: string;
  /** The thread that is answered; null opens a new one. */
  threadId: string | null;
  findingId: string | null;
  pin: NotePin | null;
  mustSettle: boolean;
  body: NoteDocument;
  /** Where the draft goes back to when the note is refused. */
  draftKey: string;
  writtenAt: number;
}

/** `stuck`: the server answered, and could not take it. It is tried again, after those that follow it. */
export type OutgoingState = 'sending' | 'waiting' | 'stuck' | 'signed-out';
export type OutgoingEntry = OutgoingNote & { state: OutgoingState };

export interface OutboxParts {
  store: KeyValueStore;
  send: (note: OutgoingNote) => Promise<void>;
  onSent: (note: OutgoingNote) => void | Promise<void>;
  /** The server will never take it as it is: the text goes back to its writer with the reason. */
  onRefused: (note: OutgoingNote, error: ApiError) => void | Promise<void>;
  /** Its writer no longer waits for it: the text goes back to where it was written. */
  onTakenBack: (note: OutgoingNote) => void | Promise<void>;
}

/** Worth sending again as it is: nothing answered, the server is unwell or busy, or still works on it. */
export function isPassing(error: unknown): boolean {
  if (!(error instanceof ApiError)) return true;
  return (
    error.status === 0 || error.status === 429 || error.status >= 500 || error.reason === 'still-running'
  );
}

/** How often the server may fail on one note before its writer gets it back. */
export const maxFailures = 5;

/** The server failed on this very note and may well take the next. 502 to 504 speak of the whole server. */
const isOwnFailure = (error: unknown): error is ApiError =>
  error instanceof ApiError && error.status >= 500 && ![502, 503, 504].includes(error.status);

/** Sends notes in the order they were written, each once: the server knows a repeated `clientKey`. */
export class NoteOutbox {
  private entries: readonly OutgoingEntry[] = [];
  private readonly listeners = new Set<() => void>();
  private running: Promise<void> | null = null;
  private again = false;
  private readonly failures = new Map<string, number>();

  constructor(
    private readonly parts: OutboxParts,
    private readonly personId: string,
  ) {}

  snapshot = (): readonly OutgoingEntry[] => this.entries;

  subscribe = (listener: () => void): (() => void) => {
    this.listeners.add(listener);
    return () => {
      this.listeners.delete(listener);
    };
  };

  /** Takes up what an earlier visit left; notes of somebody else who used this browser stay untouched. */
  async open(): Promise<void> {
    const kept = await this.parts.store.entries<OutgoingNote>();
    const known = new Set(this.entries.map((entry) => entry.clientKey));
    const mine = kept
      .map(([, note]) => note)
      .filter((note) => note.personId === this.personId && !known.has(note.clientKey))
      .map((note) => ({ ...note, state: 'waiting' as const }));
    this.set([...mine, ...this.entries].sort((a, b) => a.writtenAt - b.writtenAt));
    await this.flush();
  }

  async add(note: OutgoingNote): Promise<void> {
    await this.parts.store.set(note.clientKey, note);
    this.set([...this.entries.filter((e) => e.clientKey !== note.clientKey), { ...note, state: 'sending' }]);
    await this.flush();
  }

  /** Sends what waits; who asks while that runs shares the run, and one more follows for late comers. */
  flush(): Promise<void> {
    this.again = true;
    this.running ??= this.run().finally(() => {
      this.running = null;
      return this.again ? this.flush() : undefined;
    });
    return this.running;
  }

  private async run(): Promise<void> {
    this.again = false;
    let next: OutgoingEntry | undefined;
    const tried = new Set<string>();
    while ((next = this.entries.find((entry) => !tried.has(entry.clientKey)))) {
      tried.add(next.clientKey);
      this.mark(next.clientKey, 'sending');
      try {
        await this.parts.send(next);
        await this.parts.onSent(next);
      } catch (error) {
        if (error instanceof ApiError && error.status === 401) {
          this.markAll('signed-out');
          return;
        }
        if (isOwnFailure(error)) {
          const failures = (this.failures.get(next.clientKey) ?? 0) + 1;
          this.failures.set(next.clientKey, failures);
          if (failures < maxFailures) {
            this.mark(next.clientKey, 'stuck');
            continue;
          }
        } else if (isPassing(error)) {
          this.markAll('waiting');
          return;
        }
        await this.parts.onRefused(next, error as ApiError);
      }
      await this.forget(next.clientKey);
    }
  }

  /** Gives a note that the server keeps failing on back to its writer, before the tries are used up. */
  async takeBack(clientKey: string): Promise<void> {
    const entry = this.entries.find((one) => one.clientKey === clientKey);
    if (entry?.state !== 'stuck') return;
    // Out of the line at once, so that no run picks it up; off the device only when its text is elsewhere.
    this.set(this.entries.filter((one) => one.clientKey !== clientKey));
    await this.parts.onTakenBack(entry);
    await this.forget(clientKey);
  }

  private async forget(clientKey: string): Promise<void> {
    this.failures.delete(clientKey);
    await this.parts.store.delete(clientKey);
    this.set(this.entries.filter((entry) => entry.clientKey !== clientKey));
  }

  private mark(clientKey: string, state: OutgoingState): void {
    this.set(this.entries.map((entry) => (entry.clientKey === clientKey ? { ...entry, state } : entry)));
  }

  private markAll(state: OutgoingState): void {
    this.set(this.entries.map((entry) => ({ ...entry, state })));
  }

  private set(entries: readonly OutgoingEntry[]): void {
    this.entries = entries;
    this.listeners.forEach((listener) => listener());
  }
}
