import { Client } from 'pg';
import { afterEach, beforeAll, describe, expect, it, vi } from 'vitest';
import type { WorkspaceContext } from '@/lib/auth/context';
import { listTemplates } from '@/lib/review/list-templates';
import { viewDocket } from '@/lib/review/view-docket';
import type { TemplateSummary } from '@/lib/review/schemas';
import { freshDatabase, type FreshDatabase } from '@/tests/support/database';
import { postChecked, raise } from '@/tests/support/factory';
import { makeHouse, type House } from '@/tests/support/make-house';

let database: FreshDatabase;
let house: House;
let lead: WorkspaceContext;

beforeAll(async () => {
  database = await freshDatabase();
  house = await makeHouse(database);
  lead = await house.enter('lead');
  await fill(house, 130);
  await fill(await makeHouse(database), 20);
});
afterEach(() => vi.restoreAllMocks());

/** Rows as `createTemplate` makes them, many at once: equal titles, equal dates and missing dates among them. */
async function fill({ workspace, people }: House, n: number): Promise<void> {
  await database.query(
    `insert into templates (id, workspace_id, serial, number, title, due_on, standing, created_by, changed_at)
     select gen_random_uuid(), $1, i, $2 || '-' || lpad(i::text, 3, '0'),
       (array['Tray', 'lid 50%', 'Cup_cover', 'Ämne', 'tray deep'])[1 + i % 5],
       case when i % 4 = 0 then null else date '2027-01-01' + (i % 7) end,
       (array['draft', 'in_review', 'approved'])[1 + i % 3], $3, now() - make_interval(mins => i / 3)
     from generate_series(1, $4::int) i`,
    [workspace.id, workspace.code, people.lead.person.id, n],
  );
  await database.query('update workspaces set template_count = $2 where id = $1', [workspace.id, n]);
}

async function all(query: Record<string, unknown>): Promise<TemplateSummary[]> {
  const items: TemplateSummary[] = [];
  let cursor: string | undefined;
  do {
    const page = await listTemplates(lead, { ...query, cursor, limit: 17 });
    items.push(...page.items);
    cursor = page.nextCursor ?? undefined;
  } while (cursor);
  return items;
}

describe('the list of templates', () => {
  it.each(['changed', 'number', 'title', 'due'] as const)(
    'by %s, pages through every template once, in order, both ways',
    async (sort) => {
      for (const direction of ['asc', 'desc'] as const) {
        const items = await all({ sort, direction });
        const { rows } = await database.query<{ n: number }>(
          'select count(*)::int as n from templates where workspace_id = $1',
          [house.workspace.id],
        );
        expect(new Set(items.map(({ id }) => id)).size).toBe(rows[0].n);
        expect(items.length).toBe(rows[0].n);
        const column = { changed: 'changed_at', number: 'serial', title: 'lower(title)', due: 'due_on' }[
          sort
        ];
        const { rows: sorted } = await database.query<{ number: string }>(
          `select number from templates where workspace_id = $1 order by ${column} ${direction} nulls last, id ${direction}`,
          [house.workspace.id],
        );
        expect(items.map(({ number }) => number)).toEqual(sorted.map(({ number }) => number));
      }
    },
  );

  it('filters by standing and searches title and number as they are written', async () => {
    const approved = await all({ standing: 'approved' });
    expect(approved.length).toBeGreaterThan(30);
    expect(approved.every(({ standing }) => standing === 'approved')).toBe(true);
    expect((await all({ search: 'TRAY' })).every(({ title }) => /tray/i.test(title))).toBe(true);
    expect((await listTemplates(lead, { search: 'tray' })).total).toBe(52);
    expect((await listTemplates(lead, { search: '50%' })).total).toBe(26);
    expect((await listTemplates(lead, { search: '%' })).total).toBe(26);
    expect((await listTemplates(lead, { search: 'Cup_' })).total).toBe(26);
    expect((await listTemplates(lead, { search: '\\' })).total).toBe(0);
    expect((await listTemplates(lead, { search: `${house.workspace.code}-007` })).items).toHaveLength(1);
    expect((await listTemplates(lead, { search: 'no such thing' })).items).toEqual([]);
  });

  it('refuses a place that it did not give, or that belongs to another order', async () => {
    const { nextCursor } = await listTemplates(lead, { sort: 'title', direction: 'asc', limit: 5 });
    for (const cursor of ['x', Buffer.from('{"key":"1"}').toString('base64url'), 'e30'])
      await expect(listTemplates(lead, { cursor })).rejects.toMatchObject({ code: 'invalid' });
    await expect(
      listTemplates(lead, { sort: 'due', direction: 'asc', cursor: nextCursor }),
    ).rejects.toMatchObject({ code: 'invalid', errors: [{ pointer: '/cursor' }] });
  });

  it('shows verdict and what must be settled of the newest revision', async () => {
    const { revisionId, templateId } = await postChecked(house, {
      statuses: { draft: 'fail', undercut: 'fail' },
    });
    await raise(lead, revisionId, 'Change it.', { mustSettle: true });
    const [item] = (await listTemplates(lead, {})).items;
    expect(item).toMatchObject({
      id: templateId,
      latestRevisionId: revisionId,
      latestLetter: 'A',
      standing: 'in_review',
      verdict: 'fail',
      openMustSettle: 3,
      thumbnailUrl: null,
    });
  });

  it('asks the database as often for a hundred rows as for one, and so does a docket', async () => {
    const query = vi.spyOn(Client.prototype, 'query');
    const statements = async (run: () => Promise<unknown>) => {
      query.mockClear();
      await run();
      return query.mock.calls.length;
    };
    const few = await statements(() => listTemplates(lead, { limit: 1 }));
    const many = await statements(() => listTemplates(lead, { limit: 100 }));
    expect(many).toBe(few);
    expect(many).toBeLessThan(12);

    const { revisionId } = await postChecked(house);
    const empty = await statements(() => viewDocket(lead, revisionId));
    query.mockRestore();
    for (let i = 0; i < 6; i++) await raise(lead, revisionId, `Note ${i}`);
    const again = vi.spyOn(Client.prototype, 'query');
    const docket = await viewDocket(lead, revisionId);
    expect(docket.threads).toHaveLength(6);
    expect(again.mock.calls.length).toBeLessThanOrEqual(empty + 1);
  });
});
