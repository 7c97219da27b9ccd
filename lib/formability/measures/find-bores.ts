import type { Columns } from '../dexel/columns';
import { cellAt } from '../dexel/grid';
import { neighbourOver, type Edges } from '../mesh/build-edges';
import { BED_TOLERANCE_MM, type Facets } from '../mesh/measure-facets';
import type { Mesh } from '../mesh/mesh';

/** Widest bore that is a vent, mm (engine contract), with room for a polygon's corners. */
export const VENT_MM = 3;
const VENT_SLACK_MM = 0.05;
/** A counter-bore from below may be this much wider at the bed (common practice: 2 to 5 mm). */
const MOUTH_MM = 8;
/** Steeper than this is the wall of a bore; flatter is the floor of the pit above it, or the ceiling below it. */
const FLOOR_NZ = 0.5;
/** A bore may lean by up to 45°, and have so many facets. */
const MOST_LEAN = 1;
const MOST_FACETS = 20_000;
/** What lies below a foot, or over a head, by more than this is in the way. */
const COVER_MM = 1e-3;

/** A narrow bore up through the part, found on the mesh, however narrow against a grid cell. */
export interface Bore {
  x: number;
  y: number;
  /** z of its upper rim. */
  top: number;
  diameter: number;
  /** Area of its narrowest section. */
  area: number;
  facets: number[];
  /** False where it ends in a ceiling. */
  through: boolean;
}

/**
 * Bores start at holes in the bed face, or in a ceiling over the open bed (the skin of a hollow template): loops of
 * edges between such a facet and a wall facet, as wide as a vent or its counter-bore. From there the walls are
 * followed up to facets that face up. A mesh may be open: what is missing ends nothing, and where the bed face itself
 * is missing its rim stands for it.
 */
export function findBores(mesh: Mesh, measured: Facets, edges: Edges, columns: Columns): Bore[] {
  const facets = { ...measured, bed: withNeedles(mesh, measured) };
  const bores: Bore[] = [];
  const known = new Set<number>();
  for (const rim of [...bedRims(mesh, facets, edges), ...ceilingRims(mesh, facets, edges)]) {
    // The narrow part of a counter-bore begins at a ceiling of its own.
    if (rim.walls.some((wall) => known.has(wall))) continue;
    const bore = climb(mesh, facets, edges, rim);
    if (!bore || !bore.through || bore.diameter > VENT_MM + VENT_SLACK_MM) continue;
    if (!leadsThrough(mesh, columns, rim, bore)) continue;
    bores.push(bore);
    for (const facet of bore.facets) known.add(facet);
  }
  return bores.sort((a, b) => a.x - b.x || a.y - b.y);
}

/** Nothing of the part lies below the bore's foot, and nothing covers its head: it does not end in a cavity. */
function leadsThrough({ position: p }: Mesh, columns: Columns, rim: Rim, bore: Bore): boolean {
  const { grid, start, count, z } = columns;
  const foot = middleOf(p, rim.vertices);
  const below = cellAt(grid, foot[0], foot[1]);
  const above = cellAt(grid, bore.x, bore.y);
  if (below < 0 || above < 0) return true;
  if (count[below] > 0 && z[start[below]] < foot[2] - COVER_MM) return false;
  return count[above] === 0 || z[start[above] + 2 * count[above] - 2] <= bore.top + COVER_MM;
}

/** The bed facets, and those without area that lie on the bed among them. */
function withNeedles(mesh: Mesh, { area, bed }: Facets): Uint8Array {
  const all = bed.slice();
  const { index, position: p } = mesh;
  for (let t = 0; t < all.length; t++) {
    if (area[t] > 0) continue;
    const [a, b, c] = [index[3 * t], index[3 * t + 1], index[3 * t + 2]];
    if (Math.max(p[3 * a + 2], p[3 * b + 2], p[3 * c + 2]) <= BED_TOLERANCE_MM) all[t] = 1;
  }
  return all;
}

interface Rim {
  vertices: number[];
  walls: number[];
}

/** Loops of the bed face's inner edges that are small enough; of its open rims where it is missing. */
function bedRims(mesh: Mesh, facets: Facets, edges: Edges): Rim[] {
  const { position: p } = mesh;
  const steps: Steps = new Map();
  for (let e = 0; e < edges.count; e++) {
    const a = edges.facetA[e];
    const b = edges.facetB[e];
    if (b >= 0) {
      if (facets.bed[a] !== facets.bed[b]) addStep(steps, mesh, edges, e, facets.bed[a] ? a : b);
      continue;
    }
    const [low, high] = [edges.low[e], edges.high[e]];
    if (Math.max(p[3 * low + 2], p[3 * high + 2]) > BED_TOLERANCE_MM) continue;
    // The missing facet over the edge would run the other way.
    if (runsForward(mesh, a, low, high) === (facets.bed[a] === 1))
      steps.set(low, { to: high, wall: facets.bed[a] ? -1 : a });
    else steps.set(high, { to: low, wall: facets.bed[a] ? -1 : a });
  }
  return closeLoops(mesh, steps);
}

/** Loops of small holes in faces that look down from above the bed. */
function ceilingRims(mesh: Mesh, facets: Facets, edges: Edges): Rim[] {
  const { nz, bed, area } = facets;
  const steps: Steps = new Map();
  const [wall, ceiling] = [1, 2];
  const role = new Uint8Array(mesh.triangles);
  for (let t = 0; t < role.length; t++) {
    if (bed[t]) continue;
    // A level facet without area belongs to the face that it lies in.
    if (area[t] === 0) role[t] = isLevel(mesh, t) ? ceiling : 0;
    else role[t] = nz[t] < -FLOOR_NZ ? ceiling : nz[t] <= FLOOR_NZ ? wall : 0;
  }
  const { facetA, facetB } = edges;
  for (let e = 0; e < edges.count; e++) {
    const a = facetA[e];
    const b = facetB[e];
    if (b < 0 || role[a] + role[b] !== wall + ceiling) continue;
    addStep(steps, mesh, edges, e, role[a] === ceiling ? a : b);
  }
  return closeLoops(mesh, steps);
}

/** From each corner of a rim to the next; −1 where the wall over it is missing. */
type Steps = Map<number, { to: number; wall: number }>;

/** An edge of a face that looks down, the way round that the face has it, and the wall over it. */
function addStep(steps: Steps, mesh: Mesh, edges: Edges, e: number, face: number): void {
  const [low, high] = [edges.low[e], edges.high[e]];
  const [from, to] = runsForward(mesh, face, low, high) ? [low, high] : [high, low];
  steps.set(from, { to, wall: edges.facetA[e] === face ? edges.facetB[e] : edges.facetA[e] });
}

function closeLoops(mesh: Mesh, steps: Steps): Rim[] {
  const rims: Rim[] = [];
  const seen = new Set<number>();
  for (const first of steps.keys()) {
    if (seen.has(first)) continue;
    const rim: Rim = { vertices: [], walls: [] };
    for (let v = first; !seen.has(v);) {
      seen.add(v);
      const step = steps.get(v);
      if (!step) break;
      rim.vertices.push(v);
      if (step.wall >= 0) rim.walls.push(step.wall);
      v = step.to;
    }
    // Such faces look down, so seen from above an outer rim runs clockwise and a hole the other way.
    const area = planArea(mesh, rim.vertices);
    if (rim.vertices.length >= 3 && area > 0 && Math.sqrt((4 * area) / Math.PI) <= MOUTH_MM) rims.push(rim);
  }
  return rims;
}

function runsForward(mesh: Mesh, facet: number, low: number, high: number): boolean {
  for (let k = 0; k < 3; k++) {
    if (mesh.index[3 * facet + k] === low) return mesh.index[3 * facet + ((k + 1) % 3)] === high;
  }
  return false;
}

function planArea(mesh: Mesh, loop: number[]): number {
  const { position: p } = mesh;
  let twice = 0;
  loop.forEach((v, i) => {
    const w = loop[(i + 1) % loop.length];
    twice += p[3 * v] * p[3 * w + 1] - p[3 * w] * p[3 * v + 1];
  });
  return twice / 2;
}

/**
 * Follows the walls up from the rim. The axis runs from the middle of the lower rim to that of the upper one, so a bore
 * may lean; every wall must stay as near to it as the lower rim is.
 */
function climb(mesh: Mesh, facets: Facets, edges: Edges, rim: Rim): Bore | null {
  const { position: p, index } = mesh;
  const foot = middleOf(p, rim.vertices);
  const widest =
    Math.max(...rim.vertices.map((v) => Math.hypot(p[3 * v] - foot[0], p[3 * v + 1] - foot[1]))) * 1.05 +
    BED_TOLERANCE_MM;
  const seen = new Set<number>(rim.walls);
  const queue = [...seen];
  const upper = new Set<number>();
  let whole = true;
  for (let at = 0; at < queue.length; at++) {
    const facet = queue[at];
    for (let k = 0; k < 3; k++) {
      const v = index[3 * facet + k];
      const away = Math.hypot(p[3 * v] - foot[0], p[3 * v + 1] - foot[1]);
      if (away > widest + MOST_LEAN * Math.abs(p[3 * v + 2] - foot[2])) return null;
      const other = neighbourOver(edges, facet, k);
      if (other < 0) whole = false;
      if (other < 0 || facets.bed[other] || seen.has(other)) continue;
      if (foot[2] > BED_TOLERANCE_MM && isCeiling(mesh, facets, other, foot[2])) continue;
      if (isFloor(mesh, facets, other)) {
        upper.add(v);
        upper.add(index[3 * facet + ((k + 1) % 3)]);
        continue;
      }
      if (queue.length >= MOST_FACETS) return null;
      seen.add(other);
      queue.push(other);
    }
  }
  const through = upper.size > 0;
  const head = !through ? foot : whole ? middleOf(p, [...upper]) : centreOf(p, [...upper]);
  const top = Math.max(0, ...[...upper].map((v) => p[3 * v + 2]));
  const deep = top - foot[2];
  if (!(deep > BED_TOLERANCE_MM)) return null;
  const lean: [number, number] = [(head[0] - foot[0]) / deep, (head[1] - foot[1]) / deep];
  const away = (v: number) => {
    const up = p[3 * v + 2] - foot[2];
    return Math.hypot(p[3 * v] - foot[0] - lean[0] * up, p[3 * v + 1] - foot[1] - lean[1] * up);
  };
  for (const facet of queue) for (let k = 0; k < 3; k++) if (away(index[3 * facet + k]) > widest) return null;
  const narrow = narrowest(mesh, queue, away);
  return {
    x: head[0],
    y: head[1],
    top,
    diameter: narrow.diameter,
    area: narrow.area,
    facets: queue,
    through,
  };
}

/** Faces up; or has no area and lies level, as a triangulation leaves behind between bores in a row. */
function isFloor(mesh: Mesh, facets: Facets, t: number): boolean {
  return facets.area[t] > 0 ? facets.nz[t] > FLOOR_NZ : isLevel(mesh, t);
}

/** Faces down, or has no area and lies level at the height of the foot. */
function isCeiling(mesh: Mesh, facets: Facets, t: number, z: number): boolean {
  if (facets.area[t] > 0) return facets.nz[t] < -FLOOR_NZ;
  return isLevel(mesh, t) && Math.abs(mesh.position[3 * mesh.index[3 * t] + 2] - z) <= BED_TOLERANCE_MM;
}

function isLevel(mesh: Mesh, t: number): boolean {
  const [a, b, c] = [0, 1, 2].map((k) => mesh.position[3 * mesh.index[3 * t + k] + 2]);
  return Math.max(a, b, c) - Math.min(a, b, c) <= BED_TOLERANCE_MM;
}

/** Centre of the circle through corners of which some may be missing, by least squares (I. Kåsa, 1976; from memory). */
function centreOf(p: Float64Array, vertices: readonly number[]): [number, number, number] {
  const [mx, my, mz] = middleOf(p, vertices);
  let [xx, xy, yy, xr, yr] = [0, 0, 0, 0, 0];
  for (const v of vertices) {
    const [x, y] = [p[3 * v] - mx, p[3 * v + 1] - my];
    const square = x * x + y * y;
    xx += x * x;
    xy += x * y;
    yy += y * y;
    xr += x * square;
    yr += y * square;
  }
  const across = 2 * (xx * yy - xy * xy);
  if (!(across > 0)) return [mx, my, mz];
  return [mx + (yy * xr - xy * yr) / across, my + (xx * yr - xy * xr) / across, mz];
}

function middleOf(p: Float64Array, vertices: readonly number[]): [number, number, number] {
  const sum: [number, number, number] = [0, 0, 0];
  for (const v of vertices) for (let k = 0; k < 3; k++) sum[k] += p[3 * v + k] / vertices.length;
  return sum;
}

/** Circle through the bore's corners, level by level; the narrowest counts. */
function narrowest(
  mesh: Mesh,
  facets: number[],
  away: (v: number) => number,
): { diameter: number; area: number } {
  const { position: p, index } = mesh;
  const levels = new Map<number, Map<number, number>>();
  for (const facet of facets) {
    for (let k = 0; k < 3; k++) {
      const v = index[3 * facet + k];
      const key = Math.round(p[3 * v + 2] * 100);
      const level = levels.get(key) ?? new Map<number, number>();
      level.set(v, away(v));
      levels.set(key, level);
    }
  }
  let least = Infinity;
  let corners = 0;
  for (const level of levels.values()) {
    // Fewer than three corners at a level are stray points of a long facet, not a section.
    if (level.size < 3) continue;
    const radii = Array.from(level.values());
    const inner = Math.min(...radii);
    const ring = radii.filter((r) => r < inner * 1.2 + 0.01);
    const mean = ring.reduce((sum, r) => sum + r, 0) / ring.length;
    if (mean >= least) continue;
    least = mean;
    corners = ring.length;
  }
  const area = (corners / 2) * least * least * Math.sin((2 * Math.PI) / Math.max(corners, 3));
  return { diameter: 2 * least, area };
}
