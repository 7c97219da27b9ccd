import {
  bigint,
  date,
  foreignKey,
  index,
  integer,
  jsonb,
  pgTable,
  primaryKey,
  text,
  unique,
  uuid,
} from 'drizzle-orm/pg-core';
import { createdAt, id, instant, printedName, version, workspaceId } from '../columns';
import { workspacePolicy } from '../policies';
import { users } from './identity';
import { gatePlans, workspaces } from './workspaces';

export const standings = [
  'draft',
  'in_review',
  'approved',
  'returned',
  'withdrawn',
  'released',
  'recalled',
  'superseded',
  'retired',
] as const;

/** A forming tool that studio and client settle, through lettered revisions. */
export const templates = pgTable(
  'templates',
  {
    id: id(),
    workspaceId: workspaceId().references(() => workspaces.id),
    serial: integer('serial').notNull(),
    number: text('number').notNull(),
    title: text('title').notNull(),
    dueOn: date('due_on', { mode: 'string' }),
    /** State of the revision that counts (lib/review/standing.ts), kept for lists; `draft` before any is posted. */
    standing: text('standing', { enum: standings }).notNull().default('draft'),
    standingRevisionId: uuid('standing_revision_id'),
    standingLetter: text('standing_letter'),
    /** The newest revision and its state: another one than the above while a newer one is on its way. */
    latestRevisionId: uuid('latest_revision_id'),
    latestLetter: text('latest_letter'),
    latestStanding: text('latest_standing', { enum: standings }),
    createdBy: uuid('created_by')
      .notNull()
      .references(() => users.id),
    createdAt: createdAt(),
    changedAt: instant('changed_at').notNull().defaultNow(),
    version: version(),
  },
  (t) => [
    primaryKey({ columns: [t.workspaceId, t.id] }),
    unique('templates_number').on(t.workspaceId, t.number),
    unique('templates_serial').on(t.workspaceId, t.serial),
    index('templates_changed').on(t.workspaceId, t.changedAt.desc(), t.id),
    index('templates_due').on(t.workspaceId, t.dueOn, t.id),
    workspacePolicy('templates'),
  ],
);

export type UploadedPart = { number: number; etag: string };

/** A file on its way from a browser to the store, part by part; becomes a mesh when the worker has read it. */
export const uploads = pgTable(
  'uploads',
  {
    id: id(),
    workspaceId: workspaceId(),
    templateId: uuid('template_id').notNull(),
    fileName: text('file_name').notNull(),
    bytes: bigint('bytes', { mode: 'number' }).notNull(),
    /** When the file was last written, ms since 1970 in UTC; tells a newer export of the same name and size. */
    lastModified: bigint('last_modified', { mode: 'number' }),
    unit: text('unit').notNull().default('mm'),
    storeKey: text('store_key').notNull(),
    multipartId: text('multipart_id').notNull(),
    partBytes: integer('part_bytes').notNull(),
    parts: jsonb('parts').$type<UploadedPart[]>().notNull().default([]),
    state: text('state', { enum: ['sending', 'reading', 'ready', 'refused', 'cancelled'] })
      .notNull()
      .default('sending'),
    /** Why the file was refused: what is wrong, where, what to do. */
    refusal: jsonb('refusal').$type<{ code: string; message: string; reasons: string[] }>(),
    meshId: uuid('mesh_id'),
    createdBy: uuid('created_by')
      .notNull()
      .references(() => users.id),
    createdAt: createdAt(),
    version: version(),
  },
  (t) => [
    primaryKey({ columns: [t.workspaceId, t.id] }),
    foreignKey({
      columns: [t.workspaceId, t.templateId],
      foreignColumns: [templates.workspaceId, templates.id],
    }),
    index('uploads_template').on(t.workspaceId, t.templateId),
    workspacePolicy('uploads'),
  ],
);

/** The exact bytes of a posted model: written once, named by their hash. Frozen. */
export const meshes = pgTable(
  'meshes',
  {
    id: id(),
    workspaceId: workspaceId(),
    templateId: uuid('template_id').notNull(),
    fileName: text('file_name').notNull(),
    bytes: bigint('bytes', { mode: 'number' }).notNull(),
    sha256: text('sha256').notNull(),
    format: text('format', { enum: ['stl-binary', 'stl-ascii', '3mf', 'step'] }).notNull(),
    unit: text('unit').notNull(),
    triangles: integer('triangles').notNull(),
    boundsMm: jsonb('bounds_mm').$type<{ min: number[]; max: number[] }>().notNull(),
    storeKey: text('store_key').notNull(),
    createdBy: uuid('created_by')
      .notNull()
      .references(() => users.id),
    createdAt: createdAt(),
  },
  (t) => [
    primaryKey({ columns: [t.workspaceId, t.id] }),
    foreignKey({
      columns: [t.workspaceId, t.templateId],
      foreignColumns: [templates.workspaceId, templates.id],
    }),
    workspacePolicy('meshes'),
  ],
);

/** What the next revision will be: changes freely until it is posted. One a template. */
export const drafts = pgTable(
  'drafts',
  {
    id: id(),
    workspaceId: workspaceId(),
    templateId: uuid('template_id').notNull(),
    uploadId: uuid('upload_id'),
    recipe: jsonb('recipe').$type<Record<string, unknown>>().notNull(),
    note: text('note').notNull().default(''),
    authorId: uuid('author_id')
      .notNull()
      .references(() => users.id),
    createdAt: createdAt(),
    /** Who saved it last; null until somebody has. */
    changedBy: uuid('changed_by').references(() => users.id),
    changedAt: instant('changed_at').notNull().defaultNow(),
    version: version(),
  },
  (t) => [
    primaryKey({ columns: [t.workspaceId, t.id] }),
    unique('drafts_one').on(t.workspaceId, t.templateId),
    foreignKey({
      columns: [t.workspaceId, t.templateId],
      foreignColumns: [templates.workspaceId, templates.id],
    }),
    foreignKey({ columns: [t.workspaceId, t.uploadId], foreignColumns: [uploads.workspaceId, uploads.id] }),
    workspacePolicy('drafts'),
  ],
);

/** How a revision will be printed and formed: the effective recipe, frozen at posting. */
export const recipes = pgTable(
  'recipes',
  {
    id: id(),
    workspaceId: workspaceId(),
    body: jsonb('body').$type<Record<string, unknown>>().notNull(),
    /** SHA-256 over the RFC 8785 canonical JSON of `body`. */
    digest: text('digest').notNull(),
    sheetMaterial: text('sheet_material').notNull(),
    gaugeMm: text('gauge_mm').notNull(),
    printMaterial: text('print_material').notNull(),
    nozzleMm: text('nozzle_mm').notNull(),
    layerMm: text('layer_mm').notNull(),
    createdAt: createdAt(),
  },
  (t) => [primaryKey({ columns: [t.workspaceId, t.id] }), workspacePolicy('recipes')],
);

/** One posted state of a template. Only its state may move, along the legal edges (a trigger holds them). */
export const revisions = pgTable(
  'revisions',
  {
    id: id(),
    workspaceId: workspaceId(),
    templateId: uuid('template_id').notNull(),
    ordinal: integer('ordinal').notNull(),
    letter: text('letter').notNull(),
    meshId: uuid('mesh_id').notNull(),
    recipeId: uuid('recipe_id').notNull(),
    gatePlanId: uuid('gate_plan_id').notNull(),
    note: text('note').notNull().default(''),
    authorId: uuid('author_id')
      .notNull()
      .references(() => users.id),
    authorName: printedName('author_name'),
    state: text('state', { enum: standings }).notNull().default('in_review'),
    stateReason: text('state_reason'),
    stateAt: instant('state_at').notNull().defaultNow(),
    postedAt: instant('posted_at').notNull().defaultNow(),
    version: version(),
  },
  (t) => [
    primaryKey({ columns: [t.workspaceId, t.id] }),
    unique('revisions_ordinal').on(t.workspaceId, t.templateId, t.ordinal),
    unique('revisions_letter').on(t.workspaceId, t.templateId, t.letter),
    foreignKey({
      columns: [t.workspaceId, t.templateId],
      foreignColumns: [templates.workspaceId, templates.id],
    }),
    foreignKey({ columns: [t.workspaceId, t.meshId], foreignColumns: [meshes.workspaceId, meshes.id] }),
    foreignKey({ columns: [t.workspaceId, t.recipeId], foreignColumns: [recipes.workspaceId, recipes.id] }),
    foreignKey({
      columns: [t.workspaceId, t.gatePlanId],
      foreignColumns: [gatePlans.workspaceId, gatePlans.id],
    }),
    workspacePolicy('revisions'),
  ],
);
