import type { Standing } from './schemas';

type Stage = { ordinal: number; state: Standing };

/** How far a revision that is still alive has come; those that are closed for good have no place here. */
const advance: Partial<Record<Standing, number>> = { released: 4, approved: 3, in_review: 2, returned: 1 };

/** States in which a newer revision is worth a word beside the template's standing. */
export const onItsWay: readonly Standing[] = ['in_review', 'returned'];

/**
 * The revision that a template stands on: the most advanced living one. Where none lives, the newest that was
 * not taken back; a withdrawn one only where there is nothing else. Null before the first is posted.
 */
export function standingRevision<R extends Stage>(revisions: R[]): R | null {
  const newestFirst = [...revisions].sort((a, b) => b.ordinal - a.ordinal);
  const rank = ({ state }: Stage) => advance[state] ?? 0;
  const best = newestFirst.reduce<R | null>(
    (found, row) => (rank(row) > (found ? rank(found) : 0) ? row : found),
    null,
  );
  return best ?? newestFirst.find(({ state }) => state !== 'withdrawn') ?? newestFirst[0] ?? null;
}
