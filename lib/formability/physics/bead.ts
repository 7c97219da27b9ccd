import { inRange } from './in-range';

/** Section of a printed bead, mm²: line × layer, as slicers reckon it. */
export function beadAreaMm2(lineMm: number, layerMm: number): number {
  return inRange('line (mm)', lineMm, 0) * inRange('layer (mm)', layerMm, 0);
}

/** With rounded ends, h (w − h) + π h² / 4: what a free bead carries, so the same material takes longer. */
export function roundedBeadAreaMm2(lineMm: number, layerMm: number): number {
  inRange('layer (mm)', layerMm, 0, lineMm);
  return layerMm * (lineMm - layerMm) + (Math.PI / 4) * layerMm ** 2;
}
