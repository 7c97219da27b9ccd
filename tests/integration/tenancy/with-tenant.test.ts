import { sql } from 'drizzle-orm';
import { beforeAll, describe, expect, it } from 'vitest';
import { appDatabase } from '@/db/client';
import { withTenant } from '@/db/tenant';
import type { WorkspaceContext } from '@/lib/auth/context';
import { freshDatabase, type FreshDatabase } from '@/tests/support/database';
import { makeHouse, type House } from '@/tests/support/make-house';
import { rounds } from '@/tests/support/rounds';

const transactions = rounds(600, 10_000);
const seed = 20_260_712;
/** Numbers from 0 to 1 by the Park-Miller rule; the seed stands in the test's title. */
function randomOf(start: number) {
  let state = start;
  return () => (state = (state * 48_271) % 2_147_483_647) / 2_147_483_647;
}

let database: FreshDatabase;
let houses: House[];
let contexts: WorkspaceContext[];
/** Every table that carries a workspace, from the catalogue. */
let tables: string[];

beforeAll(async () => {
  database = await freshDatabase();
  houses = [await makeHouse(database), await makeHouse(database)];
  contexts = [await houses[0].enter('approver'), await houses[1].enter('approver')];
  const { rows } = await database.query<{ name: string }>(
    `select distinct c.relname as name from pg_class c join pg_attribute a on a.attrelid = c.oid
     where c.relnamespace = 'public'::regnamespace and c.relkind = 'r'
       and a.attname in ('workspace_id', 'studio_id') and not a.attisdropped`,
  );
  tables = rows.map((row) => row.name);
  // One connection for everybody: whatever a transaction leaves behind, the next one meets.
  appDatabase().$client.options.max = 1;
});

const settings = async (run: typeof appDatabase = appDatabase) =>
  (
    await run().execute(sql`select current_setting('app.person', true) as person,
      current_setting('app.workspace', true) as workspace, current_setting('app.studio', true) as studio,
      current_setting('app.job_workspace', true) as job, current_setting('app.job_studio', true) as job_studio`)
  ).rows[0];

describe('withTenant on one connection', () => {
  it(`never shows a foreign row over ${transactions} interleaved transactions, errors and cancels among them (seed ${seed})`, async () => {
    const random = randomOf(seed);
    const outcome = { seen: 0, failed: 0 };
    const turns = Array.from({ length: transactions }, () => ({
      side: random() < 0.5 ? 0 : 1,
      fate: random() < 0.05 ? 'throw' : random() < 0.05 ? 'sql-error' : random() < 0.03 ? 'cancel' : 'commit',
    }));
    const turn = async ({ side, fate }: (typeof turns)[number]) => {
      const ctx = contexts[side];
      try {
        await withTenant(ctx, async (tx) => {
          const { rows } = await tx.execute(
            sql`select workspace_id from members union all select workspace_id from audit_entries
                  union all select id from workspaces`,
          );
          const foreign = rows.filter((row) => row.workspace_id !== ctx.workspace.id);
          expect(foreign).toEqual([]);
          outcome.seen += rows.length;
          if (fate === 'throw') throw new Error('on purpose');
          if (fate === 'sql-error') await tx.execute(sql`select 1 / 0`);
          if (fate === 'cancel')
            await tx.execute(sql`select pg_cancel_backend(pg_backend_pid()), pg_sleep(5)`);
        });
      } catch (error) {
        if (fate === 'commit') throw error;
        outcome.failed += 1;
      }
    };
    for (let i = 0; i < turns.length; i += 40) await Promise.all(turns.slice(i, i + 40).map(turn));
    expect(outcome.seen).toBeGreaterThan(transactions);
    expect(outcome.failed).toBe(turns.filter(({ fate }) => fate !== 'commit').length);
    expect(appDatabase().$client.totalCount).toBe(1);
  });

  it('leaves no setting behind', async () => {
    await withTenant(contexts[0], (tx) => tx.execute(sql`select 1`));
    const left = await settings();
    expect(Object.values(left).filter((value) => value !== null && value !== '')).toEqual([]);
  });

  it('shows nothing and fails nothing where no scope was set', async () => {
    expect(tables.length).toBeGreaterThan(25);
    for (const table of tables) {
      if (table === 'outbox') continue; // written by the application, never read
      const { rows } = await appDatabase().execute(
        sql`select count(*)::int as n from ${sql.identifier(table)}`,
      );
      expect({ table, n: rows[0].n }).toEqual({ table, n: 0 });
    }
  });

  it('lets nothing be written where no scope was set', async () => {
    const insert = appDatabase().execute(
      sql`insert into audit_heads (workspace_id, seq, hash) values (${houses[0].workspace.id}, 0, '')`,
    );
    await expect(insert).rejects.toMatchObject({ cause: { code: '42501' } });
    const update = await appDatabase().execute(sql`update workspaces set name = 'taken'`);
    expect(update.rowCount).toBe(0);
  });
});

describe('rows of another tenant', () => {
  it('cannot be inserted under its id', async () => {
    const foreign = houses[1].workspace.id;
    const insert = withTenant(contexts[0], (tx) =>
      tx.execute(sql`insert into invitations (id, workspace_id, email, role, token_hash, expires_at, inviter_id)
        values (gen_random_uuid(), ${foreign}, 'x@example.test', 'approver', '', now(), ${contexts[0].person.id})`),
    );
    await expect(insert).rejects.toMatchObject({ cause: { code: '42501' } });
  });

  it('cannot be handed over to it, nor taken from it', async () => {
    const give = withTenant(contexts[0], (tx) =>
      tx.execute(
        sql`update members set workspace_id = ${houses[1].workspace.id} where user_id = ${contexts[0].person.id}`,
      ),
    );
    await expect(give).rejects.toMatchObject({ cause: { code: '42501' } });
    const take = await withTenant(contexts[0], (tx) =>
      tx.execute(sql`update members set role = 'reviewer' where workspace_id = ${houses[1].workspace.id}`),
    );
    expect(take.rowCount).toBe(0);
  });

  it('are not seen by a studio scope, a person scope or a job scope of the other side', async () => {
    const studio = await houses[0].enterStudio('lead');
    const seen = await withTenant(
      studio,
      async (tx) => (await tx.execute(sql`select id from workspaces`)).rows,
    );
    expect(seen).toEqual([{ id: houses[0].workspace.id }]);
    const people = await withTenant(
      contexts[0],
      async (tx) => (await tx.execute(sql`select id from users`)).rows,
    );
    const own = Object.values(houses[0].people).map((one) => one.person.id);
    expect(people.map((row) => row.id).sort()).toEqual(own.sort());
  });
});
