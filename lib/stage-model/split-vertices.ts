import { DRAFT_STEP_DEG, MAP_STEP_MM, TRAP_NONE, WALL_NONE, type StageGeometry } from './stage-model-meta';
import { averageByVertex } from './average-by-vertex';

/** An indexed mesh whose vertices are split wherever shading or colour may not run across an edge. */
export interface SplitMesh {
  /** three corners a triangle */
  index: Uint32Array;
  /** place (welded point) of each vertex */
  place: Uint32Array;
  /** three counts of the position grid for each place */
  grid: Uint16Array;
  /** unit normal of each vertex, three numbers */
  normals: Float32Array;
  /** counts of DRAFT_STEP_DEG */
  draft: Int16Array;
  flags: Uint8Array;
  /** counts of MAP_STEP_MM, WALL_NONE without a wall; null where no facet has one */
  wall: Uint16Array | null;
  /** counts of MAP_STEP_MM below the pocket's rim, TRAP_NONE without a pocket; null where no facet has one */
  trap: Int16Array | null;
  vertices: number;
  places: number;
  origin: [number, number, number];
  stepMm: number;
  draftSplitDeg: number;
}

/** Facets meeting at more than this angle keep a sharp edge between them. */
export const CREASE_DEG = 32;
const CREASE_COS = Math.cos((CREASE_DEG * Math.PI) / 180);
/** So many vertices are sent without a thought: about 4 MB at the worst. */
const MOST_VERTICES = 600_000;
/**
 * Tried in turn until the vertices are few enough: draft and wall apart, draft alone, and at 180° nothing, as a mesh
 * that is rough all over (a noisy scan) can show its mean only.
 */
const SPLITS = [
  { deg: 1, walls: true },
  { deg: 1, walls: false },
  { deg: 3, walls: false },
  { deg: 10, walls: false },
  { deg: 180, walls: false },
];
type Split = (typeof SPLITS)[number];
/** Walls that differ by more than this share no vertex, in counts; what is thicker than the second is thick. */
const WALL_JUMP = 1 / MAP_STEP_MM;
const WALL_THICK = 12 / MAP_STEP_MM;

/**
 * Rounds positions to a 16-bit grid over the bounds, welds equal ones, and splits vertices by crease, draft, flag and
 * jumps of the wall. The draft step is widened from 1° upwards, and walls run together, only where a heavy, rough mesh
 * would otherwise be split nearly everywhere.
 */
export function splitVertices(geometry: StageGeometry): SplitMesh {
  const welded = weldCorners(geometry.positions);
  const kept = keepSoundFacets(welded.corner, geometry);
  const normals = facetNormals(kept.corner, welded.grid);
  const incident = cornersByPlace(kept.corner, welded.places);
  // A look at some of the places tells which tolerance will do, before all are gone through.
  const most = Math.max(MOST_VERTICES, kept.draft.length * 1.2);
  const stride = Math.max(1, Math.floor(welded.places / 10_000));
  const last = SPLITS[SPLITS.length - 1];
  const by =
    kept.corner.length <= MOST_VERTICES
      ? SPLITS[0]
      : (SPLITS.find(
          (one) =>
            clusterCorners(kept, normals, incident, welded.places, one, stride).vertices * stride <= most,
        ) ?? last);
  const { areas, ...split } = clusterCorners(kept, normals, incident, welded.places, by, 1);
  const { grid, places, origin, stepMm } = welded;
  const { index, vertices } = split;
  const mean = (figures: Float32Array) => averageByVertex(index, figures, areas, vertices);
  return {
    ...split,
    draft: Int16Array.from(mean(Float32Array.from(kept.draft)), Math.round),
    wall: kept.wall && wallCounts(mean(kept.wall)),
    trap: kept.spillMm && trapCounts(mean(kept.spillMm), split.place, welded),
    grid,
    places,
    origin,
    stepMm,
  };
}

function wallCounts(counts: Float32Array): Uint16Array {
  // A hundredth is the least that is not "none".
  return Uint16Array.from(counts, (v) =>
    Number.isNaN(v) ? WALL_NONE : Math.min(65535, Math.max(1, Math.round(v))),
  );
}

/** The level is the facets', the depth below it each vertex's own: it runs straight along every wall. */
function trapCounts(
  level: Float32Array,
  place: Uint32Array,
  { grid, origin, stepMm }: ReturnType<typeof weldCorners>,
): Int16Array {
  return Int16Array.from(level, (spill, v) => {
    if (Number.isNaN(spill)) return TRAP_NONE;
    const depth = (spill - (origin[2] + grid[place[v] * 3 + 2] * stepMm)) / MAP_STEP_MM;
    return Math.max(TRAP_NONE + 1, Math.min(32767, Math.round(depth)));
  });
}

function weldCorners(positions: Float32Array) {
  const corners = positions.length / 3;
  const min = [Infinity, Infinity, Infinity];
  const max = [-Infinity, -Infinity, -Infinity];
  for (let i = 0; i < positions.length; i += 3) {
    for (let a = 0; a < 3; a++) {
      const v = positions[i + a];
      if (v < min[a]) min[a] = v;
      if (v > max[a]) max[a] = v;
    }
  }
  const span = Math.max(max[0] - min[0], max[1] - min[1], max[2] - min[2]);
  const stepMm = span > 0 ? span / 65535 : 1;
  let size = 1024;
  while (size < corners) size *= 2;
  const mask = size - 1;
  const table = new Int32Array(size).fill(-1);
  const corner = new Uint32Array(corners);
  let grid = new Uint16Array(Math.max(96, corners));
  let places = 0;
  for (let c = 0; c < corners; c++) {
    const x = Math.round((positions[c * 3] - min[0]) / stepMm);
    const y = Math.round((positions[c * 3 + 1] - min[1]) / stepMm);
    const z = Math.round((positions[c * 3 + 2] - min[2]) / stepMm);
    let h = (Math.imul(x, 0x9e3779b1) ^ Math.imul(y, 0x85ebca6b) ^ Math.imul(z, 0xc2b2ae35)) >>> 0;
    h = (h ^ (h >>> 15)) & mask;
    for (;;) {
      const at = table[h];
      if (at < 0) {
        if (places * 3 + 3 > grid.length) grid = grow(grid);
        grid[places * 3] = x;
        grid[places * 3 + 1] = y;
        grid[places * 3 + 2] = z;
        table[h] = places;
        corner[c] = places++;
        break;
      }
      if (grid[at * 3] === x && grid[at * 3 + 1] === y && grid[at * 3 + 2] === z) {
        corner[c] = at;
        break;
      }
      h = (h + 1) & mask;
    }
  }
  const origin = min as [number, number, number];
  return { corner, grid: grid.slice(0, places * 3), places, origin, stepMm };
}

function grow(grid: Uint16Array<ArrayBuffer>): Uint16Array<ArrayBuffer> {
  const next = new Uint16Array(grid.length * 2);
  next.set(grid);
  return next;
}

/** Facets that the grid has closed to a line or a point have no area to show and are left out. */
function keepSoundFacets(corner: Uint32Array, geometry: StageGeometry) {
  const { facetDraftDeg, facetFlags, facetWallMm, facetSpillMm } = geometry;
  const facets = facetDraftDeg.length;
  const kept = new Uint32Array(corner.length);
  const draft = new Int16Array(facets);
  const flags = new Uint8Array(facets);
  const wall = facetWallMm?.some((mm) => mm > 0) ? new Float32Array(facets) : null;
  const spillMm = facetSpillMm?.some((mm) => mm > 0) ? new Float32Array(facets) : null;
  let n = 0;
  for (let f = 0; f < facets; f++) {
    const a = corner[f * 3];
    const b = corner[f * 3 + 1];
    const c = corner[f * 3 + 2];
    if (a === b || b === c || c === a) continue;
    kept[n * 3] = a;
    kept[n * 3 + 1] = b;
    kept[n * 3 + 2] = c;
    draft[n] = Math.round(facetDraftDeg[f] / DRAFT_STEP_DEG);
    if (wall) wall[n] = facetWallMm![f] > 0 ? facetWallMm![f] / MAP_STEP_MM : NaN;
    if (spillMm) spillMm[n] = facetSpillMm![f] > 0 ? facetSpillMm![f] : NaN;
    flags[n++] = facetFlags[f];
  }
  return {
    corner: kept.subarray(0, n * 3),
    draft: draft.subarray(0, n),
    flags: flags.subarray(0, n),
    wall: wall && wall.subarray(0, n),
    spillMm: spillMm && spillMm.subarray(0, n),
  };
}

/** Area-weighted (not unit) normals in grid counts, three numbers a facet. */
function facetNormals(corner: Uint32Array, grid: Uint16Array): Float32Array {
  const normals = new Float32Array(corner.length);
  for (let i = 0; i < corner.length; i += 3) {
    const a = corner[i] * 3;
    const b = corner[i + 1] * 3;
    const c = corner[i + 2] * 3;
    const ux = grid[b] - grid[a];
    const uy = grid[b + 1] - grid[a + 1];
    const uz = grid[b + 2] - grid[a + 2];
    const vx = grid[c] - grid[a];
    const vy = grid[c + 1] - grid[a + 1];
    const vz = grid[c + 2] - grid[a + 2];
    normals[i] = uy * vz - uz * vy;
    normals[i + 1] = uz * vx - ux * vz;
    normals[i + 2] = ux * vy - uy * vx;
  }
  return normals;
}

function cornersByPlace(corner: Uint32Array, places: number) {
  const start = new Uint32Array(places + 1);
  for (let c = 0; c < corner.length; c++) start[corner[c] + 1]++;
  for (let p = 0; p < places; p++) start[p + 1] += start[p];
  const fill = start.slice(0, places);
  const list = new Uint32Array(corner.length);
  for (let c = 0; c < corner.length; c++) list[fill[corner[c]]++] = c;
  return { start, list };
}

type Kept = ReturnType<typeof keepSoundFacets>;
type Incident = ReturnType<typeof cornersByPlace>;

function clusterCorners(
  kept: Kept,
  normals: Float32Array,
  { start, list }: Incident,
  places: number,
  by: Split,
  stride: number,
) {
  const tolerance = by.deg / DRAFT_STEP_DEG;
  const rough = by.deg === 180;
  const walls = by.walls ? kept.wall : null;
  const creaseCos = rough ? -2 : CREASE_COS;
  const lengths = new Float32Array(kept.draft.length);
  for (let f = 0; f < lengths.length; f++) {
    lengths[f] = Math.hypot(normals[f * 3], normals[f * 3 + 1], normals[f * 3 + 2]);
  }
  let corners = 0;
  for (let p = 0; p < places; p += stride) corners += start[p + 1] - start[p];
  // A sample counts vertices only; its index stays empty.
  const index = new Uint32Array(stride === 1 ? corners : 0);
  const place = new Uint32Array(corners);
  const outNormals = new Float32Array(corners * 3);
  const first = new Uint32Array(corners);
  const wallOf = new Float32Array(walls ? corners : 0);
  let vertices = 0;
  // Per place: smooth groups carry the normal, draft groups inside them become the vertices.
  let leader: number[] = [];
  let sums: number[] = [];
  let groupOf: number[] = [];
  for (let p = 0; p < places; p += stride) {
    const from = start[p];
    const to = start[p + 1];
    leader = [];
    sums = [];
    groupOf = [];
    for (let k = from; k < to; k++) {
      const f = (list[k] / 3) | 0;
      const nx = normals[f * 3];
      const ny = normals[f * 3 + 1];
      const nz = normals[f * 3 + 2];
      let g = 0;
      for (; g < leader.length; g++) {
        const l = leader[g];
        const dot = nx * normals[l * 3] + ny * normals[l * 3 + 1] + nz * normals[l * 3 + 2];
        if (dot >= creaseCos * lengths[f] * lengths[l]) break;
      }
      if (g === leader.length) {
        leader.push(f);
        sums.push(0, 0, 0);
      }
      sums[g * 3] += nx;
      sums[g * 3 + 1] += ny;
      sums[g * 3 + 2] += nz;
      groupOf.push(g);
    }
    const begin = vertices;
    for (let k = from; k < to; k++) {
      const f = (list[k] / 3) | 0;
      const g = groupOf[k - from];
      let v = begin;
      for (; v < vertices; v++) {
        if (place[v] !== g) continue;
        const l = first[v];
        if (rough) break;
        if (kept.flags[l] !== kept.flags[f] || Math.abs(kept.draft[l] - kept.draft[f]) > tolerance) continue;
        if (walls === null || alikeWalls(wallOf[v], walls[f])) break;
      }
      if (v === vertices) {
        const length = Math.hypot(sums[g * 3], sums[g * 3 + 1], sums[g * 3 + 2]) || 1;
        for (let a = 0; a < 3; a++) outNormals[v * 3 + a] = sums[g * 3 + a] / length;
        place[v] = g;
        first[v] = f;
        if (walls) wallOf[v] = walls[f];
        vertices++;
      } else if (walls && !(wallOf[v] > 0)) wallOf[v] = walls[f];
      index[list[k]] = v;
    }
    for (let v = begin; v < vertices; v++) place[v] = p;
  }
  return {
    index,
    place: place.slice(0, vertices),
    normals: outNormals.slice(0, vertices * 3),
    flags: Uint8Array.from(first.subarray(0, vertices), (f) => kept.flags[f]),
    vertices,
    areas: lengths,
    draftSplitDeg: by.deg,
  };
}

/** A facet without a figure goes with any: it lies between ones that were measured, and no ray has spoken for it. */
function alikeWalls(a: number, b: number): boolean {
  return !(Math.abs(Math.min(a, WALL_THICK) - Math.min(b, WALL_THICK)) > WALL_JUMP);
}
