import { Client } from 'pg';
import { describe, expect, it } from 'vitest';
import { databaseEnv, ownerEnv, workerEnv } from '@/lib/env/env';
import { freshDatabase, type FreshDatabase } from '../../support/database';

const first = await freshDatabase();
const second = await freshDatabase();

async function run<Row>(url: string, sql: string): Promise<Row[]> {
  const client = new Client({ connectionString: url });
  await client.connect();
  try {
    return (await client.query(sql)).rows as Row[];
  } finally {
    await client.end();
  }
}
const roleIn = (url: string) =>
  run<{ role: string; base: string }>(url, 'select current_user as role, current_database() as base');

describe('freshDatabase', () => {
  it('gives each call a database of its own', async () => {
    await run(first.ownerUrl, 'create table only_here (id int)');
    const there = (database: FreshDatabase) =>
      database.query<{ found: string | null }>("select to_regclass('public.only_here')::text as found");
    expect((await there(first)).rows).toEqual([{ found: 'only_here' }]);
    expect((await there(second)).rows).toEqual([{ found: null }]);
  });

  it('has the migrated tables', async () => {
    const { rows } = await first.query<{ name: string }>(
      "select tablename as name from pg_tables where schemaname = 'public'",
    );
    expect(rows.map(({ name }) => name)).toEqual(
      expect.arrayContaining(['workspaces', 'templates', 'revisions']),
    );
  });

  it('leads lib/env to the last database that was made, under four different roles', async () => {
    const worker = workerEnv();
    expect(await roleIn(databaseEnv().DATABASE_URL)).toEqual([{ role: 'firstpull_app', base: second.name }]);
    expect(await roleIn(worker.AUTH_DATABASE_URL)).toEqual([{ role: 'firstpull_auth', base: second.name }]);
    expect(await roleIn(worker.RELAY_DATABASE_URL)).toEqual([{ role: 'firstpull_relay', base: second.name }]);
    expect(await roleIn(ownerEnv().OWNER_DATABASE_URL)).toEqual([
      { role: 'firstpull_owner', base: second.name },
    ]);
  });
});
