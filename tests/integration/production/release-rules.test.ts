import { Client } from 'pg';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import {
  GET as getPack,
  POST as orderPack,
} from '@/app/api/v1/workspaces/[workspace]/revisions/[revision]/pack/route';
import { POST as recall } from '@/app/api/v1/workspaces/[workspace]/revisions/[revision]/recall/route';
import { POST as release } from '@/app/api/v1/workspaces/[workspace]/revisions/[revision]/release/route';
import { POST as retire } from '@/app/api/v1/workspaces/[workspace]/revisions/[revision]/retire/route';
import { GET as getMesh } from '@/app/api/v1/workspaces/[workspace]/revisions/[revision]/mesh/route';
import { viewRevision } from '@/lib/review/view-revision';
import type { Role } from '@/lib/workspaces/roles';
import { callRoute } from '@/tests/support/call-route';
import {
  freshDatabase,
  freshObjectStore,
  freshSmtpCatcher,
  type FreshDatabase,
} from '@/tests/support/database';
import { makeHouse, type House } from '@/tests/support/make-house';
import type { ObjectStore } from '@/tests/support/object-store/start-object-store';
import type { SmtpCatcher } from '@/tests/support/smtp-catcher';
import { startWorkerProcess } from '../jobs/worker-process';
import { approvedTemplate, postFile, settledJob, type Posted } from './agreed-template';
import { tartTray } from '@/db/seed/templates';

let database: FreshDatabase;
let objects: ObjectStore;
let mail: SmtpCatcher;
let house: House;
let other: House;
let superuser: Client;

beforeAll(async () => {
  database = await freshDatabase();
  objects = await freshObjectStore();
  mail = await freshSmtpCatcher();
  house = await makeHouse(database);
  other = await makeHouse(database);
  await startWorkerProcess();
  superuser = new Client({ connectionString: database.adminUrl });
  await superuser.connect();
  await superuser.query("set session_replication_role = 'replica'");
});
afterAll(() => superuser.end());

type Handler = Parameters<typeof callRoute>[0];
let keys = 0;
async function call(handler: Handler, role: Role, { revisionId }: Posted, body?: unknown, home = house) {
  const answer = await callRoute(handler, {
    params: { workspace: house.workspace.slug, revision: revisionId },
    cookie: home.people[role].cookie,
    body,
    method: body ? 'POST' : 'GET',
    headers: { 'idempotency-key': `key-${++keys}` },
  });
  const problem = answer.headers.get('content-type')?.includes('json') ? await answer.json() : null;
  return { status: answer.status, problem, location: answer.headers.get('location') };
}
const refusedAs = (reason: string) => ({ problem: expect.objectContaining({ type: `/problems/${reason}` }) });
const stateOf = async ({ revisionId }: Posted) =>
  (await database.query<{ state: string }>('select state from revisions where id = $1', [revisionId])).rows[0]
    .state;
const releaseIdOf = async ({ revisionId }: Posted) =>
  (await database.query<{ id: string }>('select id from releases where revision_id = $1', [revisionId]))
    .rows[0].id;
const reason = { reason: 'The rim splits at pull twelve.' };

describe('releasing', { timeout: 240_000 }, () => {
  it('takes the right role, the right workspace, an approved revision; then once', async () => {
    const bytes = await tartTray({ draftDeg: 8, ventMm: 1 });
    const inReview = await postFile(database, house, { fileName: 'early.stl', bytes });
    expect(await call(release, 'producer', inReview, {})).toMatchObject({
      status: 409,
      ...refusedAs('not-approved'),
    });

    const approved = await approvedTemplate(database, house);
    for (const role of ['designer', 'reviewer', 'approver'] as const)
      expect(await call(release, role, approved, {})).toMatchObject({ status: 403 });
    expect(await call(release, 'producer', approved, {}, other)).toMatchObject({ status: 404 });
    expect(await call(getPack, 'producer', approved)).toMatchObject({ status: 404 });
    expect(await stateOf(approved)).toBe('approved');
    expect(await call(release, 'producer', { ...approved, revisionId: 'no-id' }, {})).toMatchObject({
      status: 404,
    });
    expect(await call(recall, 'producer', approved, reason)).toMatchObject({
      status: 409,
      ...refusedAs('not-released'),
    });

    // Two at the same moment: one release, one refusal.
    const both = await Promise.all([
      call(release, 'producer', approved, {}),
      call(release, 'lead', approved, {}),
    ]);
    expect(both.map(({ status }) => status).sort()).toEqual([201, 409]);
    const { rows } = await database.query('select id from releases where revision_id = $1', [
      approved.revisionId,
    ]);
    expect(rows).toHaveLength(1);
  });

  it('is refused when a stored part is not what was agreed', async () => {
    const approved = await approvedTemplate(database, house);
    const changes: [string, string][] = [
      [`update recipes set body = jsonb_set(body, '{print,layerMm}', '0.3')`, 'recipes'],
      [`update reports set body = jsonb_set(body, '{plan,planAreaMm2}', '1')`, 'reports'],
      [`update locks set content = jsonb_set(content, '{mesh,bytes}', '1')`, 'locks'],
      [`update findings set status = 'pass' where status <> 'pass'`, 'findings'],
    ];
    for (const [sql, table] of changes) {
      await superuser.query(`create temp table kept as select * from ${table}`);
      await superuser.query(sql);
      expect(await call(release, 'producer', approved, {})).toMatchObject({
        status: 409,
        ...refusedAs('content-changed'),
      });
      await superuser.query(`delete from ${table}`);
      await superuser.query(`insert into ${table} select * from kept`);
      await superuser.query('drop table kept');
    }
    expect(await call(release, 'producer', approved, {})).toMatchObject({ status: 201 });
  });
});

describe('a released revision', { timeout: 240_000 }, () => {
  it('is not packed from other bytes than were agreed; ordered again once they are back, it is', async () => {
    const approved = await approvedTemplate(database, house);
    const { rows } = await database.query<{ store_key: string }>(
      'select m.store_key from meshes m join revisions r on r.mesh_id = m.id where r.id = $1',
      [approved.revisionId],
    );
    const stored = objects.object(rows[0].store_key)!;
    const honest = stored.body!;
    stored.body = Buffer.from(honest).fill(1, 100, 101);
    await call(release, 'producer', approved, {});
    const job = await settledJob(database, await releaseIdOf(approved));
    expect(job).toMatchObject({
      state: 'failed',
      attempt: 1,
      error: expect.stringMatching(/not the one that was agreed/),
    });
    const packs = await database.query('select 1 from packs where release_id = $1', [
      await releaseIdOf(approved),
    ]);
    expect(packs.rows).toEqual([]);
    expect(await call(getPack, 'producer', approved)).toMatchObject({
      status: 409,
      ...refusedAs('pack-not-built'),
    });

    const seenBy = async (role: Role) => viewRevision(await house.enter(role), approved.revisionId);
    const producers = await seenBy('producer');
    expect(producers.release).toMatchObject({ pack: null, packJob: { state: 'failed', error: job.error } });
    expect(producers.can.rebuild).toBe(true);
    expect((await seenBy('approver')).can.rebuild).toBe(false);

    stored.body = honest;
    expect(await call(orderPack, 'reviewer', approved, {})).toMatchObject({ status: 403 });
    expect(await call(orderPack, 'producer', approved, {})).toMatchObject({ status: 202 });
    expect(await settledJob(database, await releaseIdOf(approved))).toMatchObject({ state: 'done' });
    expect(await seenBy('producer')).toMatchObject({
      release: { pack: { fileName: expect.any(String) }, packJob: { state: 'done', error: null } },
      can: { rebuild: false },
    });
    expect(await call(getPack, 'approver', approved)).toMatchObject({ status: 307 });
    expect(await call(getPack, 'reviewer', approved)).toMatchObject({ status: 403 });
    expect(await call(getPack, 'lead', approved, undefined, other)).toMatchObject({ status: 404 });
    expect(await call(orderPack, 'producer', approved, {})).toMatchObject({
      status: 409,
      ...refusedAs('pack-there'),
    });
  });

  it('is recalled with a reason: everybody is told to stop, and the pack is closed', async () => {
    const approved = await approvedTemplate(database, house);
    await call(release, 'producer', approved, {});
    await settledJob(database, await releaseIdOf(approved));
    expect(await call(recall, 'designer', approved, reason)).toMatchObject({ status: 403 });
    expect(await call(recall, 'producer', approved, { reason: ' ' })).toMatchObject({ status: 422 });
    expect(await call(recall, 'producer', approved, reason)).toMatchObject({ status: 200 });
    expect(await stateOf(approved)).toBe('recalled');
    expect(await call(recall, 'producer', approved, reason)).toMatchObject({ status: 409 });
    expect(await call(getMesh, 'approver', approved)).toMatchObject({
      status: 409,
      ...refusedAs('recalled'),
    });
    expect(await call(getMesh, 'lead', approved)).toMatchObject({ status: 307 });
    for (const [role, may] of [
      ['producer', false],
      ['lead', true],
    ] as const)
      expect((await viewRevision(await house.enter(role), approved.revisionId)).can).toMatchObject({
        mesh: may,
        download: may,
      });
    expect(await call(getPack, 'producer', approved)).toMatchObject({
      status: 409,
      ...refusedAs('recalled'),
    });
    expect(await call(getPack, 'lead', approved)).toMatchObject({ status: 307 });
    const told = await mail.next(
      ({ to, subject }) => subject.includes('RECALLED') && to.includes(house.people.approver.person.email),
    );
    expect(told.text).toContain(reason.reason);
    const { rows } = await database.query<{ detail: { reason: string } }>(
      "select detail from audit_entries where action = 'revision.recalled' and subject_id = $1",
      [approved.revisionId],
    );
    expect(rows[0].detail.reason).toBe(reason.reason);
  });

  it('is retired when it has served', async () => {
    const approved = await approvedTemplate(database, house);
    await call(release, 'lead', approved, {});
    expect(await call(retire, 'approver', approved, reason)).toMatchObject({ status: 403 });
    expect(await call(retire, 'producer', approved, reason)).toMatchObject({ status: 200 });
    expect(await stateOf(approved)).toBe('retired');
    await mail.next(({ subject }) => subject.includes('is retired'));
  });
});
