import {
  boolean,
  doublePrecision,
  foreignKey,
  index,
  jsonb,
  pgTable,
  primaryKey,
  text,
  unique,
  uuid,
} from 'drizzle-orm/pg-core';
import { createdAt, id, instant, printedName, version, workspaceId } from '../columns';
import { workspacePolicy } from '../policies';
import { findings } from './checks';
import { users } from './identity';
import { revisions, templates } from './templates';

export type View = { position: number[]; target: number[]; up: number[] };
export type Pin = { at: [number, number, number]; normal: [number, number, number]; view: View | null };

/** A matter raised by a person, or the answers to a finding. Belongs to the template and travels with it. */
export const threads = pgTable(
  'threads',
  {
    id: id(),
    workspaceId: workspaceId(),
    templateId: uuid('template_id').notNull(),
    /** The revision on which it was opened. */
    revisionId: uuid('revision_id').notNull(),
    findingId: uuid('finding_id'),
    /** Threads of an older, locked docket that this one goes on with, oldest first: their notes are read along. */
    continues: jsonb('continues').$type<string[]>().notNull().default([]),
    mustSettle: boolean('must_settle').notNull().default(false),
    /** Opened after the revision was locked: outside what was agreed. */
    afterApproval: boolean('after_approval').notNull().default(false),
    state: text('state', { enum: ['open', 'settled'] })
      .notNull()
      .default('open'),
    settledBy: uuid('settled_by').references(() => users.id),
    settledByName: text('settled_by_name'),
    settledAt: instant('settled_at'),
    openedBy: uuid('opened_by')
      .notNull()
      .references(() => users.id),
    openedByName: printedName('opened_by_name'),
    createdAt: createdAt(),
    version: version(),
  },
  (t) => [
    primaryKey({ columns: [t.workspaceId, t.id] }),
    unique('threads_finding').on(t.workspaceId, t.findingId),
    index('threads_template').on(t.workspaceId, t.templateId),
    foreignKey({
      columns: [t.workspaceId, t.templateId],
      foreignColumns: [templates.workspaceId, templates.id],
    }),
    foreignKey({
      columns: [t.workspaceId, t.revisionId],
      foreignColumns: [revisions.workspaceId, revisions.id],
    }),
    foreignKey({
      columns: [t.workspaceId, t.findingId],
      foreignColumns: [findings.workspaceId, findings.id],
    }),
    workspacePolicy('threads'),
  ],
);

/** Where a thread stands on a revision: placed there, or carried over from the one before. */
export const placements = pgTable(
  'placements',
  {
    id: id(),
    workspaceId: workspaceId(),
    threadId: uuid('thread_id').notNull(),
    revisionId: uuid('revision_id').notNull(),
    pin: jsonb('pin').$type<Pin>(),
    /** `carried`: copied and not yet projected onto the new surface; then kept, moved or lost. */
    standing: text('standing', { enum: ['placed', 'carried', 'kept', 'moved', 'lost', 'free'] }).notNull(),
    distanceMm: doublePrecision('distance_mm'),
    carriedFrom: uuid('carried_from'),
    createdAt: createdAt(),
  },
  (t) => [
    primaryKey({ columns: [t.workspaceId, t.id] }),
    unique('placements_one').on(t.workspaceId, t.threadId, t.revisionId),
    index('placements_revision').on(t.workspaceId, t.revisionId),
    foreignKey({ columns: [t.workspaceId, t.threadId], foreignColumns: [threads.workspaceId, threads.id] }),
    foreignKey({
      columns: [t.workspaceId, t.revisionId],
      foreignColumns: [revisions.workspaceId, revisions.id],
    }),
    workspacePolicy('placements'),
  ],
);

/** One thing that a person says: Tiptap JSON, checked against the editor's schema on the server. */
export const notes = pgTable(
  'notes',
  {
    id: id(),
    workspaceId: workspaceId(),
    threadId: uuid('thread_id').notNull(),
    revisionId: uuid('revision_id').notNull(),
    body: jsonb('body').$type<Record<string, unknown>>().notNull(),
    text: text('text').notNull(),
    mentions: jsonb('mentions').$type<string[]>().notNull().default([]),
    authorId: uuid('author_id')
      .notNull()
      .references(() => users.id),
    authorName: printedName('author_name'),
    /** Made by the browser when the note was written, so that a repeated send is the same note. */
    clientKey: uuid('client_key').notNull(),
    createdAt: createdAt(),
    version: version(),
  },
  (t) => [
    primaryKey({ columns: [t.workspaceId, t.id] }),
    unique('notes_client_key').on(t.workspaceId, t.authorId, t.clientKey),
    index('notes_thread').on(t.workspaceId, t.threadId, t.createdAt),
    foreignKey({ columns: [t.workspaceId, t.threadId], foreignColumns: [threads.workspaceId, threads.id] }),
    foreignKey({
      columns: [t.workspaceId, t.revisionId],
      foreignColumns: [revisions.workspaceId, revisions.id],
    }),
    workspacePolicy('notes'),
  ],
);
