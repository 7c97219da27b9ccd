import {
  bigint,
  doublePrecision,
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
import { relayPolicy, workspacePolicy } from '../policies';
import { users } from './identity';
import { meshes, revisions } from './templates';

/** Background work. Written in the caller's transaction; a lease with an attempt number fences out dead workers. */
export const jobs = pgTable(
  'jobs',
  {
    id: id(),
    workspaceId: workspaceId(),
    kind: text('kind', { enum: ['read-upload', 'check-revision', 'build-pack'] }).notNull(),
    subjectId: uuid('subject_id').notNull(),
    /** Digest of the inputs, so that a late worker cannot answer another question. */
    inputDigest: text('input_digest').notNull(),
    state: text('state', { enum: ['queued', 'running', 'done', 'failed', 'cancelled'] })
      .notNull()
      .default('queued'),
    /** Rises with every try and fences out the earlier ones. */
    attempt: integer('attempt').notNull().default(0),
    /** Tries that a stopping worker gave back unspent. */
    handedBack: integer('handed_back').notNull().default(0),
    leaseUntil: instant('lease_until'),
    worker: text('worker'),
    stage: text('stage'),
    progress: doublePrecision('progress').notNull().default(0),
    error: text('error'),
    createdAt: createdAt(),
    startedAt: instant('started_at'),
    finishedAt: instant('finished_at'),
  },
  (t) => [
    primaryKey({ columns: [t.workspaceId, t.id] }),
    index('jobs_due').on(t.state, t.leaseUntil),
    index('jobs_subject').on(t.workspaceId, t.subjectId),
    workspacePolicy('jobs'),
    relayPolicy('jobs'),
  ],
);

/** What the engine said of one mesh under one recipe: stored once and reused. Frozen. */
export const reports = pgTable(
  'reports',
  {
    id: id(),
    workspaceId: workspaceId(),
    meshSha256: text('mesh_sha256').notNull(),
    recipeDigest: text('recipe_digest').notNull(),
    engineVersion: text('engine_version').notNull(),
    body: jsonb('body').$type<Record<string, unknown>>().notNull(),
    /** SHA-256 over the RFC 8785 canonical JSON of `body`. */
    sha256: text('sha256').notNull(),
    createdAt: createdAt(),
  },
  (t) => [
    primaryKey({ columns: [t.workspaceId, t.id] }),
    unique('reports_input').on(t.workspaceId, t.meshSha256, t.recipeDigest, t.engineVersion),
    workspacePolicy('reports'),
  ],
);

/** The check run of a revision: which job, which report, which verdict. */
export const checkRuns = pgTable(
  'check_runs',
  {
    id: id(),
    workspaceId: workspaceId(),
    revisionId: uuid('revision_id').notNull(),
    jobId: uuid('job_id').notNull(),
    state: text('state', { enum: ['queued', 'running', 'finished', 'failed'] })
      .notNull()
      .default('queued'),
    verdict: text('verdict', { enum: ['pass', 'caution', 'fail'] }),
    reportId: uuid('report_id'),
    error: text('error'),
    createdAt: createdAt(),
    finishedAt: instant('finished_at'),
    version: version(),
  },
  (t) => [
    primaryKey({ columns: [t.workspaceId, t.id] }),
    unique('check_runs_one').on(t.workspaceId, t.revisionId),
    foreignKey({
      columns: [t.workspaceId, t.revisionId],
      foreignColumns: [revisions.workspaceId, revisions.id],
    }),
    foreignKey({ columns: [t.workspaceId, t.jobId], foreignColumns: [jobs.workspaceId, jobs.id] }),
    foreignKey({ columns: [t.workspaceId, t.reportId], foreignColumns: [reports.workspaceId, reports.id] }),
    workspacePolicy('check_runs'),
  ],
);

/** What the page shows of a mesh: a compact model, a drawn picture. Made by the worker, never the agreed bytes. */
export const derivatives = pgTable(
  'derivatives',
  {
    id: id(),
    workspaceId: workspaceId(),
    meshId: uuid('mesh_id').notNull(),
    kind: text('kind', { enum: ['model', 'picture', 'thumbnail', 'sheet'] }).notNull(),
    /** Of the recipe that the sheet was formed under; empty for what shows the mesh alone. */
    recipeDigest: text('recipe_digest').notNull().default(''),
    storeKey: text('store_key').notNull(),
    bytes: bigint('bytes', { mode: 'number' }).notNull(),
    sha256: text('sha256').notNull(),
    meta: jsonb('meta').$type<Record<string, unknown>>().notNull(),
    createdAt: createdAt(),
  },
  (t) => [
    primaryKey({ columns: [t.workspaceId, t.id] }),
    unique('derivatives_kind').on(t.workspaceId, t.meshId, t.kind, t.recipeDigest),
    foreignKey({ columns: [t.workspaceId, t.meshId], foreignColumns: [meshes.workspaceId, meshes.id] }),
    workspacePolicy('derivatives'),
  ],
);

export type FindingPlace = { at: [number, number, number]; areaMm2: number };
export type FindingBasis = { source: string; kind: string };

/** One thing that a check says about a revision. Frozen. */
export const findings = pgTable(
  'findings',
  {
    id: id(),
    workspaceId: workspaceId(),
    revisionId: uuid('revision_id').notNull(),
    ordinal: integer('ordinal').notNull(),
    checkId: text('check_id').notNull(),
    status: text('status', { enum: ['pass', 'caution', 'fail', 'not-run'] }).notNull(),
    measured: doublePrecision('measured'),
    limit: doublePrecision('limit_value'),
    unit: text('unit').notNull(),
    message: text('message').notNull(),
    remedy: text('remedy').notNull(),
    basis: jsonb('basis').$type<FindingBasis>().notNull(),
    places: jsonb('places').$type<FindingPlace[]>().notNull(),
    createdAt: createdAt(),
  },
  (t) => [
    primaryKey({ columns: [t.workspaceId, t.id] }),
    unique('findings_check').on(t.workspaceId, t.revisionId, t.checkId, t.ordinal),
    foreignKey({
      columns: [t.workspaceId, t.revisionId],
      foreignColumns: [revisions.workspaceId, revisions.id],
    }),
    workspacePolicy('findings'),
  ],
);

/** A lead lets a failing finding stand, with a reason that is shown for ever after. Frozen. */
export const waivers = pgTable(
  'waivers',
  {
    id: id(),
    workspaceId: workspaceId(),
    revisionId: uuid('revision_id').notNull(),
    findingId: uuid('finding_id').notNull(),
    reason: text('reason').notNull(),
    waivedBy: uuid('waived_by')
      .notNull()
      .references(() => users.id),
    waivedByName: printedName('waived_by_name'),
    createdAt: createdAt(),
  },
  (t) => [
    primaryKey({ columns: [t.workspaceId, t.id] }),
    unique('waivers_one').on(t.workspaceId, t.findingId),
    foreignKey({
      columns: [t.workspaceId, t.findingId],
      foreignColumns: [findings.workspaceId, findings.id],
    }),
    foreignKey({
      columns: [t.workspaceId, t.revisionId],
      foreignColumns: [revisions.workspaceId, revisions.id],
    }),
    workspacePolicy('waivers'),
  ],
);
