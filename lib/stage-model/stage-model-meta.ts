/** Attribute names and steps of the stage model, shared by the worker that writes it and the browser that reads it. */
export const DRAFT_ATTRIBUTE = '_DRAFT';
export const FLAGS_ATTRIBUTE = '_FLAGS';
/** `extras.role` of the primitive that is drawn while the eye moves on a slow machine. */
export const COARSE_ROLE = 'coarse';
/** One count of `_DRAFT` in degrees; the engine's own tolerance on draft is 0.02°. */
export const DRAFT_STEP_DEG = 0.01;
export const FLAG_BED = 1;
export const FLAG_UNDERCUT = 2;

/** The engine's geometry of one mesh, facet by facet, as `analysis.geometry` gives it. */
export interface StageGeometry {
  /** nine numbers a triangle, mm, base at z = 0, pull-off along +Z, outward by the right-hand rule */
  positions: Float32Array;
  /** draft of each facet, degrees: 90 flat and up, 0 vertical, negative facing down */
  facetDraftDeg: Float32Array;
  /** bit 0 bed facet, bit 1 undercut */
  facetFlags: Uint8Array;
}

export interface DraftHistogram {
  /** bin edges, degrees, ascending; one more than there are bins */
  edgesDeg: number[];
  /** area of the facets in each bin, mm², bed facets left out */
  areaMm2: number[];
}

export interface StageModelMeta {
  schema: 1;
  triangles: number;
  vertices: number;
  sourceTriangles: number;
  bytes: number;
  boundsMm: { min: [number, number, number]; max: [number, number, number] };
  /** least and greatest facet draft, bed facets left out */
  draftRangeDeg: [number, number];
  /** half a position step: no vertex moved further than this along one axis by rounding */
  quantumMm: number;
  /** 0 when the mesh was not simplified; else the bound that was asked for */
  simplificationBoundMm: number;
  /** greatest distance of the sampled source vertices from the simplified surface, as measured */
  simplificationErrorMm: number;
  /** facets whose drafts differ by more than this share no vertex, so their colours do not mix */
  draftSplitDeg: number;
  areaMm2: { total: number; bed: number; undercut: number };
  histogram: DraftHistogram;
}
