/**
 * Flatter than this a face is a floor or a top, not a wall: no draft is asked of it, and the draft map leaves it plain
 * so that the walls are what is seen. Our own convention.
 */
export const FLAT_FROM_DEG = 60;

/**
 * The draft map runs from 0° to this many degrees; flatter faces take the last colour.
 * Three limits long, so that the limit stands at a third of the scale; 15° at least.
 */
export function draftScaleMaxDeg(limitDeg: number): number {
  return Math.max(15, Math.ceil((limitDeg * 3) / 5) * 5);
}

/** Place of a draft on the scale, 0..1; below 0° and beyond the end it stays at the ends. */
export function draftScaleAt(draftDeg: number, maxDeg: number): number {
  return Math.min(1, Math.max(0, draftDeg / maxDeg));
}
