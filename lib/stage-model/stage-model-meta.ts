/** Attribute names and steps of the stage model, shared by the worker that writes it and the browser that reads it. */
export const DRAFT_ATTRIBUTE = '_DRAFT';
export const FLAGS_ATTRIBUTE = '_FLAGS';
export const WALL_ATTRIBUTE = '_WALL';
export const TRAP_ATTRIBUTE = '_TRAP';
/** `extras.role` of the primitive that is drawn while the eye moves on a slow machine. */
export const COARSE_ROLE = 'coarse';
/** One count of `_DRAFT` in degrees; the engine's own tolerance on draft is 0.02°. */
export const DRAFT_STEP_DEG = 0.01;
/** One count of `_WALL` and `_TRAP` in mm. */
export const MAP_STEP_MM = 0.01;
/** `_WALL` of a vertex where no thickness was measured. */
export const WALL_NONE = 0;
/** `_TRAP` of a vertex that looks into no pocket. */
export const TRAP_NONE = -32768;
export const FLAG_BED = 1;
export const FLAG_UNDERCUT = 2;
/** In a pocket that no vent leads out of. */
export const FLAG_UNVENTED = 4;

/** The engine's geometry of one mesh, facet by facet, as `analysis.geometry` gives it. */
export interface StageGeometry {
  /** nine numbers a triangle, mm, base at z = 0, pull-off along +Z, outward by the right-hand rule */
  positions: Float32Array;
  /** draft of each facet, degrees: 90 flat and up, 0 vertical, negative facing down */
  facetDraftDeg: Float32Array;
  /** bit 0 bed facet, bit 1 undercut, bit 2 in a pocket without a vent */
  facetFlags: Uint8Array;
  /** normal wall thickness of each facet, mm; NaN or 0 where there is none; left out where nobody measured */
  facetWallMm?: Float32Array;
  /** level at which the pocket that the facet looks into overflows, mm above the bed; NaN without a pocket */
  facetSpillMm?: Float32Array;
}

export interface DraftHistogram {
  /** bin edges, degrees, ascending; one more than there are bins */
  edgesDeg: number[];
  /** area of the facets in each bin, mm², bed facets left out */
  areaMm2: number[];
}

/** Area of the facets by a figure of theirs. */
export interface MapHistogram {
  /** bin edges, ascending; one more than there are bins */
  edges: number[];
  areaMm2: number[];
}

/** One map of the model: where its figures are in the file, what they span, and how much area has which. */
export interface MapFigures {
  attribute: string;
  unit: string;
  /** one count of the attribute in `unit`, where the figure is the attribute itself */
  step?: number;
  /** least and greatest; null where no facet has a figure */
  range: [number, number] | null;
  histogram: MapHistogram;
}

export interface StageMaps {
  /**
   * Layer lines: the step that layers leave is layer height × |n_z|, so the figure is told for a layer of 1 mm and
   * reckoned from `_DRAFT`. Facets with 0.25° < draft < 89.5°.
   */
  layers: MapFigures;
  /** normal wall thickness, mm */
  wall?: MapFigures;
  /** depth below the level at which the pocket overflows, mm; `_TRAP` is negative where a wall stands out of it */
  trap?: MapFigures & { unventedMm2: number };
}

export interface StageModelMeta {
  /** 2 since the maps of layers, wall and trapped air; models of schema 1 have `_DRAFT` and `_FLAGS` only */
  schema: 1 | 2;
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
  /** schema 2 */
  maps?: StageMaps;
}
