import type { MapHistogram } from './stage-model-meta';

/** Attribute names and steps of the sheet model, shared by the worker that writes it and the browser that reads it. */
export const SHEET_ATTRIBUTE = '_SHEET';
export const LIES_ATTRIBUTE = '_LIES';
/** One count of `_SHEET` in mm: 16 bits reach 65 mm. */
export const SHEET_STEP_MM = 0.001;

/** The formed sheet as the engine gives it: a grid of nodes, triangle by triangle. */
export interface FormedSurface {
  /** nodes along x and y; node (i, j) is j × nodes[0] + i */
  nodes: [number, number];
  /** three numbers a node, mm, on the template's side of the sheet */
  positions: Float32Array;
  indices: Uint32Array;
  thicknessMm: Float32Array;
  /** of each node: 1 where the sheet lies on template or bed, or is clamped */
  contact: Uint8Array;
  /** of each triangle: 1 in the foot along the bed */
  foot: Uint8Array;
  areaMm2: Float32Array;
}

/** Facts of a sheet model; it belongs to one mesh under one recipe. */
export interface SheetModelMeta {
  schema: 1;
  nodes: [number, number];
  triangles: number;
  bytes: number;
  gaugeMm: number;
  /** half a position step */
  quantumMm: number;
  boundsMm: { min: [number, number, number]; max: [number, number, number] };
  /** of the part, the foot along the bed left out; null where all of it is foot */
  rangeMm: [number, number] | null;
  /** area of the part's sheet by thickness, mm² */
  histogram: MapHistogram;
  areaMm2: { part: number; foot: number };
}
