import type { InfillPattern } from '../recipe';

/** Line length per layer area of a gyroid is 2.456 / period, so its period is this many line widths per unit density. */
const GYROID = 2.456;

/**
 * Free span between infill lines, mm. Line distance is width / density × 1 (lines), 2 (grid), 3 (triangles), as common
 * open slicers define it; lines leave a strip, grid a square, triangles an inscribed circle, a gyroid a pore of half its
 * period. @param density share of 1; 0 leaves everything free (Infinity)
 */
export function infillSpanMm(pattern: InfillPattern, lineMm: number, density: number): number {
  if (density <= 0) return Infinity;
  if (density >= 1) return 0;
  const pitch = lineMm / density;
  switch (pattern) {
    case 'lines':
      return pitch - lineMm;
    case 'grid':
      return 2 * pitch;
    case 'triangles':
      return 2 * pitch;
    case 'gyroid':
      return (GYROID * pitch) / 2;
  }
}

/** Density at which the span is `spanMm`: the other way round. */
export function densityForSpan(pattern: InfillPattern, lineMm: number, spanMm: number): number {
  const perDensity = pattern === 'lines' ? 1 : pattern === 'gyroid' ? GYROID / 2 : 2;
  return (perDensity * lineMm) / (pattern === 'lines' ? spanMm + lineMm : spanMm);
}
