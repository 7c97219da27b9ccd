/**
 * What makes an address other bytes. A store's signed address changes its signature at every answer while its path
 * names the same bytes, so the query of such an address does not count.
 */
export function addressKey(url: string): string {
  return /[?&]x-amz-signature=/i.test(url) ? url.slice(0, url.indexOf('?')) : url;
}

/** Two revisions side by side are the most that a page compares; older ones are fetched again. */
const MOST_KEPT = 3;

/** Loads what an address names once, keeps the last few, and forgets what could not be had. */
export function loadOnce<T>(kept: Map<string, Promise<T>>, url: string, load: () => Promise<T>): Promise<T> {
  const key = addressKey(url);
  const known = kept.get(key);
  if (known) return known;
  const made = load();
  kept.set(key, made);
  made.catch(() => kept.delete(key));
  if (kept.size > MOST_KEPT) kept.delete(kept.keys().next().value!);
  return made;
}

/** What a worker answers: the thing itself, or why there is none. */
export type WorkerAnswer<T> = { made: T } | { problem: string };

/**
 * Has a worker of its own answer one request, and ends it.
 * @param start makes the worker; the bundler wants its address written out there
 * @param silent says that the worker did not run at all
 */
export function inWorker<T>(start: () => Worker, request: unknown, silent: string): Promise<T> {
  return new Promise((resolve, reject) => {
    const worker = start();
    const done = (act: () => void) => {
      worker.terminate();
      act();
    };
    worker.onmessage = ({ data }: MessageEvent<WorkerAnswer<T>>) =>
      done(() => ('made' in data ? resolve(data.made) : reject(new Error(data.problem))));
    worker.onerror = () => done(() => reject(new Error(silent)));
    worker.postMessage(request);
  });
}
