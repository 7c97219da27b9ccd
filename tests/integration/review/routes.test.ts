import { randomUUID } from 'node:crypto';
import { beforeAll, describe, expect, it } from 'vitest';
import { GET as activity } from '@/app/api/v1/workspaces/[workspace]/activity/route';
import { POST as waive } from '@/app/api/v1/workspaces/[workspace]/findings/[finding]/waiver/route';
import { POST as giveBack } from '@/app/api/v1/workspaces/[workspace]/gates/[gate]/return/route';
import { POST as signRoute } from '@/app/api/v1/workspaces/[workspace]/gates/[gate]/sign/route';
import { GET as content } from '@/app/api/v1/workspaces/[workspace]/revisions/[revision]/content/route';
import { GET as docket } from '@/app/api/v1/workspaces/[workspace]/revisions/[revision]/docket/route';
import { GET as mesh } from '@/app/api/v1/workspaces/[workspace]/revisions/[revision]/mesh/route';
import { GET as model } from '@/app/api/v1/workspaces/[workspace]/revisions/[revision]/model/route';
import { GET as picture } from '@/app/api/v1/workspaces/[workspace]/revisions/[revision]/picture/route';
import { GET as report } from '@/app/api/v1/workspaces/[workspace]/revisions/[revision]/report/route';
import { GET as revision } from '@/app/api/v1/workspaces/[workspace]/revisions/[revision]/route';
import { GET as sheet } from '@/app/api/v1/workspaces/[workspace]/revisions/[revision]/sheet/route';
import { POST as threadsRoute } from '@/app/api/v1/workspaces/[workspace]/revisions/[revision]/threads/route';
import { GET as thumbnail } from '@/app/api/v1/workspaces/[workspace]/revisions/[revision]/thumbnail/route';
import { POST as withdraw } from '@/app/api/v1/workspaces/[workspace]/revisions/[revision]/withdraw/route';
import * as draft from '@/app/api/v1/workspaces/[workspace]/templates/[template]/draft/route';
import * as revisions from '@/app/api/v1/workspaces/[workspace]/templates/[template]/revisions/route';
import * as template from '@/app/api/v1/workspaces/[workspace]/templates/[template]/route';
import { POST as uploads } from '@/app/api/v1/workspaces/[workspace]/templates/[template]/uploads/route';
import * as templates from '@/app/api/v1/workspaces/[workspace]/templates/route';
import { POST as notes } from '@/app/api/v1/workspaces/[workspace]/threads/[thread]/notes/route';
import { PATCH as settle } from '@/app/api/v1/workspaces/[workspace]/threads/[thread]/route';
import { POST as cancel } from '@/app/api/v1/workspaces/[workspace]/uploads/[upload]/cancel/route';
import { POST as complete } from '@/app/api/v1/workspaces/[workspace]/uploads/[upload]/complete/route';
import { POST as done } from '@/app/api/v1/workspaces/[workspace]/uploads/[upload]/parts/done/route';
import { POST as parts } from '@/app/api/v1/workspaces/[workspace]/uploads/[upload]/parts/route';
import { GET as upload } from '@/app/api/v1/workspaces/[workspace]/uploads/[upload]/route';
import { GET as today } from '@/app/api/v1/today/route';
import { withTenant } from '@/db/tenant';
import { digestOf } from '@/lib/audit/canonical';
import { jobContext } from '@/lib/auth/context';
import { findMesh, keepDerivative } from '@/lib/review/check-data';
import { startUpload } from '@/lib/review/start-upload';
import { viewDocket } from '@/lib/review/view-docket';
import { callRoute, type Call } from '@/tests/support/call-route';
import { freshDatabase, type FreshDatabase } from '@/tests/support/database';
import { fingerprint, gateOf, note, postChecked, raise, readyDraft, shown } from '@/tests/support/factory';
import { makeHouse, type House } from '@/tests/support/make-house';

type Handler = Parameters<typeof callRoute>[0];
type Route = { name: string; handler: Handler; call: Call };

let database: FreshDatabase;
let house: House;
let stranger: House;
let posted: { templateId: string; revisionId: string };
const ids: Record<string, string> = {};

beforeAll(async () => {
  database = await freshDatabase();
  house = await makeHouse(database);
  stranger = await makeHouse(database);
  const lead = await house.enter('lead');
  posted = await postChecked(house);
  await readyDraft(await house.enter('designer'), posted.templateId);
  ids.template = posted.templateId;
  ids.revision = posted.revisionId;
  ids.thread = (await raise(lead, posted.revisionId, 'Look.')).id;
  ids.finding = (await viewDocket(lead, posted.revisionId)).findings[0].id;
  ids.gate = (await gateOf(lead, posted.revisionId, 'studio')).id;
  ids.upload = (
    await startUpload(await house.enter('designer'), posted.templateId, { fileName: 'a.stl', bytes: 100 })
  ).id;
});

const json = (method: string, body: unknown): Call => ({ method, body });
/** Every route of the review, with a request that parses. */
const table: Route[] = [
  { name: 'GET templates', handler: templates.GET, call: {} },
  { name: 'POST templates', handler: templates.POST, call: json('POST', { title: 'Another' }) },
  { name: 'GET template', handler: template.GET, call: {} },
  { name: 'PATCH template', handler: template.PATCH, call: json('PATCH', { title: 'x', version: 99 }) },
  { name: 'GET revisions', handler: revisions.GET, call: {} },
  { name: 'POST revisions', handler: revisions.POST, call: json('POST', { version: 99 }) },
  { name: 'GET draft', handler: draft.GET, call: {} },
  {
    name: 'PUT draft',
    handler: draft.PUT,
    call: json('PUT', { uploadId: null, recipe: {}, note: '', version: 99 }),
  },
  { name: 'DELETE draft', handler: draft.DELETE, call: { method: 'DELETE' } },
  { name: 'POST uploads', handler: uploads, call: json('POST', { fileName: 'a.stl', bytes: 1 }) },
  { name: 'GET upload', handler: upload, call: {} },
  { name: 'POST parts', handler: parts, call: json('POST', { parts: [1] }) },
  { name: 'POST parts/done', handler: done, call: json('POST', { number: 1, etag: 'x' }) },
  { name: 'POST complete', handler: complete, call: json('POST', {}) },
  { name: 'POST cancel', handler: cancel, call: json('POST', {}) },
  { name: 'GET revision', handler: revision, call: {} },
  { name: 'GET docket', handler: docket, call: {} },
  { name: 'GET report', handler: report, call: {} },
  { name: 'GET content', handler: content, call: {} },
  { name: 'GET mesh', handler: mesh, call: {} },
  { name: 'GET model', handler: model, call: {} },
  { name: 'GET picture', handler: picture, call: {} },
  { name: 'GET thumbnail', handler: thumbnail, call: {} },
  { name: 'GET sheet', handler: sheet, call: {} },
  { name: 'POST threads', handler: threadsRoute, call: json('POST', note('x')) },
  { name: 'POST notes', handler: notes, call: json('POST', note('x')) },
  { name: 'PATCH thread', handler: settle, call: json('PATCH', { settled: true, version: 99 }) },
  { name: 'POST waiver', handler: waive, call: json('POST', { reason: 'Because it will hold.' }) },
  { name: 'POST sign', handler: signRoute, call: json('POST', { digest: '0'.repeat(64), password: 'x' }) },
  {
    name: 'POST return',
    handler: giveBack,
    call: json('POST', { digest: '0'.repeat(64), password: 'x', reason: 'Not yet.' }),
  },
  { name: 'POST withdraw', handler: withdraw, call: json('POST', { reason: 'Not yet.' }) },
  { name: 'GET activity', handler: activity, call: {} },
];

const call = (route: Route, cookie: string | undefined, params: Record<string, string>) =>
  callRoute(route.handler, {
    ...route.call,
    cookie,
    params: { workspace: house.workspace.slug, ...params },
    headers: { 'idempotency-key': randomUUID() },
  });

const problemOf = async (answer: Response) => {
  const { reference: _reference, ...problem } = (await answer.json()) as Record<string, unknown>;
  return problem;
};

describe.each(table)('$name', (route) => {
  it('asks a visitor to sign in', async () => {
    const answer = await call(route, undefined, ids);
    expect(answer.status).toBe(401);
    expect(answer.headers.get('content-type')).toContain('application/problem+json');
  });

  it('tells a member of another workspace that there is nothing, and changes nothing', async () => {
    const before = await fingerprint(database, house.workspace.id);
    const { cookie } = stranger.people.lead;
    const direct = await call(route, cookie, ids);
    expect(direct.status).toBe(404);
    const smuggled = await call(route, cookie, { ...ids, workspace: stranger.workspace.slug });
    const own = !/^(GET|POST) templates$|activity/.test(route.name);
    if (own) {
      const missing = Object.fromEntries(Object.keys(ids).map((key) => [key, randomUUID()]));
      const absent = await call(route, cookie, { ...missing, workspace: stranger.workspace.slug });
      expect(smuggled.status).toBe(404);
      expect(await problemOf(smuggled)).toEqual(await problemOf(absent));
    }
    expect(await fingerprint(database, house.workspace.id)).toBe(before);
  });

  it('is never kept by a shared cache, and refuses another site', async () => {
    const answer = await call(route, house.people.lead.cookie, ids);
    expect(answer.headers.get('cache-control')).toContain('no-store');
    expect(answer.status).toBeLessThan(500);
    if (!route.call.method) return;
    const cross = await callRoute(route.handler, {
      ...route.call,
      cookie: house.people.lead.cookie,
      params: { workspace: house.workspace.slug, ...ids },
      headers: { origin: 'https://elsewhere.example' },
    });
    expect(cross.status).toBe(403);
  });
});

describe('requests', () => {
  const at = (extra: Record<string, string> = {}) => ({ workspace: house.workspace.slug, ...ids, ...extra });

  it('that create take an Idempotency-Key and answer alike for the same one', async () => {
    const { cookie } = house.people.lead;
    const key = { 'idempotency-key': randomUUID() };
    const body = { title: 'Once only' };
    const without = await callRoute(templates.POST, { body, cookie, params: at() });
    expect(without.status).toBe(422);
    const first = await callRoute(templates.POST, { body, cookie, params: at(), headers: key });
    const again = await callRoute(templates.POST, { body, cookie, params: at(), headers: key });
    expect([first.status, again.status]).toEqual([201, 201]);
    expect(await again.json()).toEqual(await first.json());
    const other = await callRoute(templates.POST, {
      body: { title: 'Else' },
      cookie,
      params: at(),
      headers: key,
    });
    expect(other.status).toBe(422);
  });

  it('that sign keep no trace of the password, and sign once for one key', async () => {
    const { revisionId } = await postChecked(house);
    const lead = await house.enter('lead');
    const gate = (await gateOf(lead, revisionId, 'studio')).id;
    const body = await shown(lead, revisionId);
    const key = randomUUID();
    const send = (password: string) =>
      callRoute(signRoute, {
        body: { ...body, password },
        cookie: house.people.lead.cookie,
        params: at({ gate }),
        headers: { 'idempotency-key': key },
      });
    const wrong = await send('wrong password here');
    expect(wrong.status).toBe(403);
    const [one, two] = [await send(body.password), await send(body.password)];
    expect([one.status, two.status]).toEqual([201, 201]);
    expect(await two.json()).toEqual(await one.json());
    const { rows } = await database.query<{ n: number }>(
      'select count(*)::int as n from signatures where revision_id = $1',
      [revisionId],
    );
    expect(rows[0].n).toBe(1);
    const { rows: keys } = await database.query<{ request_hash: string }>(
      'select request_hash from idempotency_keys where key = $1',
      [key],
    );
    expect(keys[0].request_hash).toBe(digestOf({ digest: body.digest }));
  });

  it('for files lead to the store for a short time, and bytes come exactly', async () => {
    const { cookie } = house.people.producer;
    const answer = await callRoute(mesh, { cookie, params: at() });
    expect(answer.status).toBe(307);
    const location = answer.headers.get('location')!;
    expect(Number(new URL(location).searchParams.get('X-Amz-Expires'))).toBeLessThanOrEqual(300);
    const bytes = new Uint8Array(await (await fetch(location)).arrayBuffer());
    expect(bytes.length).toBe(684);
    const reviewer = await callRoute(mesh, { cookie: house.people.reviewer.cookie, params: at() });
    expect(reviewer.status).toBe(403);
    const none = await callRoute(model, { cookie, params: at() });
    expect(none.status).toBe(404);
    const job = jobContext(house.workspace.id);
    const { rows } = await database.query<{ mesh_id: string }>(
      'select mesh_id from revisions where id = $1',
      [posted.revisionId],
    );
    await withTenant(job, async (tx) => {
      expect(await findMesh(tx, house.workspace.id, rows[0].mesh_id)).not.toBeNull();
      await keepDerivative(tx, {
        workspaceId: house.workspace.id,
        meshId: rows[0].mesh_id,
        kind: 'thumbnail',
        storeKey: `derivatives/${house.workspace.id}/${randomUUID()}`,
        bytes: 10,
        sha256: 'a'.repeat(64),
        meta: {},
      });
    });
    const small = await callRoute(thumbnail, { cookie: house.people.reviewer.cookie, params: at() });
    expect(small.status).toBe(307);
    const list = await callRoute(templates.GET, { cookie, params: at() });
    const { items } = (await list.json()) as { items: { id: string; thumbnailUrl: string | null }[] };
    expect(items.find(({ id }) => id === posted.templateId)?.thumbnailUrl).toBe(
      `/api/v1/workspaces/${house.workspace.slug}/revisions/${posted.revisionId}/thumbnail`,
    );
  });

  it('with a wrong body say which field, and with an odd id that there is nothing', async () => {
    const { cookie } = house.people.lead;
    const bad = await callRoute(threadsRoute, {
      body: { clientKey: 'x', body: {} },
      cookie,
      params: at(),
      headers: { 'idempotency-key': randomUUID() },
    });
    expect(bad.status).toBe(422);
    expect(await bad.json()).toMatchObject({
      type: '/problems/invalid',
      errors: [{ pointer: '/clientKey' }],
    });
    const odd = await callRoute(revision, { cookie, params: at({ revision: '../x' }) });
    expect(odd.status).toBe(404);
  });

  it('for Today need a person only', async () => {
    expect((await callRoute(today, {})).status).toBe(401);
    const answer = await callRoute(today, { cookie: house.people.designer.cookie });
    expect(answer.status).toBe(200);
    expect(await answer.json()).toMatchObject({ items: expect.any(Array), recent: expect.any(Array) });
  });
});
