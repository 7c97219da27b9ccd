import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { drizzle } from 'drizzle-orm/node-postgres';
import { migrate as runMigrations } from 'drizzle-orm/node-postgres/migrator';
import { Client } from 'pg';
import PgBoss from 'pg-boss';
import { ownerEnv } from '@/lib/env/env';

export const queueSchema = 'pgboss';
/** Queues are made here, by the owner: the application's role may send to them and fetch from them only. */
export const queueNames = ['read-upload', 'check-revision', 'build-pack'] as const;

const lockKey = 7_041_990;

/** Brings the database to this version of the schema. Two at once: the second waits, then finds nothing to do. */
export async function migrate(ownerUrl: string): Promise<void> {
  const client = new Client({ connectionString: ownerUrl });
  await client.connect();
  try {
    await client.query('select pg_advisory_lock($1)', [lockKey]);
    await client.query("set lock_timeout = '5s'");
    const migrationsFolder = path.resolve(import.meta.dirname, '../drizzle');
    await runMigrations(drizzle(client), { migrationsFolder });
    await prepareQueues(ownerUrl, client);
  } finally {
    await client.end();
  }
}

async function prepareQueues(ownerUrl: string, client: Client): Promise<void> {
  const boss = new PgBoss({
    connectionString: ownerUrl,
    schema: queueSchema,
    supervise: false,
    schedule: false,
    max: 2,
  });
  await boss.start();
  try {
    // Retries are ours (lib/jobs): a lease with an attempt number, which survives a killed worker.
    for (const name of queueNames)
      await boss.createQueue(name, { name, retryLimit: 0, expireInSeconds: 900 });
  } finally {
    await boss.stop({ graceful: false, close: true });
  }
  await client.query(`grant usage on schema ${queueSchema} to firstpull_app`);
  await client.query(
    `grant select, insert, update, delete on all tables in schema ${queueSchema} to firstpull_app`,
  );
  await client.query(`grant execute on all functions in schema ${queueSchema} to firstpull_app`);
}

if (process.argv[1] === fileURLToPath(import.meta.url)) {
  await migrate(ownerEnv().OWNER_DATABASE_URL);
  process.stdout.write('database is up to date\n');
}
