import type { Point } from './report';

/** Where a formed thickness comes from: a run of the sheet, at that place, or gauge over areal draw ratio. */
export type ThicknessFrom = 'sheet-run' | 'areal-mean';

export interface LayerShowReport {
  /** Height of the highest step on the sheet's outer side, unsanded, and the slope that it is on; null without slopes. */
  throughMm: number;
  draftDeg: number | null;
  cuspMm: number;
  /** Where it is, with a run of the sheet. */
  at: Point | null;
  limitMm: number;
  /** Of slopes whose steps show. */
  areaMm2: number;
  /** Formed thickness that it was reckoned with. */
  thicknessMm: number;
  from: ThicknessFrom;
  /** Thickest layer whose steps stay below the limit; null where they do already, or none fine enough does. */
  layerThatHidesMm: number | null;
  /** Mean roughness R_a of the roughest slope. */
  roughnessUm: number;
  /** How deep the sheet bulges between beads on the steepest slope, and the draft that clears it. */
  bulgeMm: number;
  bulgeDraftDeg: number;
}

export interface AirFlow {
  /** Index into airTraps; pits that hold no other pit. */
  trap: number;
  /** Of the vents as this printer leaves them open. */
  ventAreaMm2: number;
  /** Null where no vent is open. */
  clearS: number | null;
  /**
   * Should the sheet set over the pocket before: time in which the pressure that drove the air falls to a tenth, the pocket
   * staying as large as it was. Null where no vent is open.
   */
  fallS: number | null;
  /** Of the widest vent, or of the one that is wanting. */
  regime: 'choked' | 'subcritical' | 'laminar';
  /** Further vents of the printer's smallest open size, `ventDiameterMm`, that would clear it in time. */
  ventsNeeded: number;
  ventDiameterMm: number;
  ventPlaces: Point[];
}

export interface VentMark {
  /** Index into vents. */
  vent: number;
  heightMm: number;
  /** Formed thickness that it was reckoned with: also the widest that a vent should open there. */
  thicknessMm: number;
  from: ThicknessFrom;
  limitMm: number;
  /** Thickness of the mark's tip; null where the sheet may burst. */
  tipMm: number | null;
}

/** Pull after pull, in one dimension through sheet, printed wall and infill. */
export interface TransientReport {
  /** Hottest surface in each pull that was followed; later ones are as the last. */
  surfaceC: number[];
  peakC: number;
  /** Whether pulls had become alike, or all were followed. */
  settled: boolean;
  /** From laying on to demoulding; null where the sheet does not set within the cycle. */
  setFirstS: number | null;
  setLastS: number | null;
  /** Pulls from the first on whose sheet sets within the cycle. */
  setPulls: number;
  /** Surface as the first sheet comes off, by the exact series; null where that one does not set. */
  surfaceAtDemouldC: number | null;
  /** Hottest at each depth below the surface, in the first and the last pull. */
  profile: { depthMm: number; firstC: number; lastC: number }[];
  /** Depth down to which the last pull is hotter than the filament's limit. */
  softensToMm: number;
}

export interface HeatReport {
  /** Surface at the first touch, semi-infinite bodies. */
  contactC: number;
  limitC: number;
  /** Surface after pull 1…N. */
  peakC: number[];
  /** How many of the planned pulls stay below the limit from a cold start; 0 where the first does not. */
  pullsBeforeRest: number;
  /** Shortest cycle from the planned one up at which all planned pulls hold; null where none does. */
  cycleThatHoldsS: number | null;
  model: 'lumped' | '1-d';
  /** Least time that a sheet needs to set on a template that stays cold; null where it cannot. */
  coolS: number | null;
  transient: TransientReport;
}

export interface SkinReport {
  /** Null without infill: nothing carries the top. */
  spanMm: number | null;
  modulusMPa: number;
  atC: number;
  sagMm: number | null;
  stressMPa: number | null;
  limitMm: number;
  /** The modulus is divided by it: minutes of load in warmth. */
  creepFactor: number;
  /** Sag where the infill lets the skin's edges turn: the most it can be. */
  sagMostMm: number | null;
  /** In the layers' plane, at that temperature. */
  strengthMPa: number;
  /** Top thickness, or infill, at which sag and stress are within their limits. */
  topThatHoldsMm: number | null;
  infillThatHoldsPercent: number | null;
}

export interface WallsUnderPressureReport {
  /** Hollow by its mesh, or printed without infill. */
  empty: boolean;
  wallMm: number;
  sagMm: number;
  stressMPa: number;
  /** Across the layers, at the hottest pull. */
  strengthMPa: number;
  /** Ring collapse with knock-down; null where infill carries the walls. */
  collapseBar: number | null;
  /** Compression of the infill's own walls, and where they buckle, with knock-down; null when empty or solid. */
  infill: { stressMPa: number; bucklesMPa: number } | null;
  /** Of an empty template: widest spacing of ribs between which its walls hold; null otherwise. */
  ribSpacingMm: number | null;
  /** Infill at which walls and infill hold; null where none does. */
  infillThatHoldsPercent: number | null;
}

/** One ring of sheet round a footprint, on its way to the foot. */
export interface WebRing {
  perimeterMm: number;
  /** To where the sheet is held, and the height it must come down. */
  gapMm: number;
  heightMm: number;
  /** Distance outside the footprint from which it comes. */
  ringMm: number;
  hoopStretch: number;
  meridianStretch: number;
  /** Hoop stretch below which it folds: meridian stretch to the power −1/2. */
  limit: number;
  webs: boolean;
  /** Widest gap at which it would not fold; null where it does not, or none helps. */
  gapThatHoldsMm: number | null;
}

export interface WebReport {
  /** Round the whole template, towards the frame; null where nothing stands or the frame leaves no room. */
  outside: WebRing | null;
  /** Round the smaller of the two neighbours that stand tightest; null without neighbours. */
  neighbours: WebRing | null;
}

/** Thickness by a classical rule, beside the membrane's at the same place where that was run. */
export interface ThinningEstimate {
  rule: 'skirt' | 'foot' | 'drape' | 'pit-cone' | 'pit-cylinder' | 'pit-frustum' | 'pit-shallow' | 'groove';
  at: Point | null;
  ruleMm: number;
  sheetMm: number | null;
}

export type LifeWay = 'heat' | 'skin' | 'walls' | 'grip';

/** How far one way of failing is away. */
export interface LifeMargin {
  way: LifeWay;
  /** What is asked of the template, and what it holds; null where that cannot be told. */
  demand: number | null;
  holds: number;
  unit: string;
  /** What is left, in that unit; below 0 it does not hold. */
  margin: number | null;
  /** Above 1 it holds. */
  ratio: number | null;
  text: string;
}

export interface LifeReport {
  /** The way with the least ratio. */
  limitedBy: LifeWay | null;
  margins: LifeMargin[];
  /** Force to draw the shrunk part off, N, and the draft from which it would come by itself. */
  releaseForceN: number | null;
  selfReleaseDeg: number;
  /** Pulls that there is reason to expect; null where nothing is known. */
  pulls: number | null;
  basis: 'estimate' | 'pull-log';
  /** In words: what limits it, and what is not known. */
  text: string;
  /** What the studio's own log says, in the place of the estimate. */
  log: PullLogReport | null;
}

export interface PullLogReport {
  templates: number;
  failures: number;
  /** Kaplan and Meier: share that outlives each number of pulls, with Greenwood's standard error. */
  survival: { pulls: number; share: number; standardError: number }[];
  /** Weibull with right censoring; null with fewer than 5 failures, where it says too little. */
  weibull: {
    shape: number;
    scalePulls: number;
    b10Pulls: number;
    meanPulls: number;
    logLikelihood: number;
  } | null;
  /** Pulls per failure; null without a failure. */
  meanBetweenPulls: number | null;
  /** Least mean life at an even rate of failing, with 90 % confidence; null where failures are many. */
  meanAtLeastPulls: number | null;
  /** Share that outlives the planned pulls, with 90 % confidence: templates that came so far without failing. */
  provenShare: number | null;
}

/** How sure a figure is. */
export type SurenessKind = 'source' | 'calibrated' | 'estimate';

export interface Sureness {
  kind: SurenessKind;
  /** What it rests on, and what would make it surer. */
  note: string;
}

/** Sections whose figures are more than a measurement of the mesh. */
export const SURE_SECTIONS = [
  'draft',
  'plan',
  'web',
  'thinning',
  'sheet',
  'layers',
  'air',
  'ventMarks',
  'heat',
  'skin',
  'wallsUnderPressure',
  'life',
  'print',
] as const;

export type SureSection = (typeof SURE_SECTIONS)[number];
