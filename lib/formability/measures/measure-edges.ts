import type { Edges } from '../mesh/build-edges';
import type { Facets } from '../mesh/measure-facets';
import type { Mesh } from '../mesh/mesh';
import type { EdgesReport } from '../report';
import type { Visibility } from './visibility';

/** A fold of more than this is an edge, less is a strip of a rounded one. */
const SHARP_DEG = 40;
const FLAT_DEG = 3;
/** Facets narrower than this beside a fold are layer steps or mesh noise, not the faces of an edge. */
const LEAST_FACE_MM = 0.35;
const MOST_PLACES = 12;

/**
 * Sharp edges and inside corners that the sheet meets, by the fold between two facets; and the least radius of rounded
 * ones: a strip of width w that folds by θ to its neighbours lies on a circle of radius w / (2 sin(θ/2)).
 */
export function measureEdges(
  mesh: Mesh,
  facets: Facets,
  edges: Edges,
  visibility: Visibility,
  bore: Uint8Array,
): EdgesReport {
  const sums = { convex: 0, concave: 0 };
  const radius = { convex: Infinity, concave: Infinity };
  const longest: { at: [number, number, number]; length: number }[] = [];
  const sharp = Math.cos((SHARP_DEG * Math.PI) / 180);
  const flat = Math.cos((FLAT_DEG * Math.PI) / 180);
  for (let e = 0; e < edges.count; e++) {
    const [a, b] = [edges.facetA[e], edges.facetB[e]];
    if (b < 0 || facets.bed[a] || facets.bed[b] || bore[a] || bore[b]) continue;
    if (visibility.visible[a] < 0.5 && visibility.visible[b] < 0.5) continue;
    const fold = measureFold(mesh, facets, edges, e);
    if (!fold || fold.cos > flat || fold.width < LEAST_FACE_MM) continue;
    const kind = fold.convex ? 'convex' : 'concave';
    if (fold.cos < sharp) {
      sums[kind] += fold.length;
      radius[kind] = 0;
      longest.push({ at: fold.middle, length: fold.length });
      if (longest.length > 400) keepLongest(longest);
    } else {
      const theta = Math.acos(fold.cos);
      radius[kind] = Math.min(radius[kind], fold.width / (2 * Math.sin(theta / 2)));
    }
  }
  keepLongest(longest);
  return {
    sharpConvexMm: sums.convex,
    sharpConcaveMm: sums.concave,
    minConvexRadiusMm: radius.convex === Infinity ? null : radius.convex,
    minConcaveRadiusMm: radius.concave === Infinity ? null : radius.concave,
    places: longest.map(({ at, length }) => ({ at, areaMm2: length })),
  };
}

function keepLongest(list: { length: number }[]): void {
  list.sort((a, b) => b.length - a.length);
  list.length = Math.min(list.length, MOST_PLACES);
}

interface Fold {
  cos: number;
  convex: boolean;
  length: number;
  width: number;
  middle: [number, number, number];
}

function measureFold(mesh: Mesh, facets: Facets, edges: Edges, e: number): Fold | null {
  const { position: p } = mesh;
  const [a, b] = [edges.facetA[e], edges.facetB[e]];
  if (facets.area[a] === 0 || facets.area[b] === 0) return null;
  const i = edges.low[e] * 3;
  const j = edges.high[e] * 3;
  const length = Math.hypot(p[j] - p[i], p[j + 1] - p[i + 1], p[j + 2] - p[i + 2]);
  const width = (2 * Math.min(facets.area[a], facets.area[b])) / length;
  const n = normal(mesh, a);
  const m = normal(mesh, b);
  const cos = n[0] * m[0] + n[1] * m[1] + n[2] * m[2];
  const apex = apexOf(mesh, b, edges.low[e], edges.high[e]) * 3;
  const above = n[0] * (p[apex] - p[i]) + n[1] * (p[apex + 1] - p[i + 1]) + n[2] * (p[apex + 2] - p[i + 2]);
  const middle: [number, number, number] = [
    (p[i] + p[j]) / 2,
    (p[i + 1] + p[j + 1]) / 2,
    (p[i + 2] + p[j + 2]) / 2,
  ];
  return { cos, convex: above < 0, length, width, middle };
}

function apexOf(mesh: Mesh, facet: number, low: number, high: number): number {
  for (let k = 0; k < 3; k++) {
    const v = mesh.index[3 * facet + k];
    if (v !== low && v !== high) return v;
  }
  return low;
}

function normal(mesh: Mesh, t: number): [number, number, number] {
  const { index, position: p } = mesh;
  const [a, b, d] = [index[3 * t] * 3, index[3 * t + 1] * 3, index[3 * t + 2] * 3];
  const [ux, uy, uz] = [p[b] - p[a], p[b + 1] - p[a + 1], p[b + 2] - p[a + 2]];
  const [vx, vy, vz] = [p[d] - p[a], p[d + 1] - p[a + 1], p[d + 2] - p[a + 2]];
  const [x, y, z] = [uy * vz - uz * vy, uz * vx - ux * vz, ux * vy - uy * vx];
  const length = Math.sqrt(x * x + y * y + z * z);
  return [x / length, y / length, z / length];
}
