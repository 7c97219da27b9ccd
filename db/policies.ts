import { sql } from 'drizzle-orm';
import { pgPolicy, pgRole } from 'drizzle-orm/pg-core';

/** The role that web and worker use for everything that belongs to a tenant. Owns nothing. */
export const appRole = pgRole('firstpull_app').existing();
/** The role of lib/auth: identity and membership tables only. */
export const authRole = pgRole('firstpull_auth').existing();
/** The role of the outbox relay and the job sweep: reads what is due in every workspace, nothing else. */
export const relayRole = pgRole('firstpull_relay').existing();

const visibleWorkspaces = sql.raw('(select app_workspaces())::uuid[]');
const visibleStudios = sql.raw('(select app_studios())::uuid[]');

/** Rows of the workspaces that the transaction's person may see; the set is computed once per statement. */
export function workspacePolicy(table: string, column = 'workspace_id') {
  const visible = sql`${sql.identifier(column)} = any(${visibleWorkspaces})`;
  return pgPolicy(`${table}_tenant`, { for: 'all', to: appRole, using: visible, withCheck: visible });
}

/** Rows of the studios whose staff the transaction's person belongs to. */
export function studioPolicy(table: string, column = 'studio_id') {
  const visible = sql`${sql.identifier(column)} = any(${visibleStudios})`;
  return pgPolicy(`${table}_tenant`, { for: 'all', to: appRole, using: visible, withCheck: visible });
}

/** Identity tables are read and written whole by lib/auth, which decides who is who. */
export function authPolicy(table: string) {
  return pgPolicy(`${table}_auth`, { for: 'all', to: authRole, using: sql`true`, withCheck: sql`true` });
}

/** The relay sees due rows of every workspace; it is granted few columns and no tenant content. */
export function relayPolicy(table: string) {
  return pgPolicy(`${table}_relay`, { for: 'all', to: relayRole, using: sql`true`, withCheck: sql`true` });
}
