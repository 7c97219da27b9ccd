import { doublePrecision, integer, jsonb, pgTable, text, unique, boolean } from 'drizzle-orm/pg-core';
import { createdAt, id, studioId, version } from '../columns';
import { studioPolicy } from '../policies';
import { studios } from './workspaces';

/** Forming machines: the frame that a template must fit. Lengths in mm, pressure in bar (gauge). */
export const machines = pgTable(
  'machines',
  {
    id: id(),
    studioId: studioId().references(() => studios.id),
    name: text('name').notNull(),
    formingXMm: doublePrecision('forming_x_mm').notNull(),
    formingYMm: doublePrecision('forming_y_mm').notNull(),
    maxHeightMm: doublePrecision('max_height_mm').notNull(),
    frameMarginMm: doublePrecision('frame_margin_mm').notNull(),
    pressureBar: doublePrecision('pressure_bar').notNull(),
    isDefault: boolean('is_default').notNull().default(false),
    createdAt: createdAt(),
    version: version(),
  },
  (t) => [
    unique('machines_pk').on(t.studioId, t.id),
    unique('machines_name').on(t.studioId, t.name),
    studioPolicy('machines'),
  ],
);

/** Filament printers with the nozzle that is usually fitted. Lengths in mm. */
export const printers = pgTable(
  'printers',
  {
    id: id(),
    studioId: studioId().references(() => studios.id),
    name: text('name').notNull(),
    buildXMm: doublePrecision('build_x_mm').notNull(),
    buildYMm: doublePrecision('build_y_mm').notNull(),
    buildZMm: doublePrecision('build_z_mm').notNull(),
    nozzleMm: doublePrecision('nozzle_mm').notNull(),
    layerMm: doublePrecision('layer_mm').notNull(),
    isDefault: boolean('is_default').notNull().default(false),
    createdAt: createdAt(),
    version: version(),
  },
  (t) => [
    unique('printers_pk').on(t.studioId, t.id),
    unique('printers_name').on(t.studioId, t.name),
    studioPolicy('printers'),
  ],
);

/** Sheet stock: a generic polymer of the engine's table, in the gauges that the studio keeps (mm). */
export const sheets = pgTable(
  'sheets',
  {
    id: id(),
    studioId: studioId().references(() => studios.id),
    name: text('name').notNull(),
    material: text('material').notNull(),
    gaugeMm: doublePrecision('gauge_mm').notNull(),
    minFormedMm: doublePrecision('min_formed_mm').notNull(),
    isDefault: boolean('is_default').notNull().default(false),
    createdAt: createdAt(),
    version: version(),
  },
  (t) => [
    unique('sheets_pk').on(t.studioId, t.id),
    unique('sheets_name').on(t.studioId, t.name),
    studioPolicy('sheets'),
  ],
);

/** Filaments: a generic polymer of the engine's table and how this studio prints it. */
export const filaments = pgTable(
  'filaments',
  {
    id: id(),
    studioId: studioId().references(() => studios.id),
    name: text('name').notNull(),
    material: text('material').notNull(),
    shellMm: doublePrecision('shell_mm').notNull(),
    topMm: doublePrecision('top_mm').notNull(),
    infillPercent: integer('infill_percent').notNull(),
    isDefault: boolean('is_default').notNull().default(false),
    createdAt: createdAt(),
    version: version(),
  },
  (t) => [
    unique('filaments_pk').on(t.studioId, t.id),
    unique('filaments_name').on(t.studioId, t.name),
    studioPolicy('filaments'),
  ],
);

/** Limits that a studio has moved from the engine's defaults: limit id → value, with who moved it in the audit. */
export const studioLimits = pgTable(
  'studio_limits',
  {
    id: id(),
    studioId: studioId().references(() => studios.id),
    limits: jsonb('limits').$type<Record<string, number>>().notNull(),
    createdAt: createdAt(),
    version: version(),
  },
  (t) => [
    unique('studio_limits_pk').on(t.studioId, t.id),
    unique('studio_limits_one').on(t.studioId),
    studioPolicy('studio_limits'),
  ],
);
