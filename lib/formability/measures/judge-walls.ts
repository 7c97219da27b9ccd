import type { Facets } from '../mesh/measure-facets';
import type { Mesh } from '../mesh/mesh';
import type { DraftRegion } from '../report';
import { groupFacets } from './group-facets';
import type { Visibility } from './visibility';

/** Share of the walls' area that may lie below a limit unnoticed: slivers of a tessellation. */
const SLIVER_SHARE = 0.001;
const LEAST_AREA_MM2 = 0.5;
/** Facets lower than this may be layer steps; the wall is then judged at a larger scale. */
const STEP_MM = 1;
const WALL_DEG = 60;
/** A face that leans out further is the ceiling of an undercut, not a wall. */
const LEANS_OUT_DEG = 45;
/** Rounding of a wall that was drawn with exactly the limit. */
const ROUNDING_DEG = 0.01;
const BINS_A_DEG = 100;
const MOST_REGIONS = 24;

/** The walls that the sheet touches, judged for draft. */
export interface WallJudgement {
  /** Draft that more than slivers lie below; null where there are no walls. */
  facetDeg: number | null;
  /** True where nearly all that is steep is lower than 1 mm: steps or noise, not walls. */
  stepped: boolean;
  areaBelowMm2: number;
  wallAreaMm2: number;
  /** Connected facets below the limit, the largest first. */
  regions: DraftRegion[];
  /** Height of the facets below the limit, for the width that more draft takes. */
  heightMm: number;
}

/** Facets that the sheet touches, bores and cavities aside, with −45° ≤ draft < limit: a wall is one either side of 0°. */
export function judgeWalls(
  mesh: Mesh,
  facets: Facets,
  draft: Float32Array,
  visibility: Visibility,
  bore: Uint8Array,
  limitDeg: number,
): WallJudgement {
  const steep: number[] = [];
  const bins = Math.ceil((WALL_DEG + LEANS_OUT_DEG) * BINS_A_DEG) + 1;
  const areaIn = new Float64Array(bins);
  const leastIn = new Float64Array(bins).fill(Infinity);
  let wallArea = 0;
  let below = 0;
  let stepArea = 0;
  let low = Infinity;
  let high = -Infinity;
  for (let t = 0; t < mesh.triangles; t++) {
    const deg = draft[t];
    if (facets.bed[t] || bore[t] || facets.area[t] === 0 || deg < -LEANS_OUT_DEG || deg > WALL_DEG) continue;
    if (visibility.visible[t] + visibility.shadowed[t] < 0.5) continue;
    wallArea += facets.area[t];
    const bin = Math.floor((deg + LEANS_OUT_DEG) * BINS_A_DEG);
    areaIn[bin] += facets.area[t];
    if (deg < leastIn[bin]) leastIn[bin] = deg;
    if (deg >= limitDeg - ROUNDING_DEG) continue;
    steep.push(t);
    below += facets.area[t];
    const za = mesh.position[mesh.index[3 * t] * 3 + 2];
    const zb = mesh.position[mesh.index[3 * t + 1] * 3 + 2];
    const zc = mesh.position[mesh.index[3 * t + 2] * 3 + 2];
    const foot = Math.min(za, zb, zc);
    const head = Math.max(za, zb, zc);
    if (head - foot < STEP_MM) stepArea += facets.area[t];
    low = Math.min(low, foot);
    high = Math.max(high, head);
  }
  const sliver = Math.max(LEAST_AREA_MM2, SLIVER_SHARE * wallArea);
  let bin = 0;
  for (let sum = areaIn[0]; sum < sliver && bin + 1 < bins;) sum += areaIn[++bin];
  return {
    facetDeg: wallArea > sliver ? leastIn[bin] : null,
    stepped: stepArea > 0.8 * below,
    areaBelowMm2: below > sliver ? below : 0,
    wallAreaMm2: wallArea,
    regions:
      below > sliver
        ? groupFacets(mesh, facets.area, steep, MOST_REGIONS, draft)
            .filter(({ areaMm2 }) => areaMm2 >= LEAST_AREA_MM2)
            .map(({ at, areaMm2, least }) => ({ at, areaMm2, minDeg: least }))
        : [],
    heightMm: below > sliver ? high - low : 0,
  };
}
