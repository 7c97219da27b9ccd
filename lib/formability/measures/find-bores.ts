import { neighbourOver, type Edges } from '../mesh/build-edges';
import { BED_TOLERANCE_MM, type Facets } from '../mesh/measure-facets';
import type { Mesh } from '../mesh/mesh';

/** Widest bore that is a vent, mm (engine contract), with room for a polygon's corners. */
export const VENT_MM = 3;
const VENT_SLACK_MM = 0.05;
/** A counter-bore from below may be this much wider at the bed (common practice: 2 to 5 mm). */
const MOUTH_MM = 8;
/** Steeper than this, facing up, is the wall of a bore; flatter is the floor of the pit round it. */
const FLOOR_NZ = 0.5;
/** A bore may lean by up to 45°, and have so many facets. */
const MOST_LEAN = 1;
const MOST_FACETS = 20_000;

/** A narrow bore from the bed up through the part, found on the mesh, however narrow against a grid cell. */
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
 * Bores start at holes in the bed face: loops of edges between a bed facet and a wall facet, as wide as a vent or
 * its counter-bore. From there the walls are followed up to facets that face up.
 */
export function findBores(mesh: Mesh, measured: Facets, edges: Edges): Bore[] {
  const facets = { ...measured, bed: withNeedles(mesh, measured) };
  const rims = bedRims(mesh, facets, edges);
  const bores: Bore[] = [];
  for (const rim of rims) {
    const bore = climb(mesh, facets, edges, rim);
    if (bore && bore.through && bore.diameter <= VENT_MM + VENT_SLACK_MM) bores.push(bore);
  }
  return bores.sort((a, b) => a.x - b.x || a.y - b.y);
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

/** Loops of the bed face's inner edges that are small enough. */
function bedRims(mesh: Mesh, facets: Facets, edges: Edges): Rim[] {
  const after = new Map<number, { to: number; wall: number }>();
  for (let e = 0; e < edges.count; e++) {
    const [a, b] = [edges.facetA[e], edges.facetB[e]];
    if (b < 0 || facets.bed[a] === facets.bed[b]) continue;
    const bed = facets.bed[a] ? a : b;
    const [from, to] = runsForward(mesh, bed, edges.low[e], edges.high[e])
      ? [edges.low[e], edges.high[e]]
      : [edges.high[e], edges.low[e]];
    after.set(from, { to, wall: bed === a ? b : a });
  }
  const rims: Rim[] = [];
  const seen = new Set<number>();
  for (const first of after.keys()) {
    if (seen.has(first)) continue;
    const rim: Rim = { vertices: [], walls: [] };
    for (let v = first; !seen.has(v);) {
      seen.add(v);
      const step = after.get(v);
      if (!step) break;
      rim.vertices.push(v);
      rim.walls.push(step.wall);
      v = step.to;
    }
    // Bed facets face down, so seen from above an outer rim runs clockwise and a hole the other way.
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
 * Follows the walls up from the bed. The axis runs from the middle of the lower rim to that of the upper one, so a bore
 * may lean; every wall must stay as near to it as the lower rim is.
 */
function climb(mesh: Mesh, facets: Facets, edges: Edges, rim: Rim): Bore | null {
  const { position: p, index } = mesh;
  const foot = middleOf(mesh, rim.vertices);
  const widest =
    Math.max(...rim.vertices.map((v) => Math.hypot(p[3 * v] - foot[0], p[3 * v + 1] - foot[1]))) * 1.05 +
    BED_TOLERANCE_MM;
  const seen = new Set<number>(rim.walls);
  const queue = [...seen];
  const upper = new Set<number>();
  for (let at = 0; at < queue.length; at++) {
    const facet = queue[at];
    for (let k = 0; k < 3; k++) {
      const v = index[3 * facet + k];
      const away = Math.hypot(p[3 * v] - foot[0], p[3 * v + 1] - foot[1]);
      if (away > widest + MOST_LEAN * p[3 * v + 2]) return null;
      const other = neighbourOver(edges, facet, k);
      if (other < 0) return null;
      if (facets.bed[other] || seen.has(other)) continue;
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
  const head = through ? middleOf(mesh, [...upper]) : foot;
  const top = Math.max(0, ...[...upper].map((v) => p[3 * v + 2]));
  if (!(top > 0)) return null;
  const lean: [number, number] = [(head[0] - foot[0]) / top, (head[1] - foot[1]) / top];
  const away = (v: number) =>
    Math.hypot(p[3 * v] - foot[0] - lean[0] * p[3 * v + 2], p[3 * v + 1] - foot[1] - lean[1] * p[3 * v + 2]);
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
  if (facets.area[t] > 0) return facets.nz[t] > FLOOR_NZ;
  const [a, b, c] = [0, 1, 2].map((k) => mesh.position[3 * mesh.index[3 * t + k] + 2]);
  return Math.max(a, b, c) - Math.min(a, b, c) <= BED_TOLERANCE_MM;
}

function middleOf({ position: p }: Mesh, vertices: readonly number[]): [number, number] {
  const n = vertices.length;
  return [
    vertices.reduce((sum, v) => sum + p[3 * v], 0) / n,
    vertices.reduce((sum, v) => sum + p[3 * v + 1], 0) / n,
  ];
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
