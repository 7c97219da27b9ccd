import { gapFloor } from '../dexel/air';
import type { Columns } from '../dexel/columns';
import { cellAt, type Grid } from '../dexel/grid';
import type { Edges } from '../mesh/build-edges';
import type { Facets } from '../mesh/measure-facets';
import type { Mesh } from '../mesh/mesh';
import type { PlanReport } from '../report';
import { SIN_VERTICAL } from './thresholds';
import type { Visibility } from './visibility';

/** How far to either side of an edge the columns are looked up, in cells. */
const BESIDE = 0.75;

export interface PlanInput {
  mesh: Mesh;
  facets: Facets;
  edges: Edges;
  columns: Columns;
  visibility: Visibility;
  /** Facets of vent bores: closed for the sheet. */
  bore: Uint8Array;
  boreAreaMm2: number;
  /** H with vents closed. */
  surface: Float64Array;
  frameMm: [number, number];
  heightMm: number;
  watertight: boolean;
}

/**
 * Plan area, formed area and draw ratios. Areas come from the facets themselves, weighted by the share of each that
 * the sheet can reach, so a plain part has no grid error; below the lip of an overhang the sheet hangs straight
 * down (vertical jump of the graph of H).
 */
export function measurePlan(input: PlanInput): PlanReport {
  const { frameMm, surface, columns } = input;
  const frameAreaMm2 = frameMm[0] * frameMm[1];
  const seen = visibleAreas(input);
  const covered = coveredArea(columns);
  // Facets that the grid cannot tell apart would show here; then the cells are the better witness.
  const planAreaMm2 =
    input.watertight && Math.abs(seen.plan - covered) < 0.01 * covered ? seen.plan : covered;
  const jumps = lipArea(input);
  const flat = Math.max(0, frameAreaMm2 - planAreaMm2 - input.boreAreaMm2);
  const formedAreaMm2 = flat + seen.surface + input.boreAreaMm2 + jumps;
  const [x, y] = profileLengths(surface, columns.grid);
  return {
    frameMm,
    frameAreaMm2,
    planAreaMm2,
    formedAreaMm2,
    arealDrawRatio: formedAreaMm2 / frameAreaMm2,
    linearDrawRatioX: 1 + x / frameMm[0],
    linearDrawRatioY: 1 + y / frameMm[1],
    depthRatio: input.heightMm / Math.min(frameMm[0], frameMm[1]),
  };
}

function visibleAreas({ facets, visibility, bore }: PlanInput): { plan: number; surface: number } {
  let plan = 0;
  let surface = 0;
  const { area, nz } = facets;
  const { visible } = visibility;
  for (let t = 0; t < area.length; t++) {
    if (bore[t] || nz[t] < -SIN_VERTICAL) continue;
    const seen = area[t] * visible[t];
    surface += seen;
    if (nz[t] > 0) plan += seen * nz[t];
  }
  return { plan, surface };
}

function coveredArea(columns: Columns): number {
  const { count } = columns;
  let covered = 0;
  for (let c = 0; c < count.length; c++) if (count[c] > 0) covered++;
  return covered * columns.grid.cell ** 2;
}

/**
 * Area of the sheet hanging from lips: along each edge between an overhanging facet and one that is not, down to what
 * lies outside or, where a wall goes on below an opening, to the opening's floor.
 */
function lipArea({ mesh, facets, edges, columns, surface, bore }: PlanInput): number {
  const { position: p } = mesh;
  const { grid } = columns;
  const { nz } = facets;
  const { count, facetA, facetB } = edges;
  const overhangs = new Uint8Array(nz.length);
  for (let t = 0; t < nz.length; t++) if (nz[t] < -SIN_VERTICAL) overhangs[t] = 1;
  let area = 0;
  for (let e = 0; e < count; e++) {
    const a = facetA[e];
    const b = facetB[e];
    if (b < 0 || overhangs[a] === overhangs[b] || bore[a] || bore[b]) continue;
    const down = overhangs[a] ? a : b;
    if (facets.bed[down]) continue;
    const i = edges.low[e] * 3;
    const j = edges.high[e] * 3;
    const dx = p[j] - p[i];
    const dy = p[j + 1] - p[i + 1];
    const length = Math.hypot(dx, dy);
    if (length === 0) continue;
    const inner = thirdVertex(mesh, down, edges.low[e], edges.high[e]) * 3;
    const side = Math.sign(dx * (p[inner + 1] - p[i + 1]) - dy * (p[inner] - p[i]));
    const outX = (side * dy * BESIDE * grid.cell) / length;
    const outY = (-side * dx * BESIDE * grid.cell) / length;
    const steps = Math.max(1, Math.ceil(length / grid.cell));
    for (let s = 0; s < steps; s++) {
      const share = (s + 0.5) / steps;
      const x = p[i] + share * dx;
      const y = p[i + 1] + share * dy;
      const z = p[i + 2] + share * (p[j + 2] - p[i + 2]);
      const c = cellAt(grid, x + outX, y + outY);
      const outside = c < 0 ? 0 : surface[c];
      const drop = z - Math.max(outside, floorUnder(columns, cellAt(grid, x - outX, y - outY), z));
      if (drop > 0) area += (drop * length) / steps;
    }
  }
  return area;
}

/** Floor of the gap of a column whose ceiling is nearest to z; 0 where none is within a cell of it. */
function floorUnder(columns: Columns, c: number, z: number): number {
  if (c < 0) return 0;
  let nearest = columns.grid.cell;
  let floor = 0;
  for (let s = columns.start[c]; s < columns.start[c] + 2 * columns.count[c]; s += 2) {
    const away = Math.abs(columns.z[s] - z);
    if (away >= nearest) continue;
    nearest = away;
    floor = gapFloor(columns, c, s);
  }
  return floor;
}

function thirdVertex(mesh: Mesh, facet: number, a: number, b: number): number {
  for (let k = 0; k < 3; k++) {
    const v = mesh.index[3 * facet + k];
    if (v !== a && v !== b) return v;
  }
  return a;
}

/** Greatest excess of a profile's length over its plan length, of rows (y = const) and of columns (x = const). */
function profileLengths(surface: Float64Array, grid: Grid): [number, number] {
  return [longestProfile(surface, grid.cell, grid.ny, grid.nx, grid.nx, 1), longestProfile(surface, grid.cell, grid.nx, grid.ny, 1, grid.nx)]; // prettier-ignore
}

function longestProfile(
  h: Float64Array,
  cell: number,
  lines: number,
  n: number,
  line: number,
  step: number,
): number {
  let longest = 0;
  for (let l = 0; l < lines; l++) {
    let excess = h[l * line];
    let before = excess;
    for (let k = 1, c = l * line + step; k < n; k++, c += step) {
      const rise = h[c] - before;
      if (rise !== 0) excess += Math.sqrt(cell * cell + rise * rise) - cell;
      before = h[c];
    }
    excess += before;
    if (excess > longest) longest = excess;
  }
  return longest;
}
