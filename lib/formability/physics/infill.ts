import type { InfillPattern } from '../recipe';

/** Line length per layer area of a gyroid is 2.456 / period, so its period is this many line widths per unit density. */
const GYROID = 2.456;

/**
 * Size of a cell of the infill, mm: distance of lines, side of the grid's squares, side of the triangles, period of a
 * gyroid. Line distance is width / density × 1 (lines), 2 (grid), 3 (triangles), as common open slicers define it.
 * @param density share of 1; 0 leaves everything free (Infinity) @throws RangeError for a line or share that cannot be
 */
export function infillCellMm(pattern: InfillPattern, lineMm: number, density: number): number {
  if (!(lineMm > 0) || !(density <= 1))
    throw new RangeError(
      `infill lines of ${lineMm} mm at a share of ${density}: give a line above 0 mm and a share up to 1`,
    );
  if (density <= 0) return Infinity;
  const pitch = lineMm / density;
  switch (pattern) {
    case 'lines':
      return pitch;
    case 'grid':
      return 2 * pitch;
    case 'triangles':
      // Rows 3 w / ρ apart are the height of the triangles.
      return (2 * 3 * pitch) / Math.sqrt(3);
    case 'gyroid':
      return GYROID * pitch;
  }
}

/**
 * Free span between infill lines, mm: lines leave a strip, grid a square, triangles an inscribed circle (2/3 of their
 * height), a gyroid a pore of half its period.
 */
export function infillSpanMm(pattern: InfillPattern, lineMm: number, density: number): number {
  const cell = infillCellMm(pattern, lineMm, density);
  if (density >= 1) return 0;
  switch (pattern) {
    case 'lines':
      return cell - lineMm;
    case 'grid':
      return cell;
    case 'triangles':
      return cell / Math.sqrt(3);
    case 'gyroid':
      return cell / 2;
  }
}

/** Density at which the span is `spanMm`: the other way round. */
export function densityForSpan(pattern: InfillPattern, lineMm: number, spanMm: number): number {
  const perDensity = pattern === 'lines' ? 1 : pattern === 'gyroid' ? GYROID / 2 : 2;
  return (perDensity * lineMm) / (pattern === 'lines' ? spanMm + lineMm : spanMm);
}
