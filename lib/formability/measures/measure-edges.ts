import type { Edges } from '../mesh/build-edges';
import type { Facets } from '../mesh/measure-facets';
import type { Mesh } from '../mesh/mesh';
import type { EdgesReport } from '../report-walls';
import { chainEdges, type FoundEdge } from './chain-edges';
import { FoldWalker } from './fold-walker';
import type { Visibility } from './visibility';

/** A fold of more than this is an edge, less is a strip of a rounded one. */
const SHARP_DEG = 40;
const FLAT_DEG = 3;
/** Faces, or rounded runs of strips, narrower than this are layer steps or mesh noise. */
const LEAST_FACE_MM = 0.35;
/** A run of narrow strips rounds an edge where it turns by this much. */
const LEAST_TURN = Math.PI / 6;
const MOST_PLACES = 12;
/** More runs than this are not walked: the surface is rough all over. */
const MOST_WALKS = 300_000;

/**
 * Edges and inside corners that the sheet meets, by the fold between two facets: sharp ones (radius 0), and the least
 * radius of rounded ones, where a strip of width w that folds by θ lies on a circle of radius w / (2 sin(θ/2)). Narrow
 * strips count as a run that turns one way throughout. Edges on the bed, in bores and in cavities are left out.
 * @param belowMm edges of a smaller radius than this are drawn as lines
 */
export function measureEdges(
  mesh: Mesh,
  facets: Facets,
  edges: Edges,
  visibility: Visibility,
  bore: Uint8Array,
  belowMm: number,
): EdgesReport {
  const sums = { convex: 0, concave: 0 };
  const least = { convex: Infinity, concave: Infinity };
  const found: FoundEdge[] = [];
  const walker = new FoldWalker(mesh, facets, edges);
  const sharp = Math.cos((SHARP_DEG * Math.PI) / 180);
  const flat = Math.cos((FLAT_DEG * Math.PI) / 180);
  let walks = 0;
  const { nx, ny, nz, bed } = facets;
  const { count, facetA, facetB } = edges;
  for (let e = 0; e < count; e++) {
    const a = facetA[e];
    const b = facetB[e];
    if (b < 0) continue;
    // Most edges of a fine mesh end here.
    const cos = nx[a] * nx[b] + ny[a] * ny[b] + nz[a] * nz[b];
    if (cos > flat || bed[a] || bed[b] || bore[a] || bore[b]) continue;
    if (facets.area[a] === 0 || facets.area[b] === 0) continue;
    if (visibility.visible[a] < 0.5 && visibility.visible[b] < 0.5) continue;
    const length = walker.length(e);
    const convex = walker.isConvex(e);
    const kind = convex ? 'convex' : 'concave';
    if (cos < sharp) {
      const wideA = walker.faceWidth(a, e, LEAST_FACE_MM) >= LEAST_FACE_MM;
      const wideB = walker.faceWidth(b, e, LEAST_FACE_MM) >= LEAST_FACE_MM;
      if (!wideA && !wideB) continue;
      // A wide and a narrow face: the rim of a top over layer steps, but not one step of a shallow slope.
      if (wideA !== wideB && !walker.endsSteps(e, wideA ? b : a, convex, LEAST_FACE_MM)) continue;
      sums[kind] += length;
      least[kind] = 0;
      found.push({ edge: e, kind, radiusMm: 0, length });
      continue;
    }
    const theta = Math.acos(cos);
    const width = (2 * Math.min(facets.area[a], facets.area[b])) / length;
    const radius = width / (2 * Math.sin(theta / 2));
    if (radius >= least[kind] && radius >= belowMm) continue;
    if (walks++ > MOST_WALKS) break;
    const run = walker.run(e, convex, theta, width);
    if (width < LEAST_FACE_MM && (run.width < LEAST_FACE_MM || run.turn < LEAST_TURN)) continue;
    least[kind] = Math.min(least[kind], radius);
    // One line along the middle of the rounding.
    if (radius < belowMm && Math.abs(run.before - run.after) <= theta * 1.01) {
      found.push({ edge: e, kind, radiusMm: radius, length });
    }
  }
  const longest = found.filter(({ radiusMm }) => radiusMm === 0).sort((p, q) => q.length - p.length || p.edge - q.edge); // prettier-ignore
  return {
    sharpConvexMm: sums.convex,
    sharpConcaveMm: sums.concave,
    minConvexRadiusMm: least.convex === Infinity ? null : least.convex,
    minConcaveRadiusMm: least.concave === Infinity ? null : least.concave,
    places: longest
      .slice(0, MOST_PLACES)
      .map(({ edge, length }) => ({ at: walker.middle(edge), areaMm2: length })),
    lines: chainEdges(mesh, edges, found),
  };
}
