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
    const a = edges.facetA[e];
    const b = edges.facetB[e];
    if (b < 0 || facets.bed[a] || facets.bed[b] || bore[a] || bore[b]) continue;
    if (facets.area[a] === 0 || facets.area[b] === 0) continue;
    const cos = facets.nx[a] * facets.nx[b] + facets.ny[a] * facets.ny[b] + facets.nz[a] * facets.nz[b];
    if (cos > flat || (visibility.visible[a] < 0.5 && visibility.visible[b] < 0.5)) continue;
    const fold = measureFold(mesh, facets, edges, e);
    if (fold.width < LEAST_FACE_MM) continue;
    const kind = fold.convex ? 'convex' : 'concave';
    if (cos < sharp) {
      sums[kind] += fold.length;
      radius[kind] = 0;
      longest.push({ at: fold.middle, length: fold.length });
      if (longest.length > 400) keepLongest(longest);
    } else {
      const theta = Math.acos(cos);
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
  convex: boolean;
  length: number;
  width: number;
  middle: [number, number, number];
}

function measureFold(mesh: Mesh, facets: Facets, edges: Edges, e: number): Fold {
  const { position: p } = mesh;
  const a = edges.facetA[e];
  const b = edges.facetB[e];
  const i = edges.low[e] * 3;
  const j = edges.high[e] * 3;
  const length = Math.hypot(p[j] - p[i], p[j + 1] - p[i + 1], p[j + 2] - p[i + 2]);
  const apex = apexOf(mesh, b, edges.low[e], edges.high[e]) * 3;
  const above =
    facets.nx[a] * (p[apex] - p[i]) +
    facets.ny[a] * (p[apex + 1] - p[i + 1]) +
    facets.nz[a] * (p[apex + 2] - p[i + 2]);
  return {
    convex: above < 0,
    length,
    width: (2 * Math.min(facets.area[a], facets.area[b])) / length,
    middle: [(p[i] + p[j]) / 2, (p[i + 1] + p[j + 1]) / 2, (p[i + 2] + p[j + 2]) / 2],
  };
}

function apexOf(mesh: Mesh, facet: number, low: number, high: number): number {
  for (let k = 0; k < 3; k++) {
    const v = mesh.index[3 * facet + k];
    if (v !== low && v !== high) return v;
  }
  return low;
}
