import { buildBoxTree, visitPairs } from './box-tree';
import type { Candidates } from './choose-candidates';
import { facetBoxes } from './facet-boxes';
import { facetDistanceSquared } from './facet-distance';
import type { Shells } from './find-shells';
import type { Mesh } from './mesh';
import { sharedVertices } from './shared-vertices';

/** Facet pairs beyond this number are not listed; that there are more is known all the same. */
const MOST_LISTED = 20_000;
/** Facet pairs of near boxes that are looked at, for each facet, before the search gives up: a heap, not a body. */
export const MOST_PAIRS_PER_FACET = 30;
/** So it does after so many crossings. */
const MOST_CROSSINGS = 300_000;
/** Small meshes may use up more for each. */
export const LEAST_PAIRS = 1e6;

/** Where facets go through one another by more than rounding, and where shells touch. */
export interface Meetings {
  /** Facet, facet of each crossing inside one shell; `crossingAt` holds 3 coordinates each. */
  own: MeetingList;
  /** Crossings of two shells. */
  between: MeetingList;
  /** Contacts of two shells that nowhere cross. */
  touching: MeetingList;
  /** Pairs of shells (lower × shells + higher) that cross or touch. */
  joined: Set<number>;
  /** False where the search gave up, or the choice of facets did. */
  complete: boolean;
}

export interface MeetingList {
  facets: number[];
  at: number[];
}

/**
 * Looks at every pair of near facets among those given. A crossing goes deeper than `tolerance` on both sides and is
 * longer than it; a contact of two shells is nearer than it.
 * @param crowded some edges have more than two facets: bodies may be welded face to face
 */
export function findMeetings(
  mesh: Mesh,
  shells: Shells,
  { facets, apart, complete }: Candidates,
  tolerance: number,
  crowded: boolean,
): Meetings {
  const { index, position: p } = mesh;
  const { ofFacet, count } = shells;
  const found: Meetings = {
    own: emptyList(),
    between: emptyList(),
    touching: emptyList(),
    joined: new Set(),
    complete: true,
  };
  const crossed = new Set<number>();
  const tree = buildBoxTree(facetBoxes(index, p, facets), apart ? (i) => ofFacet[facets[i]] : undefined);
  const most = LEAST_PAIRS + MOST_PAIRS_PER_FACET * facets.length;
  let pairs = 0;
  let crossings = 0;
  const searched = visitPairs(tree, count > 1 ? tolerance : 0, (i, j) => {
    if (++pairs > most) return false;
    const [f, g] = [facets[i], facets[j]];
    const shared = sharedVertices(index, f, g).count;
    if (shared > 1) {
      if (crowded && liesOnBack(p, index, f, g))
        note(found.touching, f, g, nearMiddle(p, cornersOf(index, f), cornersOf(index, g)));
      return true;
    }
    const [s, t] = [ofFacet[f], ofFacet[g]];
    const depth = crossingDepth(p, index, f, g, tolerance);
    if (depth < 0) return true;
    if (depth > 0) {
      if (++crossings > MOST_CROSSINGS) return false;
      note(s === t ? found.own : found.between, f, g, middle);
      if (s !== t) crossed.add(pairKey(s, t, count));
    } else if (s !== t) {
      const key = pairKey(s, t, count);
      const one = cornersOf(index, f);
      const other = cornersOf(index, g);
      if (crossed.has(key) || facetDistanceSquared(p, one, other) > tolerance * tolerance) return true;
      found.joined.add(key);
      note(found.touching, f, g, nearMiddle(p, one, other));
    }
    return true;
  });
  found.complete = complete && searched;
  found.touching = withoutCrossed(found.touching, ofFacet, count, crossed);
  for (const key of crossed) found.joined.add(key);
  return found;
}

export function pairKey(s: number, t: number, count: number): number {
  return s < t ? s * count + t : t * count + s;
}

function cornersOf(index: Uint32Array, t: number): [number, number, number] {
  return [3 * index[3 * t], 3 * index[3 * t + 1], 3 * index[3 * t + 2]];
}

/** Two facets with a common edge that face one another, one lying on the other: the wall between welded bodies. */
function liesOnBack(p: Float64Array, index: Uint32Array, f: number, g: number): boolean {
  const n = [0, 0, 0];
  const m = [0, 0, 0];
  normalInto(p, ...cornersOf(index, f), n);
  normalInto(p, ...cornersOf(index, g), m);
  const dot = n[0] * m[0] + n[1] * m[1] + n[2] * m[2];
  return dot < -0.999999 * Math.hypot(n[0], n[1], n[2]) * Math.hypot(m[0], m[1], m[2]);
}

function emptyList(): MeetingList {
  return { facets: [], at: [] };
}

function note(list: MeetingList, f: number, g: number, at: ArrayLike<number>): void {
  if (list.facets.length >= 2 * MOST_LISTED) return;
  list.facets.push(f, g);
  list.at.push(at[0], at[1], at[2]);
}

function withoutCrossed(
  list: MeetingList,
  ofFacet: Uint32Array,
  count: number,
  crossed: Set<number>,
): MeetingList {
  const kept = emptyList();
  for (let k = 0; 2 * k < list.facets.length; k++) {
    const [f, g] = [list.facets[2 * k], list.facets[2 * k + 1]];
    if (!crossed.has(pairKey(ofFacet[f], ofFacet[g], count)))
      note(kept, f, g, list.at.slice(3 * k, 3 * k + 3));
  }
  return kept;
}

/** Middle of where the boxes of two facets meet. */
function nearMiddle(p: Float64Array, f: readonly number[], g: readonly number[]): number[] {
  return [0, 1, 2].map((k) => {
    const low = Math.max(
      Math.min(p[f[0] + k], p[f[1] + k], p[f[2] + k]),
      Math.min(p[g[0] + k], p[g[1] + k], p[g[2] + k]),
    );
    const high = Math.min(
      Math.max(p[f[0] + k], p[f[1] + k], p[f[2] + k]),
      Math.max(p[g[0] + k], p[g[1] + k], p[g[2] + k]),
    );
    return (low + high) / 2;
  });
}

const middle = new Float64Array(3);
const sideF = new Float64Array(3);
const sideG = new Float64Array(3);

/**
 * How deep two facets go through one another, 0 where they do not, −1 where a plane parts them; leaves the middle of the common segment in `middle`. Depth is
 * the least way by which either facet's corners lie on both sides of the other's plane.
 */
function crossingDepth(p: Float64Array, index: Uint32Array, f: number, g: number, tolerance: number): number {
  const deepG = straddle(p, index, f, g, sideG, tolerance);
  if (deepG < 0) return -1;
  const deepF = straddle(p, index, g, f, sideF, tolerance);
  if (deepF < 0) return -1;
  if (!(deepG > tolerance && deepF > tolerance)) return 0;
  const [a, b, c] = [3 * index[3 * f], 3 * index[3 * f + 1], 3 * index[3 * f + 2]];
  const [d, e, h] = [3 * index[3 * g], 3 * index[3 * g + 1], 3 * index[3 * g + 2]];
  const n = [0, 0, 0];
  const m = [0, 0, 0];
  normalInto(p, a, b, c, n);
  normalInto(p, d, e, h, m);
  const line = [n[1] * m[2] - n[2] * m[1], n[2] * m[0] - n[0] * m[2], n[0] * m[1] - n[1] * m[0]];
  const length = Math.hypot(line[0], line[1], line[2]);
  if (!(length > 0)) return 0;
  for (let k = 0; k < 3; k++) line[k] /= length;
  const one = interval(p, [a, b, c], sideF, line);
  const two = interval(p, [d, e, h], sideG, line);
  const from = one[0] > two[0] ? one : two;
  const to = one[1] < two[1] ? one : two;
  if (!(to[1] - from[0] > tolerance)) return 0;
  for (let k = 0; k < 3; k++) middle[k] = (from[2 + k] + to[5 + k]) / 2;
  return Math.min(deepF, deepG);
}

/** Signed distances of g's corners from f's plane into `side`; the smaller of what lies on either side, −1 if all is off. */
function straddle(
  p: Float64Array,
  index: Uint32Array,
  f: number,
  g: number,
  side: Float64Array,
  tolerance: number,
): number {
  const a = 3 * index[3 * f];
  const b = 3 * index[3 * f + 1];
  const c = 3 * index[3 * f + 2];
  const ux = p[b] - p[a];
  const uy = p[b + 1] - p[a + 1];
  const uz = p[b + 2] - p[a + 2];
  const vx = p[c] - p[a];
  const vy = p[c + 1] - p[a + 1];
  const vz = p[c + 2] - p[a + 2];
  const nx = uy * vz - uz * vy;
  const ny = uz * vx - ux * vz;
  const nz = ux * vy - uy * vx;
  let above = -Infinity;
  let below = Infinity;
  for (let k = 0; k < 3; k++) {
    const v = 3 * index[3 * g + k];
    const d = nx * (p[v] - p[a]) + ny * (p[v + 1] - p[a + 1]) + nz * (p[v + 2] - p[a + 2]);
    side[k] = d;
    if (d > above) above = d;
    if (d < below) below = d;
  }
  const off = tolerance * Math.sqrt(nx * nx + ny * ny + nz * nz);
  if (above < -off || below > off) return -1;
  const least = above < -below ? above : -below;
  return least > 0 ? (least / off) * tolerance : 0;
}

function normalInto(p: Float64Array, a: number, b: number, c: number, out: number[]): void {
  const [ux, uy, uz] = [p[b] - p[a], p[b + 1] - p[a + 1], p[b + 2] - p[a + 2]];
  const [vx, vy, vz] = [p[c] - p[a], p[c + 1] - p[a + 1], p[c + 2] - p[a + 2]];
  out[0] = uy * vz - uz * vy;
  out[1] = uz * vx - ux * vz;
  out[2] = ux * vy - uy * vx;
}

/** Where a facet's border meets the other's plane: from, to along the line, then the two points. */
function interval(p: Float64Array, corners: number[], side: Float64Array, line: number[]): number[] {
  const out = [Infinity, -Infinity, 0, 0, 0, 0, 0, 0];
  for (let k = 0; k < 3; k++) {
    const n = (k + 1) % 3;
    if (side[k] > 0 === side[n] > 0) continue;
    const t = side[k] / (side[k] - side[n]);
    const at = [0, 1, 2].map((i) => p[corners[k] + i] + t * (p[corners[n] + i] - p[corners[k] + i]));
    const along = at[0] * line[0] + at[1] * line[1] + at[2] * line[2];
    if (along < out[0]) {
      out[0] = along;
      out.splice(2, 3, ...at);
    }
    if (along > out[1]) {
      out[1] = along;
      out.splice(5, 3, ...at);
    }
  }
  return out;
}
