import { beforeAll, describe, expect, it } from 'vitest';
import {
  DELETE as removeRoute,
  PATCH as changeRoute,
} from '@/app/api/v1/studios/[studio]/library/[kind]/[item]/route';
import { POST as addRoute } from '@/app/api/v1/studios/[studio]/library/[kind]/route';
import { PUT as limitsRoute } from '@/app/api/v1/studios/[studio]/limits/route';
import { LIMIT_RULES } from '@/lib/formability/limits';
import { readLibrary } from '@/lib/studio/read-library';
import { libraryInputs, libraryKinds, type LibraryKind } from '@/lib/studio/schemas';
import { startingLibrary } from '@/lib/studio/starting-library';
import type { Role } from '@/lib/workspaces/roles';
import { callRoute } from '@/tests/support/call-route';
import { freshDatabase, type FreshDatabase } from '@/tests/support/database';
import { makeHouse, type House } from '@/tests/support/make-house';

let database: FreshDatabase;
let house: House;
let other: House;
beforeAll(async () => {
  database = await freshDatabase();
  house = await makeHouse(database);
  other = await makeHouse(database);
});

const sheet = { name: 'PETG 0.7', material: 'petg', gaugeMm: 0.7, minFormedMm: 0.3, isDefault: false };
const as = (role: Role) => house.people[role].cookie;
const add = (kind: string, body: unknown, role: Role = 'lead') =>
  callRoute(addRoute, { params: { studio: house.studio.slug, kind }, body, cookie: as(role) });
const change = (kind: string, item: string, version: number | null, body: unknown, cookie = as('producer')) =>
  callRoute(changeRoute, {
    method: 'PATCH',
    params: { studio: house.studio.slug, kind, item },
    body,
    cookie,
    headers: version === null ? {} : { 'if-match': `"${version}"` },
  });
const library = async () => readLibrary(await house.enterStudio('designer'));
const made = async (answer: Response) => (await answer.json()) as { id: string; version: number };

describe('the starting library', () => {
  it('holds items that its own forms accept, with one suggested first on each shelf', async () => {
    for (const kind of libraryKinds) {
      for (const item of startingLibrary[kind])
        expect(libraryInputs[kind].safeParse(item).success).toBe(true);
      expect(startingLibrary[kind].filter((item) => item.isDefault)).toHaveLength(1);
    }
    const opened = await library();
    for (const kind of libraryKinds) expect(opened[kind]).toHaveLength(startingLibrary[kind].length);
    expect(opened.limits).toEqual({ moved: {}, version: 1 });
  });
});

describe('items', () => {
  it('are added, changed and removed with their version, each written down', async () => {
    const added = await made(await add('sheets', sheet));
    const answer = await change('sheets', added.id, added.version, { ...sheet, gaugeMm: 0.75 });
    expect(answer.status).toBe(200);
    expect(answer.headers.get('etag')).toBe('"2"');
    expect((await library()).sheets.find((item) => item.id === added.id)).toMatchObject({
      gaugeMm: 0.75,
      version: 2,
    });
    const removed = await callRoute(removeRoute, {
      method: 'DELETE',
      params: { studio: house.studio.slug, kind: 'sheets', item: added.id },
      cookie: as('lead'),
      headers: { 'if-match': '"2"' },
    });
    expect(removed.status).toBe(204);
    const { rows } = await database.query<{ action: string }>(
      `select action from studio_entries where studio_id = $1 and detail->>'id' = $2 order by created_at`,
      [house.studio.id, added.id],
    );
    expect(rows.map((row) => row.action)).toEqual(['library.added', 'library.changed', 'library.removed']);
  });

  it('refuse a change that names no version (428) or an older one (412)', async () => {
    const { id } = await made(await add('sheets', { ...sheet, name: 'Versions' }));
    expect((await change('sheets', id, null, sheet)).status).toBe(428);
    expect((await change('sheets', id, 7, sheet)).status).toBe(412);
    const both = await Promise.all([
      change('sheets', id, 1, { ...sheet, name: 'Versions', gaugeMm: 1 }),
      change('sheets', id, 1, { ...sheet, name: 'Versions', gaugeMm: 2 }),
    ]);
    expect(both.map((answer) => answer.status).sort()).toEqual([200, 412]);
  });

  it('keep one default on a shelf', async () => {
    const { id } = await made(
      await add('printers', { ...startingLibrary.printers[0], name: 'Second', isDefault: true }),
    );
    const { printers } = await library();
    expect(printers.filter((printer) => printer.isDefault).map((printer) => printer.id)).toEqual([id]);
  });

  it('have names of their own on a shelf', async () => {
    const answer = await add('filaments', startingLibrary.filaments[0]);
    expect(await answer.json()).toMatchObject({ status: 409, type: '/problems/name-taken' });
  });

  it.each<[LibraryKind, object, string]>([
    ['sheets', { gaugeMm: 0 }, '/gaugeMm'],
    ['sheets', { gaugeMm: 'thick' }, '/gaugeMm'],
    ['sheets', { material: 'unobtainium' }, '/material'],
    ['sheets', { name: '' }, '/name'],
    ['machines', { formingXMm: -1 }, '/formingXMm'],
    ['machines', { pressureBar: 100 }, '/pressureBar'],
    ['printers', { nozzleMm: 20 }, '/nozzleMm'],
    ['filaments', { infillPercent: 12.5 }, '/infillPercent'],
  ])('of %s refuse %j and say where', async (kind, wrong, pointer) => {
    const answer = await add(kind, { ...startingLibrary[kind][0], name: 'Wrong', ...wrong });
    expect(answer.status).toBe(422);
    expect(((await answer.json()) as { errors: { pointer: string }[] }).errors.map((e) => e.pointer)).toEqual(
      [pointer],
    );
  });

  it('are kept by leads and producers; designers and clients are refused', async () => {
    expect((await add('sheets', { ...sheet, name: 'By producer' }, 'producer')).status).toBe(201);
    expect((await add('sheets', { ...sheet, name: 'By designer' }, 'designer')).status).toBe(403);
    expect((await add('sheets', { ...sheet, name: 'By client' }, 'approver')).status).toBe(404);
  });

  it('of another studio are not there', async () => {
    const [foreign] = (await readLibrary(await other.enterStudio('lead'))).sheets;
    expect((await change('sheets', foreign.id, foreign.version, sheet)).status).toBe(404);
    const [still] = (await readLibrary(await other.enterStudio('lead'))).sheets;
    expect(still).toEqual(foreign);
  });

  it('stand on four shelves and no other', async () => {
    expect((await add('secrets', sheet)).status).toBe(422);
  });
});

describe('limits', () => {
  const set = (version: number, limits: object, role: Role = 'lead') =>
    callRoute(limitsRoute, {
      method: 'PUT',
      params: { studio: house.studio.slug },
      cookie: as(role),
      headers: { 'if-match': `"${version}"` },
      body: { limits },
    });

  it('are moved by a lead, with what they were before written down', async () => {
    expect(await (await set(1, { draftMinDeg: 6 })).json()).toEqual({
      moved: { draftMinDeg: 6 },
      version: 2,
    });
    expect(await (await set(2, { draftMinDeg: 7, layerMaxMm: 0.25 })).json()).toMatchObject({ version: 3 });
    expect((await library()).limits.moved).toEqual({ draftMinDeg: 7, layerMaxMm: 0.25 });
    const { rows } = await database.query(
      `select detail from studio_entries where action = 'limits.set' and studio_id = $1 order by created_at`,
      [house.studio.id],
    );
    expect(rows.map((row) => row.detail)).toEqual([
      { before: {}, after: { draftMinDeg: 6 } },
      { before: { draftMinDeg: 6 }, after: { draftMinDeg: 7, layerMaxMm: 0.25 } },
    ]);
  });

  it('stay within their range, and are the known ones', async () => {
    const { version } = (await library()).limits;
    const beyond = await set(version, { draftMinDeg: LIMIT_RULES.draftMinDeg.max + 1 });
    expect(beyond.status).toBe(422);
    expect((await beyond.json()).errors[0].pointer).toBe('/limits/draftMinDeg');
    expect((await set(version, { madeUp: 1 })).status).toBe(422);
    expect((await set(version, { draftMinDeg: 5 }, 'producer')).status).toBe(403);
    expect((await library()).limits.version).toBe(version);
  });
});
