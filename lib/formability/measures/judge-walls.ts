import type { Facets } from '../mesh/measure-facets';
import type { Mesh } from '../mesh/mesh';
import type { DraftRegion } from '../report';
import { groupFacets } from './group-facets';

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

/** The walls that the sheet touches, whatever draft is asked of them. */
export interface WallFacets {
  /** In the order of facets. */
  facet: Uint32Array;
  areaMm2: number;
  /** So much of them may lie below a limit unnoticed. */
  sliverMm2: number;
  /** Draft that more than slivers lie below; null where there are no walls. */
  facetDeg: number | null;
}

/** The walls judged for draft. */
export interface WallJudgement {
  /** Draft that more than slivers lie below; null where there are no walls. */
  facetDeg: number | null;
  /** True where nearly all that is steep is lower than 1 mm: steps or noise, not walls. */
  stepped: boolean;
  areaBelowMm2: number;
  wallAreaMm2: number;
  /** Height of the facets below the limit, for the width that more draft takes. */
  heightMm: number;
}

/**
 * Facets that the sheet touches, bores and cavities aside, with −45° ≤ draft ≤ 60°: a wall is one either side of 0°.
 * @param touched 1 for facets that the sheet meets
 */
export function findWalls(
  { area, bed }: Facets,
  draft: Float32Array,
  touched: Uint8Array,
  bore: Uint8Array,
): WallFacets {
  const facet = new Uint32Array(area.length);
  let walls = 0;
  for (let t = 0; t < area.length; t++) {
    const deg = draft[t];
    if (touched[t] === 0 || bed[t] || bore[t] || area[t] === 0 || deg < -LEANS_OUT_DEG || deg > WALL_DEG)
      continue;
    facet[walls++] = t;
  }
  const found = facet.slice(0, walls);
  const bins = Math.ceil((WALL_DEG + LEANS_OUT_DEG) * BINS_A_DEG) + 1;
  const areaIn = new Float64Array(bins);
  const leastIn = new Float64Array(bins).fill(Infinity);
  const areaMm2 = fillBins(found, area, draft, areaIn, leastIn);
  const sliverMm2 = Math.max(LEAST_AREA_MM2, SLIVER_SHARE * areaMm2);
  let bin = 0;
  for (let sum = areaIn[0]; sum < sliverMm2 && bin + 1 < bins;) sum += areaIn[++bin];
  return { facet: found, areaMm2, sliverMm2, facetDeg: areaMm2 > sliverMm2 ? leastIn[bin] : null };
}

/** Area and least draft by hundredths of a degree; returns the area of all. */
function fillBins(
  facet: Uint32Array,
  area: Float64Array,
  draft: Float32Array,
  areaIn: Float64Array,
  leastIn: Float64Array,
): number {
  let all = 0;
  for (let k = 0; k < facet.length; k++) {
    const own = area[facet[k]];
    const deg = draft[facet[k]];
    const bin = ((deg + LEANS_OUT_DEG) * BINS_A_DEG) | 0;
    all += own;
    areaIn[bin] += own;
    if (deg < leastIn[bin]) leastIn[bin] = deg;
  }
  return all;
}

/** Walls below a limit: how much, how high, and whether they are steps. */
export function judgeWalls(
  mesh: Mesh,
  facets: Facets,
  draft: Float32Array,
  walls: WallFacets,
  limitDeg: number,
): WallJudgement {
  const { index, position: p } = mesh;
  const { area } = facets;
  const steep = steepFacets(walls.facet, draft, limitDeg);
  let below = 0;
  let stepArea = 0;
  let low = Infinity;
  let high = -Infinity;
  for (let k = 0; k < steep.length; k++) {
    const t = steep[k];
    below += area[t];
    const za = p[index[3 * t] * 3 + 2];
    const zb = p[index[3 * t + 1] * 3 + 2];
    const zc = p[index[3 * t + 2] * 3 + 2];
    const foot = za < zb ? (za < zc ? za : zc) : zb < zc ? zb : zc;
    const head = za > zb ? (za > zc ? za : zc) : zb > zc ? zb : zc;
    if (head - foot < STEP_MM) stepArea += area[t];
    if (foot < low) low = foot;
    if (head > high) high = head;
  }
  const counts = below > walls.sliverMm2;
  return {
    facetDeg: walls.facetDeg,
    stepped: stepArea > 0.8 * below,
    areaBelowMm2: counts ? below : 0,
    wallAreaMm2: walls.areaMm2,
    heightMm: counts ? high - low : 0,
  };
}

/** Connected facets below the limit, the largest first; none where only slivers are. */
export function wallRegions(
  mesh: Mesh,
  facets: Facets,
  draft: Float32Array,
  walls: WallFacets,
  { areaBelowMm2 }: WallJudgement,
  limitDeg: number,
): DraftRegion[] {
  if (areaBelowMm2 === 0) return [];
  return groupFacets(mesh, facets.area, steepFacets(walls.facet, draft, limitDeg), MOST_REGIONS, draft)
    .filter(({ areaMm2 }) => areaMm2 >= LEAST_AREA_MM2)
    .map(({ at, areaMm2, least }) => ({ at, areaMm2, minDeg: least }));
}

function steepFacets(facet: Uint32Array, draft: Float32Array, limitDeg: number): Uint32Array {
  const found = new Uint32Array(facet.length);
  let steep = 0;
  for (let k = 0; k < facet.length; k++) {
    if (draft[facet[k]] < limitDeg - ROUNDING_DEG) found[steep++] = facet[k];
  }
  return found.subarray(0, steep);
}
