import { facetArea } from './facet-area';
import { areaBelow, binOf } from './map-histogram';
import { LAYERS_FROM_DEG } from './shown-range';
import { FLAG_BED, FLAG_UNDERCUT, type DraftHistogram, type StageGeometry } from './stage-model-meta';

/** Half a degree where walls are judged, coarse where nothing hangs on it. Bin [a, b), the last one closed. */
export const HISTOGRAM_EDGES_DEG: readonly number[] = [
  -90,
  -60,
  -30,
  -10,
  -5,
  -2,
  -1,
  -0.5,
  ...Array.from({ length: 41 }, (_, i) => i / 2),
  25,
  30,
  45,
  60,
  75,
  90,
];

export interface DraftArea {
  histogram: DraftHistogram;
  rangeDeg: [number, number];
  areaMm2: { total: number; bed: number; undercut: number };
}

/**
 * Area of the facets by draft, in mm²; bed facets count in `areaMm2.total` and `.bed` only. What looks down without
 * being an undercut is the inside of a hollow, which no sheet meets: it counts in the total alone.
 */
export function measureDraftArea({ positions, facetDraftDeg, facetFlags }: StageGeometry): DraftArea {
  const edges = [...HISTOGRAM_EDGES_DEG];
  const areas = new Array<number>(edges.length - 1).fill(0);
  const area = { total: 0, bed: 0, undercut: 0 };
  let low = Infinity;
  let high = -Infinity;
  for (let f = 0; f < facetDraftDeg.length; f++) {
    const a = facetArea(positions, f);
    area.total += a;
    if (facetFlags[f] & FLAG_BED) {
      area.bed += a;
      continue;
    }
    if (facetFlags[f] & FLAG_UNDERCUT) area.undercut += a;
    else if (facetDraftDeg[f] < -LAYERS_FROM_DEG) continue;
    if (a === 0) continue;
    const draft = Math.min(90, Math.max(-90, facetDraftDeg[f]));
    low = Math.min(low, draft);
    high = Math.max(high, draft);
    areas[binOf(edges, draft)] += a;
  }
  return {
    histogram: { edgesDeg: edges, areaMm2: areas },
    rangeDeg: low > high ? [0, 0] : [low, high],
    areaMm2: area,
  };
}

/** Area of the non-bed facets whose draft is below the limit, mm²; a bin that the limit cuts counts in proportion. */
export function areaBelowDraft(histogram: DraftHistogram, limitDeg: number): number {
  const { edgesDeg, areaMm2 } = histogram;
  return areaBelow({ edges: edgesDeg, areaMm2 }, limitDeg);
}
