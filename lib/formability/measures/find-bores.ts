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
export function findBores(mesh: Mesh, facets: Facets, edges: Edges): Bore[] {
  const rims = bedRims(mesh, facets, edges);
  const bores: Bore[] = [];
  for (const rim of rims) {
    const bore = climb(mesh, facets, edges, rim);
    if (bore && bore.through && bore.diameter <= VENT_MM + VENT_SLACK_MM) bores.push(bore);
  }
  return bores.sort((a, b) => a.x - b.x || a.y - b.y);
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

function climb(mesh: Mesh, facets: Facets, edges: Edges, rim: Rim): Bore | null {
  const { position: p, index } = mesh;
  const n = rim.vertices.length;
  const x = rim.vertices.reduce((sum, v) => sum + p[3 * v], 0) / n;
  const y = rim.vertices.reduce((sum, v) => sum + p[3 * v + 1], 0) / n;
  const away = (v: number) => Math.hypot(p[3 * v] - x, p[3 * v + 1] - y);
  const widest = Math.max(...rim.vertices.map(away)) * 1.05 + BED_TOLERANCE_MM;
  const seen = new Set<number>(rim.walls);
  const queue = [...seen];
  let top = 0;
  let through = false;
  for (let at = 0; at < queue.length; at++) {
    const facet = queue[at];
    for (let k = 0; k < 3; k++) {
      const v = index[3 * facet + k];
      if (away(v) > widest) return null;
      if (p[3 * v + 2] > top) top = p[3 * v + 2];
      const other = neighbourOver(edges, facet, k);
      if (other < 0) return null;
      if (facets.bed[other] || seen.has(other)) continue;
      if (facets.nz[other] > FLOOR_NZ) {
        through = true;
        continue;
      }
      seen.add(other);
      queue.push(other);
    }
  }
  const narrow = narrowest(mesh, queue, x, y);
  return { x, y, top, diameter: narrow.diameter, area: narrow.area, facets: queue, through };
}

/** Circle through the bore's corners, level by level; the narrowest counts. */
function narrowest(mesh: Mesh, facets: number[], x: number, y: number): { diameter: number; area: number } {
  const { position: p, index } = mesh;
  const levels = new Map<number, Map<number, number>>();
  for (const facet of facets) {
    for (let k = 0; k < 3; k++) {
      const v = index[3 * facet + k];
      const key = Math.round(p[3 * v + 2] * 100);
      const level = levels.get(key) ?? new Map<number, number>();
      level.set(v, Math.hypot(p[3 * v] - x, p[3 * v + 1] - y));
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
