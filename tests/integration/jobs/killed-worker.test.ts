import { afterEach, beforeAll, beforeEach, describe, expect, it, vi } from 'vitest';
import { tartTray } from '@/db/seed/templates';
import { sha256 } from '@/lib/audit/canonical';
import { viewRevision } from '@/lib/review/view-revision';
import {
  freshDatabase,
  freshObjectStore,
  freshSmtpCatcher,
  type FreshDatabase,
} from '@/tests/support/database';
import { makeHouse, type House } from '@/tests/support/make-house';
import type { Fault } from '@/tests/support/object-store/faults';
import type { ObjectStore } from '@/tests/support/object-store/start-object-store';
import { postFile, settledJob, type Posted } from '../production/agreed-template';
import { killWorkers, startWorkerProcess, type WorkerProcess } from './worker-process';

/** Each test stops a worker in the middle of a check run: it waits for the mesh, which the store holds back. */
let database: FreshDatabase;
let objects: ObjectStore;
let house: House;
let bytes: Uint8Array;
let worker: WorkerProcess;
let posted: Posted;
let held: Fault;

beforeAll(async () => {
  database = await freshDatabase();
  objects = await freshObjectStore();
  await freshSmtpCatcher();
  house = await makeHouse(database);
  bytes = await tartTray({ draftDeg: 8, ventMm: 1 });
});

/** The same tray with another header: other bytes, so that no earlier report answers. */
let made = 0;
const oneOff = () => bytes.with(0, 65 + made++);

type JobRow = {
  state: string;
  attempt: number;
  handed_back: number;
  worker: string | null;
  error: string | null;
};
const jobOf = async (subjectId: string) => {
  const { rows } = await database.query<JobRow>('select * from jobs where subject_id = $1', [subjectId]);
  expect(rows).toHaveLength(1);
  return rows[0];
};
const running = (subjectId: string) =>
  vi.waitFor(async () => expect((await jobOf(subjectId)).state).toBe('running'), { timeout: 30_000 });
/** As if half a minute had gone by without a heartbeat. */
const leaseRunsOut = (subjectId: string) =>
  database.query("update jobs set lease_until = now() - interval '1 second' where subject_id = $1", [
    subjectId,
  ]);

const exactlyOneAnswer = async () => {
  const { rows: reports } = await database.query('select id from reports where mesh_sha256 = $1', [
    sha256(posted.bytes),
  ]);
  expect(reports).toHaveLength(1);
  const { rows: entries } = await database.query(
    "select seq from audit_entries where action = 'check.finished' and subject_id = $1",
    [posted.revisionId],
  );
  expect(entries).toHaveLength(1);
  const { rows: kinds } = await database.query<{ kind: string }>(
    'select d.kind from derivatives d join revisions r on r.mesh_id = d.mesh_id where r.id = $1 order by 1',
    [posted.revisionId],
  );
  expect(kinds.map(({ kind }) => kind)).toEqual(['model', 'picture', 'sheet', 'thumbnail']);
  const view = await viewRevision(await house.enter('designer'), posted.revisionId);
  expect(view.check).toMatchObject({ state: 'finished', error: null });
  expect(view.gates[1].state).toBe('open');
};

beforeEach(async () => {
  worker = await startWorkerProcess();
  // The first read accepts the file; the one after posting is the check run's.
  objects.faults.clear();
  posted = await postFile(database, house, { fileName: 'tray.stl', bytes: oneOff() }, () => {
    held = objects.faults.plant({ kind: 'hold', method: 'GET', url: /uploads\// });
  });
  await running(posted.revisionId);
  await vi.waitFor(() => expect(held.hits).toBe(1), { timeout: 30_000 });
});

afterEach(killWorkers);

describe('a check run whose worker', { timeout: 180_000 }, () => {
  it('is killed is completed by another, once', async () => {
    expect(await worker.end('SIGKILL')).toEqual({ code: null, signal: 'SIGKILL' });
    objects.faults.clear();
    await leaseRunsOut(posted.revisionId);
    await startWorkerProcess();
    expect(await settledJob(database, posted.revisionId)).toMatchObject({ state: 'done', attempt: 2 });
    await exactlyOneAnswer();
  });

  it('is asked to stop is handed back unspent, and completed by another', async () => {
    expect(await worker.end('SIGTERM')).toEqual({ code: 0, signal: null });
    expect(await jobOf(posted.revisionId)).toMatchObject({ state: 'queued', attempt: 1, handed_back: 1 });
    objects.faults.clear();
    await startWorkerProcess();
    expect(await settledJob(database, posted.revisionId)).toMatchObject({ state: 'done', attempt: 2 });
    await exactlyOneAnswer();
  });

  it('falls asleep is completed by another, and changes nothing when it wakes', async () => {
    worker.signal('SIGSTOP');
    await leaseRunsOut(posted.revisionId);
    await startWorkerProcess();
    expect(await settledJob(database, posted.revisionId)).toMatchObject({ state: 'done', attempt: 2 });
    const after = await database.query<{ seq: number }>('select seq from audit_heads');
    worker.signal('SIGCONT');
    objects.faults.clear();
    await worker.says(({ msg }) => msg === 'job left to another try');
    await worker.end('SIGTERM');
    expect((await database.query('select seq from audit_heads')).rows).toEqual(after.rows);
    expect(await jobOf(posted.revisionId)).toMatchObject({ state: 'done', attempt: 2 });
    await exactlyOneAnswer();
  });
});
