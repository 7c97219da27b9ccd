import { randomUUID } from 'node:crypto';
import { beforeAll, describe, expect, it } from 'vitest';
import { POST as createRoute } from '@/app/api/v1/workspaces/[workspace]/templates/route';
import { callRoute } from '@/tests/support/call-route';
import { freshDatabase, type FreshDatabase } from '@/tests/support/database';
import { makeHouse, type House } from '@/tests/support/make-house';

let database: FreshDatabase;
let house: House;
beforeAll(async () => {
  database = await freshDatabase();
  house = await makeHouse(database);
});

const create = (title: string, key: string | null, who: 'designer' | 'lead' = 'designer') =>
  callRoute(createRoute, {
    params: { workspace: house.workspace.slug },
    path: `/api/v1/workspaces/${house.workspace.slug}/templates`,
    cookie: house.people[who].cookie,
    body: { title },
    headers: key ? { 'idempotency-key': key } : {},
  });
const titled = async (title: string) =>
  (await database.query<{ n: number }>('select count(*)::int as n from templates where title = $1', [title]))
    .rows[0].n;
const reasonOf = async (answer: Response) => ((await answer.json()) as { type: string }).type;

describe('a route with an Idempotency-Key', () => {
  it('does the work once and answers the same again', async () => {
    const key = randomUUID();
    const first = await create('Once', key);
    const second = await create('Once', key);
    expect([first.status, second.status]).toEqual([201, 201]);
    expect(await second.json()).toEqual(await first.json());
    expect(await titled('Once')).toBe(1);
  });

  it('does the work once when a double click sends it twelve times at once', async () => {
    const key = randomUUID();
    const answers = await Promise.all(Array.from({ length: 12 }, () => create('Double click', key)));
    const statuses = new Set(answers.map((answer) => answer.status));
    expect([...statuses].every((status) => status === 201 || status === 409)).toBe(true);
    expect(statuses.has(201)).toBe(true);
    expect(await titled('Double click')).toBe(1);
  });

  it('refuses the key for another request', async () => {
    const key = randomUUID();
    await create('This', key);
    const answer = await create('That', key);
    expect(answer.status).toBe(422);
    expect(await reasonOf(answer)).toBe('/problems/key-reused');
    expect(await titled('That')).toBe(0);
  });

  it('asks for the key, and for one of a sensible length', async () => {
    expect((await create('No key', null)).status).toBe(422);
    expect((await create('No key', 'x'.repeat(101))).status).toBe(422);
    expect(await titled('No key')).toBe(0);
  });

  it('keeps the keys of two people apart', async () => {
    const key = randomUUID();
    await create('Shared key', key, 'designer');
    await create('Shared key', key, 'lead');
    expect(await titled('Shared key')).toBe(2);
  });

  it('lets a refused request be sent again, mended, under the same key', async () => {
    const key = randomUUID();
    expect((await create('x'.repeat(81), key)).status).toBe(422);
    expect((await create('Mended', key)).status).toBe(201);
  });
});
