/** Sine and cosine helpers in degrees, and the thresholds of the engine contract that several measures share. */
export const DEG = 180 / Math.PI;

/** |draft| up to this is a vertical wall; below its negative an overhang. */
export const VERTICAL_DEG = 0.25;
export const SIN_VERTICAL = Math.sin(VERTICAL_DEG / DEG);
/** Draft from this on is a top, not a wall. */
export const TOP_DEG = 85;

export function draftDeg(nz: number): number {
  return Math.asin(nz > 1 ? 1 : nz < -1 ? -1 : nz) * DEG;
}
