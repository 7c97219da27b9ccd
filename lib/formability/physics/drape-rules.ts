/** First estimates for a sheet draped over a male template, as shares of the gauge; areas in one unit, lengths in another. */

/** A straight skirt from the top edge to the clamp, before suction, over a gap and a height: g / √(g² + H²). Derived. */
export function drapedShare(gap: number, height: number): number {
  if (!(gap > 0) || !(height >= 0))
    throw new RangeError(`gap ${gap} and height ${height}: give a gap above 0 and a height from 0`);
  return gap / Math.hypot(gap, height);
}

/**
 * Walls and bed share what the chilled top leaves over: (A_clamp − A_top) / (A_formed − A_top). The engineering bound of
 * male forming; real sheets slip a little on the top. Derived.
 */
export function skirtShare(clampArea: number, topArea: number, formedArea: number): number {
  if (!(topArea >= 0 && topArea < clampArea && clampArea <= formedArea))
    throw new RangeError(
      `areas of clamp ${clampArea}, top ${topArea}, formed ${formedArea}: the top must be smaller than the clamp, and that no larger than what is formed`,
    );
  return (clampArea - topArea) / (formedArea - topArea);
}
