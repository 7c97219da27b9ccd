import type { Mesh } from '../mesh/mesh';
import type { Grid } from './grid';

/** Crossings that one window may hold: a few for each of its cells; a heap of facets has thousands. */
const MOST_HITS = 500_000;

/**
 * Coarsens the cells of a window until the crossings of the facets over it are few enough to be looked at in passing.
 * @param facets those whose plan box meets the window
 */
export function affordWindow({ index, position: p }: Mesh, facets: Uint32Array, grid: Grid): Grid {
  const { x0, y0, cell, nx, ny } = grid;
  const [x1, y1] = [x0 + nx * cell, y0 + ny * cell];
  let area = 0;
  for (const t of facets) {
    const a = 3 * index[3 * t];
    const b = 3 * index[3 * t + 1];
    const d = 3 * index[3 * t + 2];
    const wide = Math.min(x1, Math.max(p[a], p[b], p[d])) - Math.max(x0, Math.min(p[a], p[b], p[d]));
    const deep = Math.min(y1, Math.max(p[a + 1], p[b + 1], p[d + 1])) - Math.max(y0, Math.min(p[a + 1], p[b + 1], p[d + 1])); // prettier-ignore
    if (wide <= 0 || deep <= 0) continue;
    const whole = Math.abs((p[b] - p[a]) * (p[d + 1] - p[a + 1]) - (p[b + 1] - p[a + 1]) * (p[d] - p[a])) / 2;
    area += Math.min(whole, wide * deep);
  }
  const coarser = Math.sqrt(area / (cell * cell) / MOST_HITS);
  if (!(coarser > 1)) return grid;
  const count = (n: number) => Math.max(1, Math.ceil(n / coarser));
  return { x0, y0, cell: cell * coarser, nx: count(nx), ny: count(ny) };
}
