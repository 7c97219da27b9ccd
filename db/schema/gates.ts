import { sql } from 'drizzle-orm';
import {
  check,
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
import { relayPolicy, workspacePolicy } from '../policies';
import { users } from './identity';
import { revisions } from './templates';
import { workspaces, type GateRule } from './workspaces';

/** The gates of one revision, in order, under the plan that it was posted with. */
export const gates = pgTable(
  'gates',
  {
    id: id(),
    workspaceId: workspaceId(),
    revisionId: uuid('revision_id').notNull(),
    ordinal: integer('ordinal').notNull(),
    rule: jsonb('rule').$type<GateRule>().notNull(),
    state: text('state', { enum: ['waiting', 'open', 'passed', 'returned', 'closed'] })
      .notNull()
      .default('waiting'),
    openedAt: instant('opened_at'),
    passedAt: instant('passed_at'),
    /** Last day for signing, in the workspace's zone; set when the gate opens. */
    dueOn: date('due_on', { mode: 'string' }),
    version: version(),
  },
  (t) => [
    primaryKey({ columns: [t.workspaceId, t.id] }),
    unique('gates_order').on(t.workspaceId, t.revisionId, t.ordinal),
    foreignKey({
      columns: [t.workspaceId, t.revisionId],
      foreignColumns: [revisions.workspaceId, revisions.id],
    }),
    index('gates_open')
      .on(t.workspaceId)
      .where(sql`state = 'open'`),
    workspacePolicy('gates'),
    relayPolicy('gates'),
  ],
);

/** A name put to exactly this content. Frozen. */
export const signatures = pgTable(
  'signatures',
  {
    id: id(),
    workspaceId: workspaceId(),
    revisionId: uuid('revision_id').notNull(),
    gateId: uuid('gate_id').notNull(),
    decision: text('decision', { enum: ['sign', 'return'] }).notNull(),
    signerId: uuid('signer_id')
      .notNull()
      .references(() => users.id),
    printedName: printedName('printed_name'),
    role: text('role').notNull(),
    meaning: text('meaning').notNull(),
    reason: text('reason'),
    contentDigest: text('content_digest').notNull(),
    method: text('method').notNull(),
    signedAt: instant('signed_at').notNull(),
    timeZone: text('time_zone').notNull(),
    /** Whom the signer stood in for at this gate, with the name as it was then. */
    signedForId: uuid('signed_for_id').references(() => users.id),
    signedForName: text('signed_for_name'),
  },
  (t) => [
    primaryKey({ columns: [t.workspaceId, t.id] }),
    check('signatures_for_another', sql`signed_for_id <> signer_id`),
    unique('signatures_once').on(t.workspaceId, t.gateId, t.signerId),
    index('signatures_revision').on(t.workspaceId, t.revisionId),
    foreignKey({
      columns: [t.workspaceId, t.revisionId],
      foreignColumns: [revisions.workspaceId, revisions.id],
    }),
    foreignKey({ columns: [t.workspaceId, t.gateId], foreignColumns: [gates.workspaceId, gates.id] }),
    workspacePolicy('signatures'),
  ],
);

/** Who signs for whom, from the first day to the last in the workspace's zone. Ended early, it stays to be seen. */
export const standIns = pgTable(
  'stand_ins',
  {
    id: id(),
    workspaceId: workspaceId().references(() => workspaces.id),
    /** Who is away. */
    personId: uuid('person_id')
      .notNull()
      .references(() => users.id),
    standInId: uuid('stand_in_id')
      .notNull()
      .references(() => users.id),
    fromOn: date('from_on', { mode: 'string' }).notNull(),
    untilOn: date('until_on', { mode: 'string' }).notNull(),
    createdAt: createdAt(),
    endedAt: instant('ended_at'),
  },
  (t) => [
    primaryKey({ columns: [t.workspaceId, t.id] }),
    index('stand_ins_until').on(t.workspaceId, t.untilOn),
    check('stand_ins_span', sql`from_on <= until_on`),
    check('stand_ins_other', sql`person_id <> stand_in_id`),
    workspacePolicy('stand_ins'),
  ],
);

/** What was agreed: the content whose digest was signed, and its digest. One a revision. Frozen. */
export const locks = pgTable(
  'locks',
  {
    workspaceId: workspaceId(),
    revisionId: uuid('revision_id').notNull(),
    contentDigest: text('content_digest').notNull(),
    content: jsonb('content').$type<Record<string, unknown>>().notNull(),
    /** The whole docket as it stood: findings, threads, notes, waivers. */
    docket: jsonb('docket').$type<Record<string, unknown>>().notNull(),
    lockedAt: instant('locked_at').notNull(),
  },
  (t) => [
    primaryKey({ columns: [t.workspaceId, t.revisionId] }),
    foreignKey({
      columns: [t.workspaceId, t.revisionId],
      foreignColumns: [revisions.workspaceId, revisions.id],
    }),
    workspacePolicy('locks'),
  ],
);

/** An approved revision handed to production. Frozen. */
export const releases = pgTable(
  'releases',
  {
    id: id(),
    workspaceId: workspaceId(),
    revisionId: uuid('revision_id').notNull(),
    releasedBy: uuid('released_by')
      .notNull()
      .references(() => users.id),
    releasedByName: printedName('released_by_name'),
    note: text('note').notNull().default(''),
    jobId: uuid('job_id').notNull(),
    createdAt: createdAt(),
  },
  (t) => [
    primaryKey({ columns: [t.workspaceId, t.id] }),
    unique('releases_one').on(t.workspaceId, t.revisionId),
    foreignKey({
      columns: [t.workspaceId, t.revisionId],
      foreignColumns: [revisions.workspaceId, revisions.id],
    }),
    workspacePolicy('releases'),
  ],
);

/** The release pack as built: one file in the store. Frozen. */
export const packs = pgTable(
  'packs',
  {
    id: id(),
    workspaceId: workspaceId(),
    releaseId: uuid('release_id').notNull(),
    fileName: text('file_name').notNull(),
    storeKey: text('store_key').notNull(),
    bytes: integer('bytes').notNull(),
    sha256: text('sha256').notNull(),
    files: jsonb('files').$type<{ name: string; bytes: number; sha256: string }[]>().notNull(),
    createdAt: createdAt(),
  },
  (t) => [
    primaryKey({ columns: [t.workspaceId, t.id] }),
    unique('packs_one').on(t.workspaceId, t.releaseId),
    foreignKey({
      columns: [t.workspaceId, t.releaseId],
      foreignColumns: [releases.workspaceId, releases.id],
    }),
    workspacePolicy('packs'),
  ],
);
