import { CONNECTED, ENCLOSED, type Air } from '../dexel/air';
import type { Columns } from '../dexel/columns';
import { cellAt } from '../dexel/grid';
import type { Facets } from '../mesh/measure-facets';
import type { Mesh } from '../mesh/mesh';
import type { WallsReport } from '../report';
import type { Visibility } from './visibility';

const MOST_SAMPLES = 2000;
/** Solid deeper than this is not a wall. */
const DEEPEST_MM = 20;
/** A cavity smaller than this share of the part leaves it solid. */
const HOLLOW_SHARE = 0.005;
/** Share of the thinnest samples left out: rays that graze a convex edge leave at once. */
const STRAY = 0.01;

/**
 * Hollow or not, and how thick the walls and the top are: lengths of solid along the inward normal, walked through the
 * columns in half-cell steps (so good to about half a cell), the thinnest 1 % left out.
 */
export function measureWalls(
  mesh: Mesh,
  facets: Facets,
  columns: Columns,
  air: Air,
  visibility: Visibility,
  bore: Uint8Array,
): WallsReport {
  const hollow = air.enclosedVolume > HOLLOW_SHARE * (columns.solidVolume + air.enclosedVolume);
  // Odd, so that it does not keep step with the two halves of quadrilaterals.
  const step = Math.max(1, Math.floor(mesh.triangles / MOST_SAMPLES)) | 1;
  const walls: number[] = [];
  const tops: number[] = [];
  for (let t = 0; t < mesh.triangles; t += step) {
    if (facets.bed[t] || bore[t] || facets.area[t] === 0 || visibility.visible[t] < 0.5) continue;
    const isTop = facets.nz[t] > 0.9;
    if (!isTop && Math.abs(facets.nz[t]) > 0.5) continue;
    const thickness = solidBehind(mesh, t, columns, air);
    if (thickness !== null) (isTop ? tops : walls).push(thickness);
  }
  return { minMm: thinnest(walls), topMm: hollow ? thinnest(tops) : null, hollow };
}

function thinnest(values: number[]): number | null {
  if (values.length === 0) return null;
  values.sort((a, b) => a - b);
  return values[Math.floor(values.length * STRAY)];
}

/** Length of solid behind the middle of a facet, ended by air; null where none ends it within reach. */
function solidBehind(mesh: Mesh, t: number, columns: Columns, air: Air): number | null {
  const { index, position: p } = mesh;
  const [a, b, d] = [index[3 * t] * 3, index[3 * t + 1] * 3, index[3 * t + 2] * 3];
  const [ux, uy, uz] = [p[b] - p[a], p[b + 1] - p[a + 1], p[b + 2] - p[a + 2]];
  const [vx, vy, vz] = [p[d] - p[a], p[d + 1] - p[a + 1], p[d + 2] - p[a + 2]];
  const [nx, ny, nz] = [uy * vz - uz * vy, uz * vx - ux * vz, ux * vy - uy * vx];
  const step = columns.grid.cell / 2;
  const scale = step / Math.hypot(nx, ny, nz);
  const [sx, sy, sz] = [nx * scale, ny * scale, nz * scale];
  const [x, y, z] = [
    (p[a] + p[b] + p[d]) / 3,
    (p[a + 1] + p[b + 1] + p[d + 1]) / 3,
    (p[a + 2] + p[b + 2] + p[d + 2]) / 3,
  ];
  const steps = Math.ceil(DEEPEST_MM / step);
  for (let k = 2; k < steps; k++) {
    if (z - k * sz < 0) return null;
    const state = stateAt(columns, air, x - k * sx, y - k * sy, z - k * sz);
    if (state === ENCLOSED || state === CONNECTED) return (k - 0.5) * step;
    if (state < 0) return k > 3 ? (k - 0.5) * step : null;
  }
  return null;
}

/** Gap state at a point; 0 in solid, −1 in the open air. */
function stateAt(columns: Columns, air: Air, x: number, y: number, z: number): number {
  const c = cellAt(columns.grid, x, y);
  if (c < 0 || z > columns.height[c]) return -1;
  for (let s = columns.start[c]; s < columns.start[c] + 2 * columns.count[c]; s += 2) {
    if (z < columns.z[s]) return air.state[s];
    if (z <= columns.z[s + 1]) return 0;
  }
  return -1;
}
