import type { EffectiveRecipe, MeshUnit, RecipeInput } from './recipe';
import type {
  AirFlow,
  HeatReport,
  LayerShowReport,
  LifeReport,
  SkinReport,
  SureSection,
  Sureness,
  ThinningEstimate,
  VentMark,
  WallsUnderPressureReport,
  WebReport,
} from './report-forming';
import type { SheetReport } from './report-sheet';
import type { WallsReport, DetailReport, EdgesReport } from './report-walls';
import type { SheetSurface } from './sheet/sheet-surface';

/** A place in millimetres: x, y in the file's own frame, z above the bed. */
export type Point = [number, number, number];

/** Usable but wrong: what the engine saw. */
export type MeshWarning =
  | 'trailing_data'
  | 'normals_disagree'
  | 'inverted'
  | 'inconsistent_winding'
  | 'not_watertight'
  | 'nonmanifold_edge'
  | 'overlapping_shells'
  | 'touching_shells'
  | 'self_intersection'
  | 'suspicious_scale'
  | 'degenerate_triangles'
  | 'duplicate_triangles'
  | 'needs_tolerant_weld'
  | 't_junction'
  | 'floating'
  | 'below_bed'
  | 'orientation'
  | 'precision'
  | 'too_large';

/** What the engine did about it before measuring. */
export type MeshRepair =
  | 'tolerant_weld'
  | 'flipped_inside_out'
  | 'rewound_facets'
  | 'removed_degenerate'
  | 'removed_duplicates'
  | 'split_at_t_junctions'
  | 'dropped_to_bed'
  | 'capped_holes'
  | 'closed_at_bed'
  | 'filled_columns';

export type MeshFormat = 'stl-binary' | 'stl-ascii' | '3mf' | 'step';

/** What the figures were read from. */
export interface InputReport {
  sha256: string;
  bytes: number;
  format: MeshFormat;
  /** Of the file's coordinates: its own where the format has one, the recipe's otherwise. */
  unit: string;
  triangles: number;
  /** Built objects of a 3MF, solids and shells of a STEP file. */
  bodies?: number;
  /** Objects of the file that are no part of the template, one sentence each. */
  leftOut?: string[];
  /** STEP: greatest distance between surface and facets that the conversion was asked for. */
  deflectionMm?: number;
}

export interface Bounds {
  min: Point;
  max: Point;
}

/** Where a warning holds: edges, facets or shells that hang together, at their middle. */
export interface MeshPlace {
  code: MeshWarning;
  at: Point;
  /** How many edges, facets, corners or shells. */
  count: number;
  /** Diagonal of the box round them. */
  sizeMm: number;
}

export interface MeshReport {
  boundsMm: Bounds;
  /** Divergence theorem over the triangles as stored, so negative for an inside-out file. */
  volumeMm3: number;
  /** Points with winding number above 0, after the repairs named. */
  unionVolumeMm3: number;
  areaMm2: number;
  bedContactAreaMm2: number;
  shells: number;
  watertight: boolean;
  edges: { boundary: number; nonManifold: number; inconsistent: number };
  degenerate: number;
  duplicates: number;
  /** Factor that would make the size plausible, or null. */
  suggestedScale: number | null;
  /** The direction that would stand the part on its largest base, or null. */
  suggestedUp: Point | null;
  /** Grid columns that did not close (open meshes only). */
  openColumns: number;
  /** True where the surface is still open after every repair: volumes and plan figures are then estimates. */
  approximate: boolean;
  warnings: MeshWarning[];
  /** Up to 12 for each warning that has a place, the gravest first. */
  places: MeshPlace[];
  repairs: MeshRepair[];
}

export interface DraftReport {
  /** Least draft over non-bed facets with 0.25 < draft < 85; null where there is none. */
  minUpFacingDeg: number | null;
  /** Least draft over all non-bed facets, overhangs included. */
  minDeg: number | null;
  verticalAreaMm2: number;
  binEdgesDeg: number[];
  areaByBinMm2: number[];
  /** Draft of the walls at scales above 1 mm, through steps and noise, negative where they lean out; null without walls. */
  wallMinMacroDeg: number | null;
  /** Draft that these walls need: the limit that the check holds them to. */
  wantedDeg: number;
  /** Connected walls below it, the largest first; seen through steps where the wall is made of steps. */
  regions: DraftRegion[];
}

/** A connected part of the walls that leans back too little. */
export interface DraftRegion {
  at: Point;
  areaMm2: number;
  minDeg: number;
}

export interface PlanReport {
  frameMm: [number, number];
  frameAreaMm2: number;
  planAreaMm2: number;
  formedAreaMm2: number;
  arealDrawRatio: number;
  linearDrawRatioX: number;
  linearDrawRatioY: number;
  depthRatio: number;
}

export interface UndercutRegion {
  at: Point;
  planAreaMm2: number;
  volumeMm3: number;
  /** Greatest horizontal depth under the lip; below 0.2 mm it is surface texture. */
  maxDepthMm: number;
  zMm: [number, number];
}

export interface UndercutReport {
  overhangAreaMm2: number;
  shadowedAreaMm2: number;
  undercutVolumeMm3: number;
  enclosedVolumeMm3: number;
  shadowVolumeMm3: number;
  maxDepthMm: number;
  regions: UndercutRegion[];
}

export interface AirTrap {
  floor: Point;
  spillZMm: number;
  volumeMm3: number;
  planAreaMm2: number;
  trapsAir: boolean;
  /** Index into airTraps of the pit that this one lies in. */
  parent: number | null;
  /** Indices into vents. */
  vents: number[];
}

export interface Vent {
  /** On the pit floor, on the bore's axis. */
  at: Point;
  diameterMm: number;
  lengthMm: number;
  printable: boolean;
  /** What the hole model says the printer leaves open. */
  printedMm: number;
}

export interface Spacing {
  gapMm: number;
  gapAtBedMm: number;
  heightMm: number;
  heightOverGap: number;
  between: [Point, Point];
}

export interface LayersReport {
  cuspMaxMm: number;
  cuspMedianMm: number;
  treadMinMm: number;
  layerDraftDeg: number;
  /** Whether the steps show through the formed sheet; null where only geometry was asked for. */
  show: LayerShowReport | null;
}

export interface PrintReport {
  layers: number;
  materialMm3: number;
  massG: number;
  filamentM: number;
  timeS: number;
  /** With beads whose ends are round: the longest that it should take. */
  timeMostS: number;
  cost: number;
}

export interface Advice {
  change: RecipeInput;
  mends: CheckId[];
  costS: number;
  costG: number;
  text: string;
}

export const CHECK_IDS = [
  'mesh',
  'fit',
  'draft',
  'undercut',
  'layers',
  'edges',
  'spacing',
  'draw',
  'sheet',
  'air',
  'vents',
  'shell',
  'skin',
  'walls',
  'heat',
  'nozzle',
  'overhang',
  'release',
  'print',
] as const;

export type CheckId = (typeof CHECK_IDS)[number];
export type CheckStatus = 'pass' | 'caution' | 'fail' | 'not-run';
export type BasisKind = 'common practice' | 'handbook' | 'standard' | 'computed';

export interface Basis {
  /** A named source, or "common practice, no source". */
  source: string;
  kind: BasisKind;
  /** The key in recipe.limits that moves this limit, and whether the recipe moved it. */
  limitKey?: string;
  movedByRecipe?: boolean;
  /** How sure the figure and its limit are; every check of a report says it. */
  sureness?: Sureness;
}

export interface Place {
  at: Point;
  areaMm2: number;
}

export interface Check {
  id: CheckId;
  status: CheckStatus;
  /** Null where nothing could be measured. */
  measured: number | null;
  limit: number | null;
  unit: string;
  basis: Basis;
  /** What was found, in a sentence that a client understands. */
  message: string;
  /** The computed change that would make it pass; empty where nothing need change. */
  remedy: string;
  places: Place[];
}

/** What a run says: a schema-1 document; sections that were not asked for, or cannot be computed, are null or empty. */
export interface Report {
  schema: 1;
  engine: string;
  input: InputReport;
  recipe: EffectiveRecipe;
  mesh: MeshReport;
  draft: DraftReport;
  plan: PlanReport;
  undercut: UndercutReport;
  airTraps: AirTrap[];
  vents: Vent[];
  spacing: Spacing[];
  walls: WallsReport;
  detail: DetailReport;
  edges: EdgesReport;
  sheet: SheetReport | null;
  layers: LayersReport;
  air: AirFlow[];
  ventMarks: VentMark[];
  heat: HeatReport | null;
  skin: SkinReport | null;
  wallsUnderPressure: WallsUnderPressureReport | null;
  /** Null, like `thinning`, where only geometry was asked for. */
  web: WebReport | null;
  thinning: ThinningEstimate[] | null;
  life: LifeReport | null;
  print: PrintReport;
  sureness: Record<SureSection, Sureness>;
  advice: Advice[];
  checks: Check[];
  /** Empty unless the caller lent a clock. */
  timings: Record<string, number>;
}

export interface HeightField {
  cellMm: number;
  nx: number;
  ny: number;
  /** Corner (not centre) of cell 0,0 in the report's frame. */
  originX: number;
  originY: number;
  /** Row by row, x fastest: height of the highest solid point over the cell's centre, 0 where none. */
  heights: Float32Array;
}

/** What the page's derivative is made of. Facets are in one order throughout. */
export interface AnalysisGeometry {
  /** 9 per facet: oriented, in millimetres, standing on the bed. */
  positions: Float32Array;
  facetDraftDeg: Float32Array;
  /** Bit 0: on the bed. Bit 1: overhangs or lies in the shadow of the part above. Bit 2: in a pit without a vent. */
  facetFlags: Uint8Array;
  /** Normal wall thickness in mm, NaN where the sheet does not touch or nothing bounds it. */
  facetWallMm: Float32Array;
  /** Level at which the pit that the facet looks into overflows its outer rim, mm above the bed; NaN without a pit. */
  facetSpillMm: Float32Array;
  heightField: HeightField;
  /** The formed sheet as a surface; null where none was formed. */
  sheet: SheetSurface | null;
}

export interface Analysis {
  report: Report;
  geometry: AnalysisGeometry;
}

/** What an upload is told at once. */
export interface Inspection {
  format: MeshFormat;
  /** Of the file's coordinates: its own where the format has one, the one asked for otherwise. */
  unit: MeshUnit;
  triangles: number;
  /** As in the file: neither turned nor moved, scaled by the unit asked for. */
  boundsMm: Bounds;
  warnings: MeshWarning[];
}
