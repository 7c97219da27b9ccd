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
  const leaning: number[] = [];
  let area = 0;
  let worst = 0;
  const least = -Math.sin(((limitDeg + 0.01) * Math.PI) / 180);
  for (let t = 0; t < mesh.triangles; t++) {
    if (facets.bed[t] || bore[t] || facets.area[t] === 0 || facets.nz[t] >= 0) continue;
    worst = Math.max(worst, -draftDeg(facets.nz[t]));
    if (facets.nz[t] >= least) continue;
    leaning.push(t);
    area += facets.area[t];
  }
  if (area < LEAST_AREA_MM2) return { areaMm2: 0, worstDeg: worst, places: [] };
  const groups = groupFacets(mesh, facets.area, leaning, 12);
  const places = groups.map(({ at, areaMm2 }) => ({ at, areaMm2 }));
  return { areaMm2: area, worstDeg: worst, places };
}
