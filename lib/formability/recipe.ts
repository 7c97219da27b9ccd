import { DEFAULT_LIMITS, type Limits } from './limits';
import type { FilamentId } from './materials/filaments';
import { SHEETS, type SheetId } from './materials/sheets';

export const MESH_UNITS = ['mm', 'cm', 'm', 'in', 'ft', 'micron'] as const;
export type MeshUnit = (typeof MESH_UNITS)[number];

/** Millimetres in one unit (3MF core specification, §3.4, has the same table). */
export const MM_PER_UNIT: Record<MeshUnit, number> = {
  mm: 1,
  cm: 10,
  m: 1000,
  in: 25.4,
  ft: 304.8,
  micron: 0.001,
};

export const INFILL_PATTERNS = ['lines', 'grid', 'triangles', 'gyroid'] as const;
export type InfillPattern = (typeof INFILL_PATTERNS)[number];

export const RELEASE_AGENTS = ['none', 'dry-ptfe'] as const;
export type ReleaseAgent = (typeof RELEASE_AGENTS)[number];

export interface HoleModel {
  /** Printed diameter = slope × nominal + offset (mm), open from minOpenMm on. */
  slope: number;
  offsetMm: number;
  minOpenMm: number;
}

/** Every field filled; part of the report. Lengths mm, temperatures °C, times s, pressure bar. */
export interface EffectiveRecipe {
  schema: 1;
  mesh: { unit: MeshUnit; up: [number, number, number]; dropToBed: boolean };
  machine: {
    formingAreaMm: [number, number];
    maxHeightMm: number;
    frameMarginMm: number;
    /** Clamp-frame opening; null: the template's plan box enlarged by the margin on every side. */
    frameMm: [number, number] | null;
    pressureBar: number;
    ventedBed: boolean;
  };
  sheet: { material: SheetId; gaugeMm: number; formingC: number; minFormedMm: number };
  print: {
    material: FilamentId;
    nozzleMm: number;
    layerMm: number;
    shellMm: number;
    topMm: number;
    infillPercent: number;
    infillPattern: InfillPattern;
    lineMm: number;
    sanded: boolean;
    releaseAgent: ReleaseAgent;
    holeModel: HoleModel;
  };
  run: { pulls: number; cycleS: number; ambientC: number };
  /** cellMm null in a default recipe: chosen from the size; the report carries the size used. */
  grid: { cellMm: number | null; sheetNodes: number };
  /** Rates for the estimate of cost, in the studio's currency. */
  costs: { materialPerKg: number; machinePerHour: number; labour: number };
  limits: Limits;
}

type Loose<T> = { [K in keyof T]?: T[K] | null };

/** What a caller may give: any part of it, null meaning "take the default". */
export interface RecipeInput {
  schema?: 1;
  mesh?: Loose<EffectiveRecipe['mesh']>;
  machine?: Loose<EffectiveRecipe['machine']>;
  sheet?: Loose<Omit<EffectiveRecipe['sheet'], 'material'> & { material: string }>;
  print?: Loose<
    Omit<EffectiveRecipe['print'], 'material' | 'holeModel'> & {
      material: string;
      holeModel: Loose<HoleModel>;
    }
  >;
  run?: Loose<EffectiveRecipe['run']>;
  grid?: Loose<EffectiveRecipe['grid']>;
  costs?: Loose<EffectiveRecipe['costs']>;
  limits?: Loose<Limits>;
}

/**
 * The recipe that stands where nothing is said. Layer 0.15 mm, shell 4 mm, infill 35 % and the 0.4 mm
 * nozzle are common practice, no source; cost rates are examples, to be
 * replaced by the studio's own. `formingC` and `lineMm` follow from material and nozzle when left null.
 */
export function defaultRecipe(): EffectiveRecipe {
  return {
    schema: 1,
    mesh: { unit: 'mm', up: [0, 0, 1], dropToBed: true },
    machine: {
      formingAreaMm: [450, 300],
      maxHeightMm: 120,
      frameMarginMm: 30,
      frameMm: null,
      pressureBar: 4,
      ventedBed: true,
    },
    sheet: { material: 'petg', gaugeMm: 0.8, formingC: SHEETS.petg.formingC.value, minFormedMm: 0.35 },
    print: {
      material: 'pa12-cf',
      nozzleMm: 0.4,
      layerMm: 0.15,
      shellMm: 4,
      topMm: 4,
      infillPercent: 35,
      infillPattern: 'grid',
      lineMm: 0.45,
      sanded: false,
      releaseAgent: 'dry-ptfe',
      holeModel: { slope: 1, offsetMm: -0.2, minOpenMm: 0.4 },
    },
    run: { pulls: 50, cycleS: 90, ambientC: 23 },
    grid: { cellMm: null, sheetNodes: 128 },
    costs: { materialPerKg: 25, machinePerHour: 1.5, labour: 7.5 },
    limits: { ...DEFAULT_LIMITS },
  };
}
