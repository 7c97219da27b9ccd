import { randomUUID } from 'node:crypto';
import { readdirSync } from 'node:fs';
import path from 'node:path';
import { beforeAll, describe, expect, it } from 'vitest';
import { endStandIn } from '@/lib/review/end-stand-in';
import { nameStandIn } from '@/lib/review/name-stand-in';
import { openDraft } from '@/lib/review/open-draft';
import { viewDocket } from '@/lib/review/view-docket';
import { releaseRevision } from '@/lib/production/release-revision';
import { cancelStaffInvitation } from '@/lib/studio/cancel-staff-invitation';
import { inviteToStudio } from '@/lib/studio/invite-to-studio';
import { readLibrary } from '@/lib/studio/read-library';
import { cancelInvitation } from '@/lib/workspaces/cancel-invitation';
import { inviteToWorkspace } from '@/lib/workspaces/invite-to-workspace';
import { acceptInvitation } from '@/lib/workspaces/accept-invitation';
import { removeMember } from '@/lib/workspaces/remove-member';
import { roles, type Role } from '@/lib/workspaces/roles';
import { callRoute } from '@/tests/support/call-route';
import { freshDatabase, type FreshDatabase } from '@/tests/support/database';
import { approved, gateOf, postChecked, raise, readyDraft } from '@/tests/support/factory';
import {
  joinWorkspace,
  makeHouse,
  makePerson,
  tokenOf,
  type House,
  type SignedIn,
} from '@/tests/support/make-house';
import { routes, type Names, type Scope, type Verb } from './route-table';

/**
 * Every verb of the HTTP API against every kind of person, for one's own, another tenant's and missing objects.
 * The API's inventory is the file system's: what is not in the table fails.
 */

const methods = ['GET', 'HEAD', 'OPTIONS', 'POST', 'PUT', 'PATCH', 'DELETE'];
const folder = path.resolve(import.meta.dirname, '../../../app/api/v1');
type Handler = Parameters<typeof callRoute>[0];
const handlers = new Map<string, Record<string, Handler>>();

let database: FreshDatabase;
let house: House;
let other: House;
let own: Names;
let foreign: Names;
let missing: Names;
/** A client of the house who is also a client of the other one. */
let ofBoth: SignedIn;
let removed: SignedIn;
let stranger: SignedIn;

type Cell = { route: string; method: string; scope: Scope; verb: Verb; label: string };
const cells: Cell[] = Object.entries(routes).flatMap(([route, { scope, verbs }]) =>
  Object.entries(verbs).map(([method, verb]) => ({
    route,
    method,
    scope,
    verb,
    label: `${method} ${route}`,
  })),
);
const of = (scope: Scope) => cells.filter((cell) => cell.scope === scope);
const writes = (cell: Cell) => cell.method !== 'GET';

beforeAll(async () => {
  for (const file of readdirSync(folder, { recursive: true, encoding: 'utf8' }).filter((f) =>
    f.endsWith('route.ts'),
  ))
    handlers.set(path.dirname(file), await import(path.join(folder, file)));
  database = await freshDatabase();
  house = await makeHouse(database);
  other = await makeHouse(database);
  own = await furnish(house);
  foreign = await furnish(other);
  const nothing = randomUUID();
  missing = Object.fromEntries(Object.keys(own).map((key) => [key, nothing])) as Names;
  ofBoth = await joinWorkspace(database, await house.enter('lead'), 'approver');
  const { id } = await inviteToWorkspace(await other.enter('lead'), {
    email: ofBoth.person.email,
    role: 'reviewer',
  });
  await acceptInvitation(ofBoth.person, await tokenOf(database, id), {});
  removed = await joinWorkspace(database, await house.enter('lead'), 'approver');
  await removeMember(await house.enter('lead'), removed.person.id);
  stranger = await makePerson(database, 'Stranger');
});

/** One of each thing that a route can name. */
async function furnish(place: House): Promise<Names> {
  const [lead, designer] = [await place.enter('lead'), await place.enter('designer')];
  const atStudio = await place.enterStudio('lead');
  const agreed = await approved(place);
  await releaseRevision(await place.enter('producer'), agreed.revisionId, { note: '' });
  const { templateId, revisionId } = await postChecked(place, { statuses: { draft: 'caution' } });
  const thread = await raise(designer, revisionId, 'Look here.');
  await readyDraft(designer, templateId);
  const draft = await openDraft(designer, templateId);
  // What the worker would have drawn; the bytes are not asked for here.
  await database.query(
    `insert into derivatives (id, workspace_id, mesh_id, kind, recipe_digest, store_key, bytes, sha256, meta)
     select gen_random_uuid(), r.workspace_id, r.mesh_id, kind, case kind when 'sheet' then p.digest else '' end,
            'derivatives/' || gen_random_uuid(), 1, '', '{}'
     from revisions r join recipes p on p.workspace_id = r.workspace_id and p.id = r.recipe_id,
          unnest(array['model', 'picture', 'thumbnail', 'sheet']) kind where r.id = $1`,
    [revisionId],
  );
  const docket = await viewDocket(designer, revisionId);
  const invitation = await inviteToWorkspace(lead, { email: 'taken.back@example.test', role: 'reviewer' });
  await cancelInvitation(lead, invitation.id);
  const staffInvitation = await inviteToStudio(atStudio, {
    email: 'staff.back@example.test',
    role: 'designer',
  });
  await cancelStaffInvitation(atStudio, staffInvitation.id);
  const second = await joinWorkspace(database, lead, 'approver');
  const standIn = await nameStandIn(await place.enter('approver'), {
    standInId: second.person.id,
    fromOn: '2126-01-01',
    untilOn: '2126-01-02',
  });
  await endStandIn(lead, standIn.id);
  return {
    workspace: place.workspace.slug,
    studio: place.studio.slug,
    template: templateId,
    revision: revisionId,
    released: agreed.revisionId,
    upload: draft.upload!.id,
    thread: thread.id,
    finding: docket.findings[0].id,
    gate: (await gateOf(designer, revisionId, 'studio')).id,
    client: place.people.reviewer.person.id,
    staff: place.people.lead.person.id,
    invitation: invitation.id,
    staffInvitation: staffInvitation.id,
    sheet: (await readLibrary(atStudio)).sheets[0].id,
    standIn: standIn.id,
  };
}

type Who = { cookie?: string };
/** `at` is the workspace or studio of the path, `what` holds the objects that it names. */
function call(cell: Cell, who: Who, at: Names, what: Names, headers: Record<string, string> = {}) {
  const { route, method, verb } = cell;
  const params: Record<string, string> = { workspace: at.workspace, studio: at.studio, ...verb.fixed };
  for (const [part, name] of Object.entries(verb.names ?? {})) params[part] = what[name];
  const filled = route.replaceAll(/\[(\w+)\]/g, (_, part: string) => params[part]);
  return callRoute(handlers.get(route)![method], {
    method,
    path: `/api/v1/${filled}`,
    params,
    cookie: who.cookie,
    body: writes(cell) && !verb.form ? (verb.body ?? {}) : undefined,
    form: verb.form,
    headers: { ...(writes(cell) ? { 'idempotency-key': randomUUID() } : {}), ...verb.headers, ...headers },
  });
}

/** What a caller can tell answers apart by, the reference of the request aside. */
async function seen(answer: Response) {
  const { reference, ...body } = (await answer.json()) as Record<string, unknown>;
  expect(reference).toMatch(/^[0-9a-f-]{36}$/);
  return { status: answer.status, headers: [...answer.headers].sort(), body };
}

/** Changes with any row that belongs to a house: a sum of each table that carries a tenant, in one statement. */
async function fingerprint(place: House): Promise<string> {
  fingerprintSql ??= await sumOfTables();
  const { rows } = await database.query<{ sum: string }>(fingerprintSql, [place.studio.id]);
  return rows[0].sum;
}
let fingerprintSql: string | undefined;

async function sumOfTables(): Promise<string> {
  const { rows } = await database.query<{ table: string; column: string }>(
    `select c.relname as "table", a.attname as "column" from pg_attribute a join pg_class c on c.oid = a.attrelid
     where c.relnamespace = 'public'::regnamespace and c.relkind = 'r' and not a.attisdropped
       and a.attname in ('workspace_id', 'studio_id') order by 1, 2`,
  );
  expect(rows.length).toBeGreaterThan(30);
  const sums = rows.map(({ table, column }) => {
    const whose = column === 'studio_id' ? '= $1' : 'in (select id from workspaces where studio_id = $1)';
    return `(select '${table}:' || coalesce(md5(string_agg(t::text, '|' order by t::text)), '') from ${table} t where ${column} ${whose})`;
  });
  return `select concat_ws(E'\\n', ${sums.join(', ')}) as sum`;
}

describe('the inventory', () => {
  it('of routes and their verbs is exactly the table', () => {
    const found = [...handlers].flatMap(([route, handler]) =>
      methods.filter((method) => method in handler).map((method) => `${method} ${route}`),
    );
    expect(found.sort()).toEqual(cells.map((cell) => cell.label).sort());
  });

  it('names each dynamic part of each path', () => {
    for (const { route, verb } of cells) {
      const parts = [...route.matchAll(/\[(\w+)\]/g)].map((match) => match[1]);
      const named = [
        'workspace',
        'studio',
        ...Object.keys(verb.names ?? {}),
        ...Object.keys(verb.fixed ?? {}),
      ];
      expect(parts.filter((part) => !named.includes(part))).toEqual([]);
    }
  });
});

describe.each(of('workspace').map((cell) => [cell.label, cell] as const))('%s', (_label, cell) => {
  it('asks who is not signed in to do so, for whatever they name', async () => {
    const answers = await Promise.all(
      [own, foreign, missing].map(async (names) => seen(await call(cell, {}, names, names))),
    );
    expect(answers.map((answer) => answer.status)).toEqual([401, 401, 401]);
    expect(new Set(answers.map((answer) => JSON.stringify(answer))).size).toBe(1);
  });

  it('lets exactly the roles past that may', async () => {
    const before = await fingerprint(house);
    for (const role of roles.filter((one) => !cell.verb.may.includes(one))) {
      const answer = await call(cell, house.people[role], own, own);
      expect({ role, status: answer.status }).toEqual({ role, status: 403 });
    }
    expect(await fingerprint(house)).toBe(before);
    for (const role of cell.verb.may) {
      const answer = await call(cell, house.people[role], own, own);
      expect({ role, ...(await decided(answer)) }).toEqual({ role, past: true });
    }
  });

  it('shows another tenant’s things as missing ones, to outsiders and to members of both, and changes nothing', async () => {
    const before = [await fingerprint(house), await fingerprint(other)];
    const people: Who[] = [other.people.lead, removed, stranger];
    // A workspace of others, and none.
    for (const who of people) {
      const there = await seen(await call(cell, who, own, own));
      expect(there.status).toBe(404);
      expect(there).toEqual(await seen(await call(cell, who, missing, missing)));
    }
    // One's own workspace in the path, a thing of another tenant or of none in the rest of it.
    if (cell.verb.names)
      for (const who of [...cell.verb.may.map((role) => house.people[role]), ofBoth]) {
        const there = await seen(await call(cell, who, own, foreign));
        expect(there).toEqual(await seen(await call(cell, who, own, missing)));
        expect([403, 404]).toContain(there.status);
        if (who !== ofBoth) expect(there.status).toBe(404);
      }
    expect([await fingerprint(house), await fingerprint(other)]).toEqual(before);
  });

  it('takes no change from another site’s page', async () => {
    if (!writes(cell)) return expect(cell.method).toBe('GET');
    const before = await fingerprint(house);
    const role = cell.verb.may[0];
    const foreignPages: Record<string, string>[] = [
      { origin: 'https://evil.example' },
      { origin: 'null' },
      { 'sec-fetch-site': 'cross-site' },
      { 'sec-fetch-site': 'same-site' },
    ];
    for (const headers of foreignPages) {
      const answer = await call(cell, house.people[role], own, own, headers);
      expect({ headers, status: answer.status }).toEqual({ headers, status: 403 });
    }
    expect(await fingerprint(house)).toBe(before);
  });
});

describe.each(of('studio').map((cell) => [cell.label, cell] as const))('%s', (_label, cell) => {
  it('asks who is not signed in to do so', async () => {
    for (const names of [own, foreign, missing])
      expect((await call(cell, {}, names, names)).status).toBe(401);
  });

  it('is there for the studio’s staff alone, and lets exactly the roles past that may', async () => {
    const before = await fingerprint(house);
    const refused: [string, Who, number][] = [
      ...roles
        .filter((role) => !cell.verb.may.includes(role))
        .map((role): [string, Who, number] => [role, house.people[role], isClient(role) ? 404 : 403]),
      ['other', other.people.lead, 404],
      ['both', ofBoth, 404],
      ['stranger', stranger, 404],
    ];
    for (const [who, person, status] of refused)
      expect({ who, status: (await call(cell, person, own, own)).status }).toEqual({ who, status });
    expect(await fingerprint(house)).toBe(before);
    for (const role of cell.verb.may) {
      const answer = await call(cell, house.people[role], own, own);
      expect({ role, ...(await decided(answer)) }).toEqual({ role, past: true });
    }
  });

  it('shows another studio and its things as missing ones, and changes nothing', async () => {
    const before = [await fingerprint(house), await fingerprint(other)];
    for (const role of roles) {
      const there = await seen(await call(cell, house.people[role], foreign, foreign));
      expect(there.status).toBe(404);
      expect(there).toEqual(await seen(await call(cell, house.people[role], missing, missing)));
    }
    if (cell.verb.names)
      for (const role of cell.verb.may) {
        const there = await seen(await call(cell, house.people[role], own, foreign));
        expect(there.status).toBe(404);
        expect(there).toEqual(await seen(await call(cell, house.people[role], own, missing)));
      }
    expect([await fingerprint(house), await fingerprint(other)]).toEqual(before);
  });

  it('takes no change from another site’s page', async () => {
    if (!writes(cell)) return expect(cell.method).toBe('GET');
    const answer = await call(cell, house.people.lead, own, own, { origin: 'https://evil.example' });
    expect(answer.status).toBe(403);
  });
});

describe.each(of('person').map((cell) => [cell.label, cell] as const))('%s', (_label, cell) => {
  it('is for who is signed in, and touches nobody else’s workspace', async () => {
    expect((await call(cell, {}, own, own)).status).toBe(401);
    const before = await fingerprint(other);
    const answer = await call(cell, house.people.reviewer, own, own);
    if (cell.verb.may.length) expect(await decided(answer)).toEqual({ past: true });
    else expect(answer.status).toBe(403);
    const told = await answer.text().catch(() => '');
    for (const name of [other.studio.id, other.workspace.id, other.workspace.name])
      expect(told).not.toContain(name);
    expect(await fingerprint(other)).toBe(before);
    if (writes(cell)) {
      const crossSite = await call(cell, house.people.reviewer, own, own, { origin: 'https://evil.example' });
      expect(crossSite.status).toBe(403);
    }
  });
});

describe.each(of('public').map((cell) => [cell.label, cell] as const))('%s', (_label, cell) => {
  it('opens nothing without the mailed token, to whoever asks', async () => {
    for (const who of [{}, house.people.lead, stranger])
      expect((await call(cell, who, own, own)).status).toBe(404);
  });
});

const isClient = (role: Role) => role === 'reviewer' || role === 'approver';

/** Past the permission: anything but unauthenticated, forbidden, not found or failing; a wrong password comes after it. */
async function decided(answer: Response): Promise<{ past: boolean; why?: string }> {
  if (![401, 403, 404].includes(answer.status) && answer.status < 500) return { past: true };
  const text = await answer.clone().text();
  if (text.includes('/problems/wrong-password') || text.includes('/problems/no-derivative'))
    return { past: true };
  return { past: false, why: `${answer.status} ${text}` };
}
