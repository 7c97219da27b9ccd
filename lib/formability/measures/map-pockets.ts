import type { Grid } from '../dexel/grid';
import type { Facets } from '../mesh/measure-facets';
import type { Mesh } from '../mesh/mesh';
import { PIT_MM } from './find-pits';
import { SIN_VERTICAL } from './thresholds';

/** The flood over the plan, as `findAirTraps` leaves it. */
export interface Flood {
  /** Where the flood stands in each cell, mm. */
  level: Float64Array;
  /** 1 in cells of a leaf pit that no vent leads out of. */
  unvented: Uint8Array;
}

export interface Pockets {
  /** Height at which the pit in front of the facet overflows, its outermost rim, mm above the bed; NaN without one. */
  spillMm: Float32Array;
  /** 1 where that pit has no vent in the mesh; whether a vent prints open is the recipe's matter. */
  unvented: Uint8Array;
}

/** In front of a facet is so far along its level normal, in cells: far enough that the cell looked at is not behind it. */
const STEP = 1.25;
/** Places in a facet that are looked at: its middle, then near its lowest corner (weights of that corner). */
const LOWEST_CORNER = [1 / 3, 0.9];

/**
 * The pit that each facet looks into, from the flood that found the pits: a facet lies in a pit where the flood stands
 * more than 0.05 mm above its lowest corner and the surface in front of it is no higher than the facet. Facets that
 * look down, stand on the bed or lie under the surface (bores, cavities) are in none. Linear in facets.
 */
export function mapPockets(
  mesh: Mesh,
  facets: Facets,
  surface: Float64Array,
  flood: Flood,
  grid: Grid,
): Pockets {
  const { triangles, index, position: p } = mesh;
  const { level } = flood;
  const { cell, nx: columns, ny: rows, x0, y0 } = grid;
  const spillMm = new Float32Array(triangles).fill(NaN);
  const unvented = new Uint8Array(triangles);
  let lowest = Infinity;
  let highest = -Infinity;
  for (let c = 0; c < level.length; c++) {
    if (level[c] - surface[c] <= PIT_MM) continue;
    if (level[c] > highest) highest = level[c];
    if (surface[c] < lowest) lowest = surface[c];
  }
  if (highest === -Infinity) return { spillMm, unvented };
  for (let t = 0; t < triangles; t++) {
    const nz = facets.nz[t];
    if (nz < -SIN_VERTICAL || facets.bed[t] || facets.area[t] === 0) continue;
    const a = index[3 * t] * 3;
    const b = index[3 * t + 1] * 3;
    const d = index[3 * t + 2] * 3;
    let low = a;
    if (p[b + 2] < p[low + 2]) low = b;
    if (p[d + 2] < p[low + 2]) low = d;
    if (p[low + 2] >= highest - PIT_MM) continue;
    if (p[a + 2] < lowest && p[b + 2] < lowest && p[d + 2] < lowest) continue;
    const flat = Math.sqrt(facets.nx[t] * facets.nx[t] + facets.ny[t] * facets.ny[t]);
    const stepX = flat > 1e-6 ? (facets.nx[t] / flat) * STEP * cell : 0;
    const stepY = flat > 1e-6 ? (facets.ny[t] / flat) * STEP * cell : 0;
    for (let k = 0; k < LOWEST_CORNER.length; k++) {
      const own = LOWEST_CORNER[k];
      const rest = (1 - own) / 2;
      const wa = low === a ? own : rest;
      const wb = low === b ? own : rest;
      const wd = low === d ? own : rest;
      const i = Math.floor((wa * p[a] + wb * p[b] + wd * p[d] + stepX - x0) / cell);
      const j = Math.floor((wa * p[a + 1] + wb * p[b + 1] + wd * p[d + 1] + stepY - y0) / cell);
      if (i < 0 || j < 0 || i >= columns || j >= rows) continue;
      const c = j * columns + i;
      if (level[c] - surface[c] <= PIT_MM || level[c] - p[low + 2] <= PIT_MM) continue;
      const z = wa * p[a + 2] + wb * p[b + 2] + wd * p[d + 2];
      if (z < surface[c] - PIT_MM) continue;
      spillMm[t] = level[c];
      unvented[t] = flood.unvented[c];
      break;
    }
  }
  return { spillMm, unvented };
}
