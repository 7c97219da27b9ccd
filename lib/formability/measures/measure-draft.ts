import type { Facets } from '../mesh/measure-facets';
import type { DraftReport } from '../report';
import { draftDeg, TOP_DEG, VERTICAL_DEG } from './thresholds';

export const DRAFT_BIN_EDGES = [-90, -60, -30, -10, -2, -0.25, 0.25, 1, 2, 4, 6, 10, 15, 30, 60, 85, 90];

/** Rounding of a wall that was drawn with exactly the draft of a bin's edge: it belongs above that edge. */
const EDGE_DEG = 1e-4;

/**
 * Draft of every non-bed facet: asin(n_z), geometry. Bins hold lower ≤ draft < upper, the last one 90 too.
 * @returns the report section without what concerns walls only, and the draft of each facet
 */
export function measureDraft(facets: Facets): {
  draft: Omit<DraftReport, 'wallMinMacroDeg' | 'wantedDeg' | 'regions'>;
  ofFacet: Float32Array;
} {
  const { area, nz, bed } = facets;
  const ofFacet = new Float32Array(area.length);
  const areas = new Float64Array(DRAFT_BIN_EDGES.length - 1);
  const edges = Float64Array.from(DRAFT_BIN_EDGES);
  let minUp = Infinity;
  let min = Infinity;
  let vertical = 0;
  for (let t = 0; t < area.length; t++) {
    const draft = draftDeg(nz[t]);
    ofFacet[t] = draft;
    if (bed[t] || area[t] === 0) continue;
    if (draft < min) min = draft;
    if (draft > VERTICAL_DEG && draft < TOP_DEG && draft < minUp) minUp = draft;
    if (draft >= -VERTICAL_DEG && draft <= VERTICAL_DEG) vertical += area[t];
    let bin = 0;
    while (bin < areas.length - 1 && draft >= edges[bin + 1] - EDGE_DEG) bin++;
    areas[bin] += area[t];
  }
  return {
    draft: {
      minUpFacingDeg: minUp === Infinity ? null : minUp,
      minDeg: min === Infinity ? null : min,
      verticalAreaMm2: vertical,
      binEdgesDeg: DRAFT_BIN_EDGES,
      areaByBinMm2: Array.from(areas),
    },
    ofFacet,
  };
}
