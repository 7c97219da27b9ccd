import { z } from 'zod';
import { LIMIT_KEYS, LIMIT_RULES } from './limits';
import { FILAMENT_IDS } from './materials/filaments';
import { SHEET_IDS } from './materials/sheets';
import { INFILL_PATTERNS, MESH_UNITS, RELEASE_AGENTS } from './recipe';

const size = (min: number, max: number) => z.number().min(min).max(max).nullish();
const pair = (min: number, max: number) =>
  z.tuple([z.number().min(min).max(max), z.number().min(min).max(max)]).nullish();
const material = (kind: string, ids: readonly string[]) =>
  z
    .string()
    .refine((id) => ids.includes(id), {
      error: (issue) => `unknown ${kind} ${JSON.stringify(issue.input)}; the library has ${ids.join(', ')}`,
    })
    .nullish();

const up = z
  .tuple([z.number(), z.number(), z.number()])
  .refine((v) => Math.hypot(...v) > 1e-6, 'needs a direction, not a zero vector')
  .nullish();

const limits = Object.fromEntries(
  LIMIT_KEYS.map((key) => [key, size(LIMIT_RULES[key].min, LIMIT_RULES[key].max)]),
);

/** The recipe as a caller may give it: every field may be missing or null, nothing unknown is let through. */
export const recipeSchema = z.strictObject({
  schema: z.literal(1).nullish(),
  mesh: z
    .strictObject({ unit: z.enum(MESH_UNITS).nullish(), up, dropToBed: z.boolean().nullish() })
    .nullish(),
  machine: z
    .strictObject({
      formingAreaMm: pair(10, 5000),
      maxHeightMm: size(1, 2000),
      frameMarginMm: size(0, 500),
      frameMm: pair(1, 5000),
      pressureBar: size(0, 20),
      ventedBed: z.boolean().nullish(),
    })
    .nullish(),
  sheet: z
    .strictObject({
      material: material('sheet material', SHEET_IDS),
      gaugeMm: size(0.05, 20),
      formingC: size(20, 400),
      minFormedMm: size(0, 20),
    })
    .nullish(),
  print: z
    .strictObject({
      material: material('filament', FILAMENT_IDS),
      nozzleMm: size(0.1, 3),
      layerMm: size(0.01, 2),
      shellMm: size(0.1, 200),
      topMm: size(0.1, 200),
      infillPercent: size(0, 100),
      infillPattern: z.enum(INFILL_PATTERNS).nullish(),
      lineMm: size(0.05, 5),
      sanded: z.boolean().nullish(),
      releaseAgent: z.enum(RELEASE_AGENTS).nullish(),
      holeModel: z
        .strictObject({ slope: size(0.1, 10), offsetMm: size(-5, 5), minOpenMm: size(0, 10) })
        .nullish(),
    })
    .nullish(),
  run: z
    .strictObject({
      pulls: z.number().int().min(1).max(1_000_000).nullish(),
      cycleS: size(1, 86_400),
      ambientC: size(-40, 100),
    })
    .nullish(),
  grid: z
    .strictObject({ cellMm: size(1e-4, 1000), sheetNodes: z.number().int().min(8).max(1024).nullish() })
    .nullish(),
  costs: z
    .strictObject({
      materialPerKg: size(0, 100_000),
      machinePerHour: size(0, 100_000),
      labour: size(0, 1_000_000),
    })
    .nullish(),
  limits: z.strictObject(limits).nullish(),
});
