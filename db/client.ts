import { drizzle, type NodePgDatabase } from 'drizzle-orm/node-postgres';
import { Pool } from 'pg';
import { authEnv, databaseEnv, relayEnv } from '@/lib/env/env';

export type Database = NodePgDatabase & { $client: Pool };

const open = new Map<string, Database>();

function connect(name: string, url: () => string, max: number): Database {
  let database = open.get(name);
  if (!database) {
    const pool = new Pool({
      connectionString: url(),
      max,
      connectionTimeoutMillis: 5_000,
      idleTimeoutMillis: 30_000,
      statement_timeout: 20_000,
      idle_in_transaction_session_timeout: 15_000,
      application_name: `firstpull-${name}`,
    });
    // A server restart breaks idle connections; the pool replaces them, the process lives on.
    pool.on('error', () => undefined);
    // One that breaks in the middle of a transaction fails that transaction's next query, not the process.
    pool.on('connect', (client) => client.on('error', () => undefined));
    database = drizzle(pool);
    open.set(name, database);
  }
  return database;
}

/** Tenant data, under row policies. Reached through `withTenant` only. */
export const appDatabase = () => connect('app', () => databaseEnv().DATABASE_URL, 12);
/** Identity and memberships, for lib/auth. */
export const authDatabase = () => connect('auth', () => authEnv().AUTH_DATABASE_URL, 6);
/** Due outbox rows and job leases, for lib/jobs. */
export const relayDatabase = () => connect('relay', () => relayEnv().RELAY_DATABASE_URL, 2);

/** Closes every pool that was opened; for the end of a script, a worker or a test file. */
export async function closeDatabases(): Promise<void> {
  const all = [...open.values()];
  open.clear();
  await Promise.all(all.map((database) => database.$client.end()));
}
