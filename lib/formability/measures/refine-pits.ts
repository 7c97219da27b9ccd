import type { Grid } from '../dexel/grid';
import { affordWindow } from '../dexel/afford-window';
import { buildColumns } from '../dexel/columns';
import { rasterise } from '../dexel/raster';
import type { Mesh } from '../mesh/mesh';
import type { FacetGrid } from './facet-grid';
import { PIT_MM, type Pit } from './find-pits';

/** A pit of fewer cells than this is measured again: its rim cuts too many of them. */
const FEW_CELLS = 2_500;
const MOST_REFINED = 16;
/** Shallower pits are noise of the surface. */
const LEAST_DEPTH_MM = 0.2;
/** Cells along the longer side of the window. */
const CELLS = 300;

/**
 * Measures the volume of small pits again on finer cells: on a large template a pocket of a few cells is some per cent
 * wrong. What lies lower than a pit's own floor is a vent, closed there. Changes the largest such pits in place.
 */
export function refinePits(
  mesh: Mesh,
  facets: FacetGrid,
  surface: Float64Array,
  grid: Grid,
  ofShell: Uint32Array,
  pits: readonly Pit[],
): void {
  const small = pits
    .filter((pit) => pit.cells < FEW_CELLS && pit.members.length > 0)
    .filter((pit) => pit.spill - surface[pit.floor] > LEAST_DEPTH_MM)
    .sort((a, b) => b.volume - a.volume || a.floor - b.floor);
  for (const pit of small.slice(0, MOST_REFINED)) {
    const wanted = windowOver(pit, grid);
    const list = facetsOver(facets, wanted);
    const fine = affordWindow(mesh, list, wanted);
    if (fine.cell >= grid.cell) continue;
    const columns = buildColumns(rasterise(mesh, fine, 2, list), fine, ofShell);
    const found = volumeBelow(columns.height, fine, surface[pit.floor], pit.spill);
    if (found) {
      pit.volume = found.volume;
      pit.areaMm2 = found.area;
    }
  }
}

/** The pit's box and two cells round it, cut finer. */
function windowOver({ members }: Pit, { cell, nx, x0, y0 }: Grid): Grid {
  let [i0, i1, j0, j1] = [Infinity, -Infinity, Infinity, -Infinity];
  for (const c of members) {
    const i = c % nx;
    const j = (c - i) / nx;
    [i0, i1, j0, j1] = [Math.min(i0, i), Math.max(i1, i), Math.min(j0, j), Math.max(j1, j)];
  }
  const [wide, deep] = [i1 - i0 + 5, j1 - j0 + 5];
  const finer = Math.max(1, CELLS / Math.max(wide, deep));
  return {
    cell: cell / finer,
    nx: Math.ceil(wide * finer),
    ny: Math.ceil(deep * finer),
    x0: x0 + (i0 - 2) * cell,
    y0: y0 + (j0 - 2) * cell,
  };
}

/** Facets listed in the cubes of space over a window, each once, in their own order. */
function facetsOver({ cell, count, low, start, facet }: FacetGrid, window: Grid): Uint32Array {
  const clamp = (value: number, k: number) =>
    Math.min(count[k] - 1, Math.max(0, Math.floor((value - low[k]) / cell)));
  const found = new Set<number>();
  const [i0, i1] = [clamp(window.x0, 0), clamp(window.x0 + window.nx * window.cell, 0)];
  const [j0, j1] = [clamp(window.y0, 1), clamp(window.y0 + window.ny * window.cell, 1)];
  for (let k = 0; k < count[2]; k++) {
    for (let j = j0; j <= j1; j++) {
      for (let i = i0; i <= i1; i++) {
        const c = (k * count[1] + j) * count[0] + i;
        for (let e = start[c]; e < start[c + 1]; e++) found.add(facet[e]);
      }
    }
  }
  return Uint32Array.from(found).sort();
}

/** The largest hollow below the spill level that ends inside the window; null where there is none. */
function volumeBelow(
  height: Float64Array,
  { nx, ny, cell }: Grid,
  floor: number,
  spill: number,
): { volume: number; area: number } | null {
  const inPit = (c: number) => spill - Math.max(height[c], floor) > PIT_MM;
  const seen = new Uint8Array(nx * ny);
  let best: { volume: number; area: number } | null = null;
  for (let first = 0; first < seen.length; first++) {
    if (seen[first] || !inPit(first)) continue;
    const queue = [first];
    seen[first] = 1;
    let sum = 0;
    let open = false;
    for (const c of queue) {
      const i = c % nx;
      const j = (c - i) / nx;
      sum += spill - Math.max(height[c], floor);
      if (i === 0 || j === 0 || i === nx - 1 || j === ny - 1) {
        open = true;
        continue;
      }
      for (let dy = -nx; dy <= nx; dy += nx) {
        for (let dx = -1; dx <= 1; dx++) {
          const n = c + dy + dx;
          if (seen[n] || !inPit(n)) continue;
          seen[n] = 1;
          queue.push(n);
        }
      }
    }
    const volume = sum * cell * cell;
    if (!open && (!best || volume > best.volume)) best = { volume, area: queue.length * cell * cell };
  }
  return best;
}
