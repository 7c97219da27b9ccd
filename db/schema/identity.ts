import { sql } from 'drizzle-orm';
import { bigint, boolean, integer, pgPolicy, pgTable, text, uniqueIndex, uuid } from 'drizzle-orm/pg-core';
import { createdAt, id, instant } from '../columns';
import { appRole, authPolicy } from '../policies';

/** A person. The application's role sees only people who share a workspace with the one who asks. */
export const users = pgTable(
  'users',
  {
    id: id().primaryKey(),
    name: text('name').notNull(),
    email: text('email').notNull(),
    emailVerified: boolean('email_verified').notNull().default(false),
    image: text('image'),
    units: text('units').notNull().default('mm'),
    timeZone: text('time_zone').notNull().default('UTC'),
    twoFactorEnabled: boolean('two_factor_enabled').notNull().default(false),
    createdAt: createdAt(),
    updatedAt: instant('updated_at')
      .notNull()
      .default(sql`clock_timestamp()`),
  },
  (t) => [
    uniqueIndex('users_email_key').on(sql`lower(${t.email})`),
    authPolicy('users'),
    pgPolicy('users_tenant', {
      for: 'select',
      to: appRole,
      using: sql`id = any((select app_people())::uuid[])`,
    }),
  ],
);

export const sessions = pgTable(
  'sessions',
  {
    id: id().primaryKey(),
    userId: uuid('user_id')
      .notNull()
      .references(() => users.id, { onDelete: 'cascade' }),
    token: text('token').notNull().unique(),
    expiresAt: instant('expires_at').notNull(),
    ipAddress: text('ip_address'),
    userAgent: text('user_agent'),
    activeOrganizationId: uuid('active_organization_id'),
    createdAt: createdAt(),
    updatedAt: instant('updated_at')
      .notNull()
      .default(sql`clock_timestamp()`),
  },
  () => [authPolicy('sessions')],
);

export const accounts = pgTable(
  'accounts',
  {
    id: id().primaryKey(),
    accountId: text('account_id').notNull(),
    providerId: text('provider_id').notNull(),
    userId: uuid('user_id')
      .notNull()
      .references(() => users.id, { onDelete: 'cascade' }),
    accessToken: text('access_token'),
    refreshToken: text('refresh_token'),
    idToken: text('id_token'),
    accessTokenExpiresAt: instant('access_token_expires_at'),
    refreshTokenExpiresAt: instant('refresh_token_expires_at'),
    scope: text('scope'),
    password: text('password'),
    createdAt: createdAt(),
    updatedAt: instant('updated_at')
      .notNull()
      .default(sql`clock_timestamp()`),
  },
  () => [authPolicy('accounts')],
);

export const verifications = pgTable(
  'verifications',
  {
    id: id().primaryKey(),
    identifier: text('identifier').notNull(),
    value: text('value').notNull(),
    expiresAt: instant('expires_at').notNull(),
    createdAt: createdAt(),
    updatedAt: instant('updated_at')
      .notNull()
      .default(sql`clock_timestamp()`),
  },
  () => [authPolicy('verifications')],
);

/** The second factor of a person: set up while `verified` is false, asked for from then on. */
export const twoFactors = pgTable(
  'two_factors',
  {
    id: id().primaryKey(),
    userId: uuid('user_id')
      .notNull()
      .unique()
      .references(() => users.id, { onDelete: 'cascade' }),
    /** Encrypted under the service's secret. */
    secret: text('secret').notNull(),
    /** JSON list of keyed hashes; a code that was used is no longer in it. */
    backupCodes: text('backup_codes').notNull(),
    verified: boolean('verified').notNull().default(false),
    failedVerificationCount: integer('failed_verification_count').notNull().default(0),
    lockedUntil: instant('locked_until'),
    /** The 30 s step of the last code that was taken: no code of it or before it is taken again. */
    lastStep: bigint('last_step', { mode: 'number' }),
    createdAt: createdAt(),
  },
  () => [authPolicy('two_factors')],
);

/** Request limits of better-auth and of signing, shared by every web process and kept over restarts. */
export const rateLimits = pgTable(
  'rate_limits',
  {
    id: id().primaryKey(),
    key: text('key').notNull().unique(),
    count: integer('count').notNull(),
    lastRequest: bigint('last_request', { mode: 'number' }).notNull(),
  },
  () => [authPolicy('rate_limits')],
);
