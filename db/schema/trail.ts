import {
  index,
  integer,
  jsonb,
  pgPolicy,
  pgTable,
  primaryKey,
  text,
  unique,
  uniqueIndex,
  uuid,
} from 'drizzle-orm/pg-core';
import { createdAt, id, instant, printedName, studioId, workspaceId } from '../columns';
import { sql } from 'drizzle-orm';
import { authRole, relayPolicy, studioPolicy, workspacePolicy } from '../policies';
import { studios, workspaces } from './workspaces';
import { users } from './identity';

/** Head of a workspace's audit chain; its row lock orders the writers. */
export const auditHeads = pgTable(
  'audit_heads',
  {
    workspaceId: workspaceId()
      .primaryKey()
      .references(() => workspaces.id),
    seq: integer('seq').notNull().default(0),
    hash: text('hash').notNull(),
  },
  () => [workspacePolicy('audit_heads')],
);

/** What was done, by whom, when: hash = SHA-256(0x00 ‖ previous ‖ canonical entry). Frozen. */
export const auditEntries = pgTable(
  'audit_entries',
  {
    workspaceId: workspaceId().references(() => workspaces.id),
    seq: integer('seq').notNull(),
    at: instant('at').notNull(),
    actorId: uuid('actor_id'),
    actorName: printedName('actor_name'),
    action: text('action').notNull(),
    subjectKind: text('subject_kind').notNull(),
    subjectId: uuid('subject_id').notNull(),
    detail: jsonb('detail').$type<Record<string, unknown>>().notNull(),
    previous: text('previous').notNull(),
    hash: text('hash').notNull(),
  },
  (t) => [primaryKey({ columns: [t.workspaceId, t.seq] }), workspacePolicy('audit_entries')],
);

/** What was done at a studio outside any workspace: people, library, limits. Frozen. */
export const studioEntries = pgTable(
  'studio_entries',
  {
    id: id(),
    studioId: studioId().references(() => studios.id),
    actorId: uuid('actor_id'),
    actorName: printedName('actor_name'),
    action: text('action').notNull(),
    detail: jsonb('detail').$type<Record<string, unknown>>().notNull(),
    createdAt: createdAt(),
  },
  (t) => [unique('studio_entries_pk').on(t.studioId, t.id), studioPolicy('studio_entries')],
);

/**
 * What must leave the database after commit: live events and mails. The relay sends each once,
 * drops repeats by `dedupeKey`, and tries again with growing pauses.
 */
export const outbox = pgTable(
  'outbox',
  {
    id: id().primaryKey(),
    workspaceId: uuid('workspace_id').references(() => workspaces.id),
    studioId: uuid('studio_id').references(() => studios.id),
    kind: text('kind', { enum: ['live', 'mail'] }).notNull(),
    payload: jsonb('payload').$type<Record<string, unknown>>().notNull(),
    dedupeKey: text('dedupe_key').notNull(),
    attempts: integer('attempts').notNull().default(0),
    dueAt: instant('due_at').notNull().defaultNow(),
    sentAt: instant('sent_at'),
    failure: text('failure'),
    createdAt: createdAt(),
  },
  (t) => [
    index('outbox_due')
      .on(t.dueAt)
      .where(sql`sent_at is null and failure is null`),
    uniqueIndex('outbox_occasion').on(t.dedupeKey),
    relayPolicy('outbox'),
    workspacePolicy('outbox'),
    studioPolicy('outbox_studio'),
    // Mails of identity (verify an address, reset a password) belong to no tenant.
    pgPolicy('outbox_identity', {
      for: 'insert',
      to: authRole,
      withCheck: sql`workspace_id is null and studio_id is null and kind = 'mail'`,
    }),
  ],
);

/** Answers kept for repeated requests (draft-ietf-httpapi-idempotency-key-header), a key per person and route. */
export const idempotencyKeys = pgTable(
  'idempotency_keys',
  {
    workspaceId: workspaceId().references(() => workspaces.id),
    userId: uuid('user_id')
      .notNull()
      .references(() => users.id),
    route: text('route').notNull(),
    key: text('key').notNull(),
    requestHash: text('request_hash').notNull(),
    /** 0 while the first request is still at work. */
    status: integer('status').notNull().default(0),
    response: jsonb('response').$type<unknown>(),
    createdAt: createdAt(),
  },
  (t) => [
    primaryKey({ columns: [t.workspaceId, t.userId, t.route, t.key] }),
    workspacePolicy('idempotency_keys'),
  ],
);
