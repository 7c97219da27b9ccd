export type Backoff = { firstS: number; mostS: number };

/**
 * Seconds until the next try: doubling from `firstS` up to `mostS`, each time shortened by up to half at
 * random, so that what failed together does not come back together.
 */
export function backoffS(attempt: number, { firstS, mostS }: Backoff, random = Math.random()): number {
  const full = Math.min(mostS, firstS * 2 ** Math.min(30, Math.max(0, attempt - 1)));
  return full * (0.5 + random / 2);
}
