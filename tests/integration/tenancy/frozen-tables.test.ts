import { Client } from 'pg';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { freshDatabase, type FreshDatabase } from '@/tests/support/database';
import { makeHouse, type House } from '@/tests/support/make-house';

/** Written once: no path of the product changes these, whatever role it has. */
const frozen = [
  'audit_entries',
  'derivatives',
  'findings',
  'gate_plans',
  'locks',
  'meshes',
  'packs',
  'recipes',
  'releases',
  'reports',
  'signatures',
  'studio_entries',
  'waivers',
];

let database: FreshDatabase;
let house: House;
let app: Client;
let owner: Client;

beforeAll(async () => {
  database = await freshDatabase();
  house = await makeHouse(database);
  app = new Client({ connectionString: database.appUrl });
  owner = new Client({ connectionString: database.ownerUrl });
  await Promise.all([app.connect(), owner.connect()]);
  // The application's scope, for the whole connection, so that rows are visible and only the guards refuse.
  await app.query(`select set_config('app.person', $1, false), set_config('app.workspace', $2, false)`, [
    house.people.lead.person.id,
    house.workspace.id,
  ]);
});
afterAll(() => Promise.all([app?.end(), owner?.end()]));

const refused = async (client: Client, statement: string) => {
  try {
    await client.query(statement);
    return 'done';
  } catch (error) {
    return (error as { code?: string }).code;
  }
};
const firstColumn = async (table: string) =>
  (
    await database.query<{ name: string }>(
      `select attname as name from pg_attribute where attrelid = $1::regclass and attnum = 1`,
      [table],
    )
  ).rows[0].name;

describe('frozen tables', () => {
  it('are all of them guarded by row and by statement', async () => {
    const { rows } = await database.query<{ name: string }>(
      `select c.relname as name from pg_trigger t join pg_class c on c.oid = t.tgrelid
       where t.tgname in ('frozen_row', 'frozen_all') and t.tgenabled = 'O' group by c.relname having count(*) = 2`,
    );
    expect(rows.map((row) => row.name).sort()).toEqual(frozen);
  });

  it.each(frozen)('%s: the application has no right to change, delete or empty it', async (table) => {
    const column = await firstColumn(table);
    expect(await refused(app, `update ${table} set ${column} = ${column}`)).toBe('42501');
    expect(await refused(app, `delete from ${table}`)).toBe('42501');
    expect(await refused(app, `truncate ${table} cascade`)).toBe('42501');
  });

  it.each(frozen)('%s: its owner cannot empty it', async (table) => {
    expect(await refused(owner, `truncate ${table} cascade`)).toBe('23001');
  });

  it.each(['audit_entries', 'gate_plans', 'studio_entries'])(
    '%s: a row that stands is refused even to a superuser’s update and delete',
    async (table) => {
      const column = await firstColumn(table);
      const { rows } = await database.query<{ n: number }>(`select count(*)::int as n from ${table}`);
      expect(rows[0].n).toBeGreaterThan(0);
      await expect(database.query(`update ${table} set ${column} = ${column}`)).rejects.toMatchObject({
        code: '23001',
      });
      await expect(database.query(`delete from ${table}`)).rejects.toMatchObject({ code: '23001' });
    },
  );

  it('the row guard stands on every frozen table for update and delete, before the row', async () => {
    const { rows } = await database.query<{ name: string; definition: string }>(
      `select c.relname as name, pg_get_triggerdef(t.oid) as definition from pg_trigger t
       join pg_class c on c.oid = t.tgrelid where t.tgname = 'frozen_row' order by 1`,
    );
    for (const { definition } of rows)
      expect(definition).toMatch(/BEFORE (DELETE OR UPDATE|UPDATE OR DELETE)/);
    expect(rows.map((row) => row.name)).toEqual(frozen);
  });
});
