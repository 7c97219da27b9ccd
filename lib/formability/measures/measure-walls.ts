import { CONNECTED, ENCLOSED, type Air } from '../dexel/air';
import type { Columns } from '../dexel/columns';
import { cellAt } from '../dexel/grid';
import type { Facets } from '../mesh/measure-facets';
import type { Mesh } from '../mesh/mesh';
import type { WallsReport } from '../report';
import type { Visibility } from './visibility';

const MOST_SAMPLES = 4000;
/** Solid deeper than this is not a wall. */
const DEEPEST_MM = 60;
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
  const step = Math.max(1, Math.floor(mesh.triangles / MOST_SAMPLES));
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
  const u = [p[b] - p[a], p[b + 1] - p[a + 1], p[b + 2] - p[a + 2]];
  const v = [p[d] - p[a], p[d + 1] - p[a + 1], p[d + 2] - p[a + 2]];
  const n = [u[1] * v[2] - u[2] * v[1], u[2] * v[0] - u[0] * v[2], u[0] * v[1] - u[1] * v[0]];
  const length = Math.hypot(n[0], n[1], n[2]);
  const step = columns.grid.cell / 2;
  const mid = [0, 1, 2].map((k) => (p[a + k] + p[b + k] + p[d + k]) / 3);
  for (let far = 2 * step; far < DEEPEST_MM; far += step) {
    const [x, y, z] = mid.map((m, k) => m - (n[k] / length) * far);
    if (z < 0) return null;
    const state = stateAt(columns, air, x, y, z);
    if (state === ENCLOSED || state === CONNECTED) return far - step / 2;
    if (state < 0) return far > 3 * step ? far - step / 2 : null;
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
