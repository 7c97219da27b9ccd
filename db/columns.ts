import { sql } from 'drizzle-orm';
import { integer, text, timestamp, uuid } from 'drizzle-orm/pg-core';
import { uuidv7 } from 'uuidv7';

/** Time-ordered UUID (RFC 9562 version 7), made by the application so that a verb knows it before the write. */
export const id = () =>
  uuid('id')
    .notNull()
    .$defaultFn(() => uuidv7());

export const workspaceId = () => uuid('workspace_id').notNull();
export const studioId = () => uuid('studio_id').notNull();

export const instant = (name: string) => timestamp(name, { withTimezone: true, mode: 'date', precision: 3 });

export const createdAt = () =>
  instant('created_at')
    .notNull()
    .default(sql`clock_timestamp()`);

/** Optimistic version: an update names the version it read and raises it by one. */
export const version = () => integer('version').notNull().default(1);

/** The name as it was printed when the act was done; a later rename does not rewrite history. */
export const printedName = (name: string) => text(name).notNull();
