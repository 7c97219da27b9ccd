const letters = 'ABCDEFGHJKLMNPRTUVWY';

/**
 * Revision letter of the n-th posted revision, n from 0. I, O, Q, S, X and Z are skipped; after Y comes AA
 * (ASME Y14.35M, as cited in trade pages).
 */
export function revisionLetter(n: number): string {
  if (!Number.isInteger(n) || n < 0) throw new RangeError('n must be a whole number from 0');
  const base = letters.length;
  let text = '';
  for (let rest = n; rest >= 0; rest = Math.floor(rest / base) - 1) text = letters[rest % base] + text;
  return text;
}
