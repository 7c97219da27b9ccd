import { sql } from 'drizzle-orm';
import {
  index,
  integer,
  jsonb,
  pgPolicy,
  pgTable,
  text,
  unique,
  uniqueIndex,
  uuid,
} from 'drizzle-orm/pg-core';
import { createdAt, id, instant, studioId, version, workspaceId } from '../columns';
import { appRole, authPolicy, studioPolicy, workspacePolicy } from '../policies';
import { users } from './identity';

export const studios = pgTable(
  'studios',
  {
    id: id().primaryKey(),
    name: text('name').notNull(),
    slug: text('slug').notNull().unique(),
    timeZone: text('time_zone').notNull().default('Europe/Lisbon'),
    createdAt: createdAt(),
  },
  () => [
    authPolicy('studios'),
    studioPolicy('studios', 'id'),
    // A client reads the name of the studio that serves it, through a workspace that it may see.
    pgPolicy('studios_of_visible_workspaces', {
      for: 'select',
      to: appRole,
      using: sql`id in (select w.studio_id from workspaces w)`,
    }),
    pgPolicy('studios_open', { for: 'insert', to: appRole, withCheck: sql`app_person() is not null` }),
  ],
);

/** Staff of a studio. A trigger keeps their rows in `members` of every workspace of the studio in step. */
export const studioMembers = pgTable(
  'studio_members',
  {
    id: id().primaryKey(),
    studioId: studioId().references(() => studios.id),
    userId: uuid('user_id')
      .notNull()
      .references(() => users.id),
    role: text('role', { enum: ['designer', 'lead', 'producer'] }).notNull(),
    createdAt: createdAt(),
  },
  (t) => [
    unique('studio_members_one').on(t.studioId, t.userId),
    index('studio_members_user').on(t.userId),
    authPolicy('studio_members'),
    studioPolicy('studio_members'),
    // Whoever opens a studio becomes its first lead; everyone else comes by invitation.
    pgPolicy('studio_members_first_lead', {
      for: 'insert',
      to: appRole,
      withCheck: sql`user_id = app_person() and role = 'lead' and studio_is_empty(studio_id)`,
    }),
  ],
);

/** One client organisation's workspace: the tenant, and better-auth's organization. */
export const workspaces = pgTable(
  'workspaces',
  {
    id: id().primaryKey(),
    studioId: studioId().references(() => studios.id),
    name: text('name').notNull(),
    slug: text('slug').notNull().unique(),
    /** Prefix of template numbers, two to four capitals. */
    code: text('code').notNull(),
    logo: text('logo'),
    metadata: text('metadata'),
    timeZone: text('time_zone').notNull().default('Europe/Lisbon'),
    templateCount: integer('template_count').notNull().default(0),
    createdAt: createdAt(),
    version: version(),
  },
  (t) => [
    unique('workspaces_code').on(t.studioId, t.code),
    authPolicy('workspaces'),
    workspacePolicy('workspaces', 'id'),
    // A new workspace is not visible before its staff rows exist; a trigger makes them at once.
    pgPolicy('workspaces_open', {
      for: 'insert',
      to: appRole,
      withCheck: sql`studio_id = any((select app_studios())::uuid[])`,
    }),
  ],
);

/** Who may enter a workspace, in which role: clients by invitation, studio staff through `studio_members`. */
export const members = pgTable(
  'members',
  {
    id: id().primaryKey(),
    workspaceId: workspaceId().references(() => workspaces.id),
    userId: uuid('user_id')
      .notNull()
      .references(() => users.id),
    role: text('role', { enum: ['designer', 'lead', 'producer', 'reviewer', 'approver'] }).notNull(),
    createdAt: createdAt(),
  },
  (t) => [
    unique('members_one').on(t.workspaceId, t.userId),
    index('members_user').on(t.userId),
    authPolicy('members'),
    workspacePolicy('members'),
  ],
);

export const invitations = pgTable(
  'invitations',
  {
    id: id().primaryKey(),
    workspaceId: workspaceId().references(() => workspaces.id),
    email: text('email').notNull(),
    role: text('role', { enum: ['reviewer', 'approver'] }).notNull(),
    status: text('status', { enum: ['pending', 'accepted', 'rejected', 'canceled'] })
      .notNull()
      .default('pending'),
    /** SHA-256 of the secret that only the mailed link carries: who opens it holds the address. */
    tokenHash: text('token_hash').notNull(),
    expiresAt: instant('expires_at').notNull(),
    inviterId: uuid('inviter_id')
      .notNull()
      .references(() => users.id),
    createdAt: createdAt(),
  },
  (t) => [
    uniqueIndex('invitations_one_pending')
      .on(t.workspaceId, sql`lower(${t.email})`)
      .where(sql`status = 'pending'`),
    authPolicy('invitations'),
    workspacePolicy('invitations'),
  ],
);

export const studioInvitations = pgTable(
  'studio_invitations',
  {
    id: id().primaryKey(),
    studioId: studioId().references(() => studios.id),
    email: text('email').notNull(),
    role: text('role', { enum: ['designer', 'lead', 'producer'] }).notNull(),
    status: text('status', { enum: ['pending', 'accepted', 'rejected', 'canceled'] })
      .notNull()
      .default('pending'),
    /** SHA-256 of the secret that only the mailed link carries: who opens it holds the address. */
    tokenHash: text('token_hash').notNull(),
    expiresAt: instant('expires_at').notNull(),
    inviterId: uuid('inviter_id')
      .notNull()
      .references(() => users.id),
    createdAt: createdAt(),
  },
  (t) => [
    uniqueIndex('studio_invitations_one_pending')
      .on(t.studioId, sql`lower(${t.email})`)
      .where(sql`status = 'pending'`),
    authPolicy('studio_invitations'),
    studioPolicy('studio_invitations'),
  ],
);

/** What an automatic gate waits for: no failing finding open; no open item of the docket that must be settled. */
export type GateCondition = 'checks-pass' | 'docket-settled';

export type GateRule = {
  key: string;
  name: string;
  kind: 'automatic' | 'people';
  /** Of an automatic gate; plans from before it could be chosen have none, and wait for the checks. */
  conditions?: GateCondition[];
  /** Roles that may sign; empty for an automatic gate and where people are named. */
  roles: string[];
  /** Ids of the people who may sign, whatever the roles say; empty or missing: the roles decide. */
  people?: string[];
  /** How many signatures close the gate, or everybody who may sign. */
  quorum: number | 'all';
  /** The author of the revision never signs. */
  fourEyes: boolean;
  /** Days after it opens by which it is to be signed. */
  dueDays?: number | null;
  /** The words that a signer puts their name to. */
  meaning: string;
};

/** Versions of a workspace's ordered gates; a revision keeps the version that it was posted under. */
export const gatePlans = pgTable(
  'gate_plans',
  {
    id: id(),
    workspaceId: workspaceId().references(() => workspaces.id),
    number: integer('number').notNull(),
    gates: jsonb('gates').$type<GateRule[]>().notNull(),
    createdBy: uuid('created_by').references(() => users.id),
    createdAt: createdAt(),
  },
  (t) => [
    unique('gate_plans_pk').on(t.workspaceId, t.id),
    unique('gate_plans_number').on(t.workspaceId, t.number),
    workspacePolicy('gate_plans'),
  ],
);
