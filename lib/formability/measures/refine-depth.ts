import { CONNECTED, connectAir, gapFloor } from '../dexel/air';
import { affordWindow } from '../dexel/afford-window';
import { buildColumns, type Columns } from '../dexel/columns';
import type { Grid } from '../dexel/grid';
import { rasterise } from '../dexel/raster';
import type { Mesh } from '../mesh/mesh';
import type { UndercutRegion } from '../report';
import { spreadDepth } from './find-undercuts';

/** A depth of fewer cells than this is measured again on a finer grid. */
const FEW_CELLS = 3;
const FINER = 16;
const MOST_REFINED = 16;
/** So are a few deeper ones, less finely: a cell more or less is some per cent of them. */
const SOME_CELLS = 30;
const LESS_FINE = 4;
const MOST_DEEPER = 4;

/** Facets whose plan box meets a square window. */
export function facetsInWindow(mesh: Mesh, x: number, y: number, reach: number): Uint32Array {
  const { index, position: p } = mesh;
  const found: number[] = [];
  for (let t = 0, c = 0; c < index.length; t++, c += 3) {
    const a = index[c] * 3;
    const b = index[c + 1] * 3;
    const d = index[c + 2] * 3;
    if (Math.max(p[a], p[b], p[d]) < x - reach || Math.min(p[a], p[b], p[d]) > x + reach) continue;
    if (
      Math.max(p[a + 1], p[b + 1], p[d + 1]) < y - reach ||
      Math.min(p[a + 1], p[b + 1], p[d + 1]) > y + reach
    ) {
      continue;
    }
    found.push(t);
  }
  return Uint32Array.from(found);
}

/** The columns of a small square window, `cells` to a side, fewer over a heap of facets. */
export function windowColumns(
  mesh: Mesh,
  x: number,
  y: number,
  reach: number,
  cells: number,
  ofShell: Uint32Array,
): Columns {
  const wanted: Grid = { cell: (2 * reach) / cells, nx: cells, ny: cells, x0: x - reach, y0: y - reach };
  const facets = facetsInWindow(mesh, x, y, reach);
  const grid = affordWindow(mesh, facets, wanted);
  return buildColumns(rasterise(mesh, grid, 2, facets), grid, ofShell);
}

/**
 * Measures undercuts of few cells again where they are deepest: the whole-part grid rounds a depth up to a cell, which
 * on a large part is more than the 0.2 mm that tells texture from an undercut. Changes the regions in place.
 */
export function refineDepth(mesh: Mesh, regions: UndercutRegion[], cell: number, ofShell: Uint32Array): void {
  const isShallow = ({ maxDepthMm }: UndercutRegion) => maxDepthMm <= FEW_CELLS * cell;
  const deeper = regions.filter((region) => !isShallow(region) && region.maxDepthMm <= SOME_CELLS * cell);
  const shallow = regions.filter(isShallow);
  for (const region of [...deeper.slice(0, MOST_DEEPER), ...shallow.slice(0, MOST_REFINED)]) {
    const reach = region.maxDepthMm + 2 * cell;
    const cells = Math.ceil((2 * reach * (isShallow(region) ? FINER : LESS_FINE)) / cell);
    const columns = windowColumns(mesh, region.at[0], region.at[1], reach, cells, ofShell);
    const air = connectAir(columns, 'unknown');
    const depth = spreadDepth(columns, air, 'unknown');
    let deepest = 0;
    for (let c = 0; c < columns.count.length; c++) {
      for (let k = 0, s = columns.start[c]; k < columns.count[c]; k++, s += 2) {
        const overlaps = columns.z[s] > region.zMm[0] && gapFloor(columns, c, s) < region.zMm[1];
        if (overlaps && air.state[s] === CONNECTED && depth[s] < Infinity)
          deepest = Math.max(deepest, depth[s]);
      }
    }
    if (deepest > 0) region.maxDepthMm = Math.min(deepest, region.maxDepthMm);
  }
  regions.sort((a, b) => b.maxDepthMm - a.maxDepthMm);
}
