import { z } from 'zod';
import { LIMIT_KEYS, LIMIT_RULES } from './limits';
import { FILAMENT_IDS } from './materials/filaments';
import { SHEET_IDS } from './materials/sheets';
import { defaultRecipe, INFILL_PATTERNS, MESH_UNITS, RELEASE_AGENTS } from './recipe';

const write = (value: number, unit: string) =>
  `${value.toLocaleString('en-GB', { maximumFractionDigits: 4 })}${unit === '°' ? unit : unit && ` ${unit}`}.`;
/** A figure in a range, both ends included, refused in our own words: they stand beside the field. */
const figure = (min: number, max: number, unit = '') =>
  z
    .number({ error: 'Write a figure.' })
    .min(min, { error: `At least ${write(min, unit)}` })
    .max(max, { error: `At most ${write(max, unit)}` });
const whole = (min: number, max: number) =>
  z
    .number({ error: 'Write a figure.' })
    .int({ error: 'Write a whole number.' })
    .min(min, { error: `At least ${write(min, '')}` })
    .max(max, { error: `At most ${write(max, '')}` });
const size = (min: number, max: number, unit = '') => figure(min, max, unit).nullish();
const pair = (min: number, max: number) =>
  z.tuple([figure(min, max, 'mm'), figure(min, max, 'mm')]).nullish();
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
  LIMIT_KEYS.map((key) => [
    key,
    size(LIMIT_RULES[key].min, LIMIT_RULES[key].max, LIMIT_RULES[key].unit.replace('deg', '°')),
  ]),
);

const usual = defaultRecipe().sheet;
/** Whether the thinnest allowed place is thinner than the sheet itself; nothing formed could meet it otherwise. */
const thinsFrom = (sheet: { gaugeMm?: number | null; minFormedMm?: number | null }) =>
  sheet.minFormedMm == null || sheet.minFormedMm < (sheet.gaugeMm ?? usual.gaugeMm);

/** The recipe as a caller may give it: every field may be missing or null, nothing unknown is let through. */
export const recipeSchema = z.strictObject({
  schema: z.literal(1).nullish(),
  mesh: z
    .strictObject({ unit: z.enum(MESH_UNITS).nullish(), up, dropToBed: z.boolean().nullish() })
    .nullish(),
  machine: z
    .strictObject({
      formingAreaMm: pair(10, 5000),
      maxHeightMm: size(1, 2000, 'mm'),
      frameMarginMm: size(0, 500, 'mm'),
      frameMm: pair(1, 5000),
      pressureBar: size(0, 20, 'bar'),
      ventedBed: z.boolean().nullish(),
    })
    .nullish(),
  sheet: z
    .strictObject({
      material: material('sheet material', SHEET_IDS),
      gaugeMm: size(0.05, 20, 'mm'),
      formingC: size(20, 400, '°C'),
      minFormedMm: size(0, 20, 'mm'),
    })
    .refine(thinsFrom, {
      path: ['minFormedMm'],
      error: ({ input }) => {
        const { gaugeMm } = input as { gaugeMm?: number | null };
        return `The sheet only thins as it is drawn: write less than its gauge of ${gaugeMm ?? usual.gaugeMm} mm.`;
      },
    })
    .nullish(),
  print: z
    .strictObject({
      material: material('filament', FILAMENT_IDS),
      nozzleMm: size(0.1, 3, 'mm'),
      layerMm: size(0.01, 2, 'mm'),
      shellMm: size(0.1, 200, 'mm'),
      topMm: size(0.1, 200, 'mm'),
      infillPercent: size(0, 100, '%'),
      infillPattern: z.enum(INFILL_PATTERNS).nullish(),
      lineMm: size(0.05, 5, 'mm'),
      sanded: z.boolean().nullish(),
      releaseAgent: z.enum(RELEASE_AGENTS).nullish(),
      holeModel: z
        .strictObject({ slope: size(0.1, 10), offsetMm: size(-5, 5, 'mm'), minOpenMm: size(0, 10, 'mm') })
        .nullish(),
    })
    .nullish(),
  run: z
    .strictObject({
      pulls: whole(1, 10_000).nullish(),
      cycleS: size(1, 86_400, 's'),
      ambientC: size(-40, 100, '°C'),
    })
    .nullish(),
  grid: z.strictObject({ cellMm: size(1e-4, 1000, 'mm'), sheetNodes: whole(8, 1024).nullish() }).nullish(),
  costs: z
    .strictObject({
      materialPerKg: size(0, 100_000),
      machinePerHour: size(0, 100_000),
      labour: size(0, 1_000_000),
    })
    .nullish(),
  limits: z.strictObject(limits).nullish(),
});
