/**
 * Will a sheet fold on its way to the foot of a template? A ring of sheet at a distance outside the footprint must shorten
 * from P + 2π s to P; rubber drawn λ-fold along the meridian shortens freely to λ^(−1/2) across. Derived from A. C. Pipkin,
 * IMA J. Appl. Math. 36 (1986) 85 (natural width), which is quoted from memory.
 */
export interface WebCriterion {
  /** Hoop stretch that the ring is forced to. */
  hoopStretch: number;
  meridianStretch: number;
  /** Hoop stretch below which it folds. */
  limit: number;
  webs: boolean;
}

/** @param perimeterMm of the (convex) footprint @param ringMm distance of the ring outside it @param meridian stretch, from 1 up */
export function webCriterion(perimeterMm: number, ringMm: number, meridian: number): WebCriterion {
  if (!(perimeterMm > 0) || !(ringMm >= 0) || !(meridian >= 1))
    throw new RangeError(
      `perimeter ${perimeterMm} mm, ring ${ringMm} mm, stretch ${meridian}: give a perimeter above 0, a ring from 0 and a stretch from 1`,
    );
  const hoopStretch = perimeterMm / (perimeterMm + 2 * Math.PI * ringMm);
  const limit = meridian ** -0.5;
  return { hoopStretch, meridianStretch: meridian, limit, webs: hoopStretch < limit };
}

/**
 * The ring that ends at the foot of an upright wall: over a gap to where the sheet is held, drawn evenly over gap and
 * height, it starts g H / (g + H) from the wall and is drawn (g + H) / g-fold.
 */
export function ringToFoot(gapMm: number, heightMm: number): { ringMm: number; meridian: number } {
  if (!(gapMm > 0) || !(heightMm >= 0))
    throw new RangeError(`gap ${gapMm} mm and height ${heightMm} mm: give a gap above 0 and a height from 0`);
  return { ringMm: (gapMm * heightMm) / (gapMm + heightMm), meridian: (gapMm + heightMm) / gapMm };
}
