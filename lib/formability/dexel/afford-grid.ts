import type { Mesh } from '../mesh/mesh';
import type { Grid } from './grid';

/** Ceilings on what one raster may hold: about 300 MB of hits and 150 MB of spans. */
const MOST_HITS = 24e6;
const MOST_SPANS = 12e6;

/**
 * Coarsens a grid until the mesh's crossings fit the memory that a report may take. Ordinary templates keep
 * theirs; a file of stacked sheets does not make the engine ask for more than it should.
 */
export function affordGrid(mesh: Mesh, grid: Grid): Grid {
  const { index, position: p } = mesh;
  let area = 0;
  let rise = 0;
  for (let c = 0; c < index.length; c += 3) {
    const a = index[c] * 3;
    const b = index[c + 1] * 3;
    const d = index[c + 2] * 3;
    const ya = p[a + 1];
    const yb = p[b + 1];
    const yd = p[d + 1];
    area += Math.abs((p[b] - p[a]) * (yd - ya) - (yb - ya) * (p[d] - p[a])) / 2;
    const high = ya > yb ? (ya > yd ? ya : yd) : yb > yd ? yb : yd;
    const low = ya < yb ? (ya < yd ? ya : yd) : yb < yd ? yb : yd;
    rise += high - low;
  }
  let { cell, nx, ny } = grid;
  const coarseEnough = () => area <= MOST_HITS * cell * cell && rise <= MOST_SPANS * cell;
  while (!coarseEnough() && nx * ny > 64) {
    cell *= 1.25;
    nx = Math.max(1, Math.ceil((grid.nx * grid.cell) / cell));
    ny = Math.max(1, Math.ceil((grid.ny * grid.cell) / cell));
  }
  return { ...grid, cell, nx, ny };
}
