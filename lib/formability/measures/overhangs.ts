import type { Facets } from '../mesh/measure-facets';
import type { Mesh } from '../mesh/mesh';
import type { Place } from '../report';
import { groupFacets } from './group-facets';
import { draftDeg } from './thresholds';

/** Overhangs smaller than this print anyway. */
const LEAST_AREA_MM2 = 1;

/** Faces that lean out further from vertical than the limit, cavities included, bores aside. */
export function findOverhangs(
  mesh: Mesh,
  facets: Facets,
  bore: Uint8Array,
  limitDeg: number,
): { areaMm2: number; worstDeg: number; places: Place[] } {
  const leaning = new Uint32Array(mesh.triangles);
  let count = 0;
  let area = 0;
  let steepest = 0;
  const least = -Math.sin(((limitDeg + 0.01) * Math.PI) / 180);
  const { bed, nz, area: areaOf } = facets;
  for (let t = 0; t < leaning.length; t++) {
    if (nz[t] >= 0 || bed[t] || bore[t] || areaOf[t] === 0) continue;
    if (nz[t] < steepest) steepest = nz[t];
    if (nz[t] >= least) continue;
    leaning[count++] = t;
    area += areaOf[t];
  }
  const worst = Math.max(0, -draftDeg(steepest));
  if (area < LEAST_AREA_MM2) return { areaMm2: 0, worstDeg: worst, places: [] };
  const groups = groupFacets(mesh, areaOf, leaning.subarray(0, count), 12);
  const places = groups.map(({ at, areaMm2 }) => ({ at, areaMm2 }));
  return { areaMm2: area, worstDeg: worst, places };
}
