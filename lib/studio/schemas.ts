import { z } from 'zod';
import { LIMIT_RULES, LIMIT_KEYS, type LimitKey } from '@/lib/formability/limits';
import { FILAMENT_IDS, type FilamentId } from '@/lib/formability/materials/filaments';
import { SHEET_IDS, type SheetId } from '@/lib/formability/materials/sheets';
import { shortText, TimeZone } from '@/lib/workspaces/schemas';

/** Inputs and outputs of a studio: its opening, its library, its limits. Lengths mm, pressure bar (gauge). */

export const OpenStudioInput = z.object({
  name: shortText('the studio’s name', 60),
  timeZone: TimeZone.optional(),
});
export type OpenStudioInput = z.infer<typeof OpenStudioInput>;

const name = shortText('a name', 60);
const isDefault = z.boolean().default(false);
const number = (what: string, unit: string, min: number, max: number) =>
  z
    .number(`Give ${what[0].toLowerCase()}${what.slice(1)} as a number of ${unit}.`)
    .min(min, `${what} is at least ${min} ${unit}.`)
    .max(max, `${what} is at most ${max} ${unit}.`);

export const MachineInput = z.object({
  name,
  formingXMm: number('The forming area’s width', 'mm', 20, 3000),
  formingYMm: number('The forming area’s depth', 'mm', 20, 3000),
  maxHeightMm: number('The greatest template height', 'mm', 5, 1000),
  frameMarginMm: number('The margin to the frame', 'mm', 0, 300),
  pressureBar: number('The forming pressure', 'bar', 0.1, 12),
  isDefault,
});
export const PrinterInput = z.object({
  name,
  buildXMm: number('The build width', 'mm', 20, 3000),
  buildYMm: number('The build depth', 'mm', 20, 3000),
  buildZMm: number('The build height', 'mm', 20, 3000),
  nozzleMm: number('The nozzle', 'mm', 0.1, 2),
  layerMm: number('The layer', 'mm', 0.02, 1),
  isDefault,
});
export const SheetInput = z.object({
  name,
  material: z.enum(SHEET_IDS as [SheetId, ...SheetId[]], 'Choose a sheet material of the list.'),
  gaugeMm: number('The gauge', 'mm', 0.05, 15),
  minFormedMm: number('The least formed thickness', 'mm', 0.01, 15),
  isDefault,
});
export const FilamentInput = z.object({
  name,
  material: z.enum(FILAMENT_IDS as [FilamentId, ...FilamentId[]], 'Choose a template material of the list.'),
  shellMm: number('The shell', 'mm', 0.2, 100),
  topMm: number('The top', 'mm', 0.2, 100),
  infillPercent: number('The infill', '%', 0, 100).int('The infill is a whole number of %.'),
  isDefault,
});

export const libraryKinds = ['machines', 'printers', 'sheets', 'filaments'] as const;
export type LibraryKind = (typeof libraryKinds)[number];
export const LibraryKind = z.enum(libraryKinds);

/** Dynamic parts of paths. */
export const ShelfParams = z.object({ kind: LibraryKind });
export const ItemParams = z.object({ kind: LibraryKind, item: z.uuid() });

/** What an item of each shelf is made of. */
export const libraryInputs = {
  machines: MachineInput,
  printers: PrinterInput,
  sheets: SheetInput,
  filaments: FilamentInput,
};
export type LibraryInput<K extends LibraryKind> = z.infer<(typeof libraryInputs)[K]>;

const kept = { id: z.uuid(), version: z.number().int() };
export const LimitsView = z.object({
  /** Only the limits that the studio has moved; the others stand at the engine's values. */
  moved: z.partialRecord(z.enum(LIMIT_KEYS as [LimitKey, ...LimitKey[]]), z.number()),
  version: z.number().int(),
});
export const LibraryView = z.object({
  machines: z.array(MachineInput.extend(kept)),
  printers: z.array(PrinterInput.extend(kept)),
  sheets: z.array(SheetInput.extend(kept)),
  filaments: z.array(FilamentInput.extend(kept)),
  limits: LimitsView,
  /** Whether the reader may change the shelves, and the limits. */
  mayChange: z.boolean(),
  maySetLimits: z.boolean(),
});
export type LibraryView = z.infer<typeof LibraryView>;
export type LibraryItem<K extends LibraryKind = LibraryKind> = LibraryView[K][number];

/** The limits that stand after the change; those left out go back to the engine's values. */
export const SetLimitsInput = z.object({
  limits: z
    .partialRecord(
      z.enum(LIMIT_KEYS as [LimitKey, ...LimitKey[]], 'There is no such limit.'),
      z.number('Give a number.'),
    )
    .superRefine((limits, check) => {
      for (const [key, value] of Object.entries(limits) as [LimitKey, number][]) {
        const { min, max, unit } = LIMIT_RULES[key];
        if (value < min || value > max)
          check.addIssue({
            code: 'custom',
            path: [key],
            message: `Between ${min} and ${max} ${unit}`.trim() + '.',
          });
      }
    }),
});
export type SetLimitsInput = z.infer<typeof SetLimitsInput>;
