import { neighbourOver, type Edges } from './build-edges';
import { buildBoxTree, visitPairs } from './box-tree';
import { facetBoxes } from './facet-boxes';
import { FacetCover, type CoverBudget } from './facet-cover';
import { FacetCuts } from './facet-cuts';
import { LEAST_PAIRS, MOST_PAIRS_PER_FACET } from './find-meetings';
import { crossesFromVertex, pierceFacets, type Crossing } from './pierce-facets';
import { sharedVertices } from './shared-vertices';
import { WindingProbe } from './winding-probe';

/** More crossings than this are no overlap of bodies but a heap of facets: the columns measure it instead. */
const MOST_CROSSINGS = 400_000;
/** Work on the cut facets before the columns measure instead: a few seconds. */
const MOST_COVER_STEPS = 2e7;
const MOST_COVERED = 1000;
/** Winding not known yet; real windings are far smaller. */
const UNKNOWN = -32768;

export interface Union {
  volumeMm3: number;
  /** Facets that lie wholly inside other solid, up to a thousand. */
  covered: number[];
  /** Area of facets that others cut, mm²: what the tiny shifts can be wrong by, per mm of shift. */
  cutAreaMm2: number;
}

/**
 * Volume of the points with winding number above 0, exactly: it is bounded by those parts of facets that have
 * winding 0 just outside. The winding is carried from facet to facet over their edges, changes by one wherever an
 * edge goes through another facet, and is fixed once for each connected surface by a ray.
 * @param moved positions in general position (perturb-mesh); the volumes themselves are taken from `position`
 * @param facets those that may cross others; the rest must not
 * @param groupOf where given, facets of one group do not cross
 * @returns null where the surface is not closed in the sense of winding, crosses itself too often or at a vertex, or has
 * too many shells over one another
 */
export function measureUnion(
  index: Uint32Array,
  position: Float64Array,
  moved: Float64Array,
  edges: Edges,
  facets: Uint32Array,
  groupOf?: (facet: number) => number,
): Union | null {
  const cuts = findCuts(index, moved, facets, groupOf);
  if (cuts === null) return null;
  const winding = spreadWinding(index, moved, edges, cuts);
  if (winding === null) return null;
  let six = 0;
  const covered: number[] = [];
  let cutArea = 0;
  const budget: CoverBudget = { steps: MOST_COVER_STEPS };
  for (let t = 0; t < index.length / 3; t++) {
    const corners: [number, number, number] = [3 * index[3 * t], 3 * index[3 * t + 1], 3 * index[3 * t + 2]];
    const first = winding[3 * t];
    let share = first === 0 ? 1 : 0;
    if (cuts.head[t] >= 0) {
      const outside = new FacetCover(moved, corners, cuts, t).shareOutside(first, budget);
      if (outside === null) return null;
      share = outside;
      cutArea += areaOf(position, corners);
    } else if (first > 0 && covered.length < MOST_COVERED) covered.push(t);
    if (share > 0) six += share * sixVolumes(position, corners);
  }
  return { volumeMm3: six / 6, covered, cutAreaMm2: cutArea };
}

function findCuts(
  index: Uint32Array,
  p: Float64Array,
  facets: Uint32Array,
  groupOf?: (facet: number) => number,
): FacetCuts | null {
  const cuts = new FacetCuts(index.length / 3);
  const crossing: Crossing = {
    points: new Float64Array(6),
    startEdgeOfA: -1,
    endEdgeOfA: -1,
    startEdgeOfB: -1,
    endEdgeOfB: -1,
  };
  const tree = buildBoxTree(facetBoxes(index, p, facets), groupOf ? (i) => groupOf(facets[i]) : undefined);
  const most = LEAST_PAIRS + MOST_PAIRS_PER_FACET * facets.length;
  let pairs = 0;
  const sound = visitPairs(tree, 0, (i, j) => {
    if (++pairs > most) return false;
    const [f, g] = [facets[i], facets[j]];
    const { count, vertex } = sharedVertices(index, f, g);
    if (count > 1) return true;
    if (count === 1) return !crossesFromVertex(p, index, f, g, vertex);
    const meeting = pierceFacets(p, index, f, g, crossing);
    if (meeting === 'crossing') cuts.add(f, g, crossing);
    return meeting !== 'doubtful' && cuts.count <= 2 * MOST_CROSSINGS;
  });
  return sound ? cuts : null;
}

/** Winding just outside every facet at its corners; null where going round comes back with another number, or is not known. */
function spreadWinding(
  index: Uint32Array,
  p: Float64Array,
  edges: Edges,
  cuts: FacetCuts,
): Int16Array | null {
  const triangles = index.length / 3;
  const winding = new Int16Array(index.length).fill(UNKNOWN);
  const queue = new Int32Array(triangles);
  const probe = new WindingProbe(index, p);
  for (let seed = 0; seed < triangles; seed++) {
    if (winding[3 * seed] !== UNKNOWN) continue;
    let end = 1;
    queue[0] = seed;
    if (!fillCorners(winding, cuts, seed, 0, 0)) return null;
    let flattest = seed;
    let most = -1;
    for (let at = 0; at < end; at++) {
      const t = queue[at];
      const lies = Math.abs(planArea(index, p, t));
      if (lies > most) {
        most = lies;
        flattest = t;
      }
      for (let side = 0; side < 3; side++) {
        const n = neighbourOver(edges, t, side);
        if (n < 0) continue;
        const vertex = index[3 * t + side];
        const corner = index[3 * n] === vertex ? 0 : index[3 * n + 1] === vertex ? 1 : 2;
        const here = winding[3 * t + side];
        if (winding[3 * n + corner] === UNKNOWN) {
          if (!fillCorners(winding, cuts, n, corner, here)) return null;
          queue[end++] = n;
        } else if (winding[3 * n + corner] !== here) return null;
      }
    }
    const shift = probeWinding(index, p, cuts, probe, flattest, winding[3 * flattest]);
    if (Number.isNaN(shift)) return null;
    for (let at = 0; at < end; at++) for (let k = 0; k < 3; k++) winding[3 * queue[at] + k] += shift;
  }
  return winding;
}

function fillCorners(
  winding: Int16Array,
  cuts: FacetCuts,
  t: number,
  corner: number,
  value: number,
): boolean {
  let here = value;
  for (let k = corner; k < corner + 3; k++) {
    winding[3 * t + (k % 3)] = here;
    if (cuts.head[t] >= 0) here += cuts.jumpAlong(t, k % 3);
  }
  return here === value;
}

/** What must be added to a relative winding: true winding just outside the facet's middle, by a ray away from it. */
function probeWinding(
  index: Uint32Array,
  p: Float64Array,
  cuts: FacetCuts,
  probe: WindingProbe,
  t: number,
  first: number,
): number {
  const corners: [number, number, number] = [3 * index[3 * t], 3 * index[3 * t + 1], 3 * index[3 * t + 2]];
  const middle = [0, 1, 2].map((k) => (p[corners[0] + k] + p[corners[1] + k] + p[corners[2] + k]) / 3);
  const up = planArea(index, p, t) > 0;
  const there = probe.windingAt(middle[0], middle[1], middle[2], up, (facet) => facet !== t);
  const here = cuts.head[t] < 0 ? first : new FacetCover(p, corners, cuts, t).windingAtMiddle(first);
  return there - here;
}

function planArea(index: Uint32Array, p: Float64Array, t: number): number {
  const [a, b, c] = [3 * index[3 * t], 3 * index[3 * t + 1], 3 * index[3 * t + 2]];
  return (p[b] - p[a]) * (p[c + 1] - p[a + 1]) - (p[b + 1] - p[a + 1]) * (p[c] - p[a]);
}

function areaOf(p: Float64Array, [a, b, c]: readonly [number, number, number]): number {
  const [ux, uy, uz] = [p[b] - p[a], p[b + 1] - p[a + 1], p[b + 2] - p[a + 2]];
  const [vx, vy, vz] = [p[c] - p[a], p[c + 1] - p[a + 1], p[c + 2] - p[a + 2]];
  return Math.hypot(uy * vz - uz * vy, uz * vx - ux * vz, ux * vy - uy * vx) / 2;
}

function sixVolumes(p: Float64Array, [a, b, c]: readonly [number, number, number]): number {
  return (
    p[a] * (p[b + 1] * p[c + 2] - p[b + 2] * p[c + 1]) +
    p[a + 1] * (p[b + 2] * p[c] - p[b] * p[c + 2]) +
    p[a + 2] * (p[b] * p[c + 1] - p[b + 1] * p[c])
  );
}
