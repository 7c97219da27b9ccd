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
/** A facet is looked at in its middle, then so far on the way from there to its lowest corner. */
const NEAR_CORNER = 0.85;

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
  const { nx, ny, nz, bed } = facets;
  const { nx: columns, ny: rows, x0, y0 } = grid;
  const perMm = 1 / grid.cell;
  const spillMm = new Float32Array(triangles).fill(NaN);
  const unvented = new Uint8Array(triangles);
  let highest = -Infinity;
  const wet = new Uint8Array(level.length);
  for (let c = 0; c < level.length; c++) {
    if (level[c] - surface[c] <= PIT_MM) continue;
    wet[c] = 1;
    if (level[c] > highest) highest = level[c];
  }
  if (highest === -Infinity) return { spillMm, unvented };
  for (let t = 0; t < triangles; t++) {
    const a = index[3 * t] * 3;
    const b = index[3 * t + 1] * 3;
    const d = index[3 * t + 2] * 3;
    let low = a;
    if (p[b + 2] < p[low + 2]) low = b;
    if (p[d + 2] < p[low + 2]) low = d;
    const foot = p[low + 2];
    if (foot >= highest - PIT_MM || nz[t] < -SIN_VERTICAL || bed[t]) continue;
    const mx = (p[a] + p[b] + p[d]) / 3;
    const my = (p[a + 1] + p[b + 1] + p[d + 1]) / 3;
    const mz = (p[a + 2] + p[b + 2] + p[d + 2]) / 3;
    const flat = Math.sqrt(nx[t] * nx[t] + ny[t] * ny[t]);
    const step = flat > 1e-6 ? STEP / flat : 0;
    const i0 = (mx - x0) * perMm + step * nx[t];
    const j0 = (my - y0) * perMm + step * ny[t];
    // From the middle to near the lowest corner, in cells; a facet about as small as a cell is told by its middle.
    const di = (p[low] - mx) * perMm * NEAR_CORNER;
    const dj = (p[low + 1] - my) * perMm * NEAR_CORNER;
    const dz = (foot - mz) * NEAR_CORNER;
    const looks = Math.abs(di) + Math.abs(dj) - dz * perMm > 1 ? 2 : 1;
    for (let k = 0; k < looks; k++) {
      const i = Math.floor(i0 + k * di);
      const j = Math.floor(j0 + k * dj);
      if (i < 0 || j < 0 || i >= columns || j >= rows) continue;
      const c = j * columns + i;
      if (wet[c] === 0 || level[c] - foot <= PIT_MM || mz + k * dz < surface[c] - PIT_MM) continue;
      spillMm[t] = level[c];
      unvented[t] = flood.unvented[c];
      break;
    }
  }
  return { spillMm, unvented };
}
