import { beforeAll, describe, expect, it, vi } from 'vitest';
import { tartTray } from '@/db/seed/templates';
import type { EffectiveRecipe } from '@/lib/formability/recipe';
import type { Report } from '@/lib/formability/report';
import { createTemplate } from '@/lib/review/create-template';
import { locateFile } from '@/lib/review/locate-file';
import { recheckRevision } from '@/lib/review/recheck-revision';
import { viewRevision } from '@/lib/review/view-revision';
import { viewUpload } from '@/lib/review/view-upload';
import { frustum } from '@/tests/fixtures/meshes/solids';
import { scaled } from '@/tests/fixtures/meshes/triangles';
import { packed, plain3mf } from '@/tests/fixtures/meshes/write-3mf';
import { frustumStep } from '@/tests/fixtures/meshes/write-step';
import {
  freshDatabase,
  freshObjectStore,
  freshSmtpCatcher,
  type FreshDatabase,
} from '@/tests/support/database';
import { makeHouse, type House } from '@/tests/support/make-house';
import type { ObjectStore } from '@/tests/support/object-store/start-object-store';
import { postFile, readyUpload, sendFile, settledJob } from '../production/agreed-template';
import { openPage } from './open-page';
import { startWorkerProcess } from './worker-process';

let database: FreshDatabase;
let objects: ObjectStore;
let house: House;
let tray: Uint8Array;

beforeAll(async () => {
  database = await freshDatabase();
  objects = await freshObjectStore();
  await freshSmtpCatcher();
  house = await makeHouse(database);
  tray = await tartTray({ draftDeg: 8, ventMm: 1 });
  await Promise.all([startWorkerProcess(), startWorkerProcess()]);
});

/** Other bytes, the same shape: the header of a binary STL says nothing. */
const variant = (n: number) => tray.with(0, 97 + n);

describe('a file that cannot be used', { timeout: 120_000 }, () => {
  const png = Buffer.concat([
    Buffer.from([0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a]),
    Buffer.alloc(200),
  ]);
  const hugeCount = () => {
    const bytes = Uint8Array.from(tray);
    new DataView(bytes.buffer).setUint32(80, 0xffffffff, true);
    return bytes;
  };
  const notANumber = () => {
    const bytes = Uint8Array.from(tray);
    new DataView(bytes.buffer).setFloat32(96, Number.NaN, true);
    return bytes;
  };
  const cases: [string, () => Uint8Array][] = [
    ['truncated.stl', () => tray.slice(0, 5_000)],
    ['huge-count.stl', hugeCount],
    ['nan.stl', notANumber],
    ['picture-renamed.stl', () => png],
  ];

  it.each(cases)('%s is refused with what, where and what to do', async (fileName, bytes) => {
    const { upload, uploadId } = await readyUpload(database, house, { fileName, bytes: bytes() });
    expect(upload.state).toBe('refused');
    expect(upload.mesh).toBeNull();
    expect(upload.refusal!.code).toMatch(/^[a-z_]+$/);
    expect(upload.refusal!.message.length).toBeGreaterThan(30);
    const { rows } = await database.query(
      "select actor_name from audit_entries where action = 'upload.refused' and subject_id = $1",
      [uploadId],
    );
    expect(rows).toEqual([{ actor_name: 'Firstpull worker' }]);
  });

  it('that the store lost is refused, and can be sent again', async () => {
    const designer = await house.enter('designer');
    const { id: templateId } = await createTemplate(designer, { title: 'Lost on its way', dueOn: null });
    // Held until the object is gone from under the row.
    const held = objects.faults.plant({ kind: 'hold', method: 'GET', url: /uploads\// });
    const uploadId = await sendFile(designer, templateId, { fileName: 'lost.stl', bytes: tray });
    const { rows } = await database.query<{ store_key: string }>(
      'select store_key from uploads where id = $1',
      [uploadId],
    );
    await removeObject(rows[0].store_key);
    held.release();
    await settledJob(database, uploadId);
    expect(await viewUpload(designer, uploadId)).toMatchObject({
      state: 'refused',
      refusal: { code: 'missing' },
    });
  });
});

async function removeObject(key: string): Promise<void> {
  const { DeleteObjectCommand } = await import('@aws-sdk/client-s3');
  const { innerClient } = await import('@/lib/storage/client');
  await innerClient().send(new DeleteObjectCommand({ Bucket: objects.bucket, Key: key }));
}

describe('a 3MF and a STEP file', { timeout: 240_000 }, () => {
  const inches = plain3mf(scaled(frustum(60, 40, 20, 5), 1 / 25.4), 'unit="inch"');

  it.each([
    // The name says nothing, and neither does the unit that was given with the file.
    { fileName: 'lid.stl', bytes: inches, format: '3mf', unit: 'in', out: 'lid.stl.3mf', type: 'model/3mf' },
    { fileName: 'lid.stp', bytes: frustumStep(60, 40, 20, 5), format: 'step', unit: 'mm', out: 'lid.stp', type: 'model/step' }, // prettier-ignore
  ])('$format is read, posted, checked, drawn and handed out as its exact bytes', async (given) => {
    const { fileName, bytes, format, unit } = given;
    const { revisionId, uploadId } = await postFile(database, house, { fileName, bytes });
    const designer = await house.enter('designer');
    const { mesh } = await viewUpload(designer, uploadId);
    expect(mesh).toMatchObject({ format, unit, triangles: 12 });
    expect(mesh!.boundsMm.max[0]).toBeCloseTo(30, 3);
    expect(await settledJob(database, revisionId)).toMatchObject({ state: 'done', attempt: 1 });
    const { rows } = await database.query<{ body: Report; recipe: EffectiveRecipe; kinds: string[] }>(
      `select p.body, c.body as recipe,
         (select array_agg(d.kind::text order by d.kind::text) from derivatives d where d.mesh_id = r.mesh_id) as kinds
       from revisions r join recipes c on c.id = r.recipe_id
       join check_runs k on k.revision_id = r.id join reports p on p.id = k.report_id where r.id = $1`,
      [revisionId],
    );
    expect(rows[0].body.input).toMatchObject({ format, unit, bodies: 1, bytes: bytes.length });
    expect(rows[0].recipe.mesh.unit).toBe(unit);
    expect(rows[0].body.mesh.volumeMm3).toBeCloseTo(44_582.1, 0);
    expect(rows[0].kinds).toEqual(['model', 'picture', 'sheet', 'thumbnail']);
    const answer = await fetch(await locateFile(await house.enter('lead'), revisionId, 'mesh'));
    expect(answer.headers.get('content-type')).toBe(given.type);
    expect(answer.headers.get('content-disposition')).toContain(`"${given.out}"`);
    expect(Buffer.compare(Buffer.from(await answer.arrayBuffer()), Buffer.from(bytes))).toBe(0);
  });

  it.each([
    ['dtd.3mf', packed('<!DOCTYPE model><model/>'), 'unsupported', /document type/],
    ['cut.step', frustumStep(60, 40, 20, 5).slice(0, 3000), 'truncated', /END-ISO-10303-21/],
  ] as const)('%s is refused in words', async (fileName, bytes, code, words) => {
    const { upload } = await readyUpload(database, house, { fileName, bytes });
    expect(upload).toMatchObject({ state: 'refused', refusal: { code } });
    expect(upload.refusal!.message).toMatch(words);
  });
});

describe('two workers side by side', { timeout: 240_000 }, () => {
  it('do every job once', async () => {
    const posted = [];
    for (let n = 0; n < 6; n++)
      posted.push(await postFile(database, house, { fileName: `tray-${n}.stl`, bytes: variant(n) }));
    for (const { revisionId } of posted)
      expect(await settledJob(database, revisionId)).toMatchObject({ state: 'done', attempt: 1 });
    const { rows } = await database.query<{ n: number }>(
      "select count(*)::int as n from audit_entries where action = 'check.finished' and subject_id = any($1) group by subject_id",
      [posted.map(({ revisionId }) => revisionId)],
    );
    expect(rows).toEqual(posted.map(() => ({ n: 1 })));
    const { rows: workers } = await database.query(
      "select distinct worker from jobs where kind = 'check-revision'",
    );
    expect(workers.length).toBeGreaterThanOrEqual(1);
  });

  it('answer the same bytes under the same recipe with the report that is there', async () => {
    const again = await postFile(database, house, { fileName: 'tray-0.stl', bytes: variant(0) });
    await settledJob(database, again.revisionId);
    const { rows } = await database.query<{ report_id: string }>(
      `select distinct c.report_id from check_runs c join revisions r on r.id = c.revision_id
       join meshes m on m.id = r.mesh_id where m.file_name = 'tray-0.stl'`,
    );
    expect(rows).toHaveLength(1);
  });
});

describe('a check run', { timeout: 120_000 }, () => {
  it('shows its progress to open pages while it runs', async () => {
    const heard = await openPage(house.workspace.id, 'job.progressed');
    const { revisionId } = await postFile(database, house, { fileName: 'progress.stl', bytes: variant(10) });
    await settledJob(database, revisionId);
    const about = heard.map(({ data }) => data as { subjectId: string; stage: string; progress: number });
    const mine = about.filter(({ subjectId }) => subjectId === revisionId);
    expect(mine.length).toBeGreaterThan(0);
    const shares = mine.map(({ progress }) => progress);
    expect(shares).toEqual(shares.toSorted((a, b) => a - b));
    for (const { stage } of mine) expect(stage).not.toBe('');
  });

  it('is done although every connection to the database was cut', async () => {
    const { revisionId } = await postFile(
      database,
      house,
      { fileName: 'cut.stl', bytes: variant(11) },
      () => {
        void objects.faults.plant({ kind: 'hold', method: 'GET', url: /uploads\// });
      },
    );
    await vi.waitFor(async () => {
      const { rows } = await database.query(
        "select 1 from jobs where subject_id = $1 and state = 'running'",
        [revisionId],
      );
      expect(rows).toHaveLength(1);
    }, 30_000);
    const { rowCount } = await database.query(
      "select pg_terminate_backend(pid) from pg_stat_activity where datname = current_database() and application_name like 'firstpull%'",
    );
    expect(rowCount).toBeGreaterThan(5);
    objects.faults.clear();
    expect(await settledJob(database, revisionId)).toMatchObject({ state: 'done' });
  });
});

const spentTries = async (jobId: string) =>
  (await database.query('select attempt - handed_back as spent from jobs where id = $1', [jobId])).rows[0];

describe('a job that fails each time', { timeout: 180_000 }, () => {
  it('is given up after three tries, and the page says why', async () => {
    const posted = await postFile(
      database,
      house,
      { fileName: 'unlucky.stl', bytes: variant(20) },
      () => void objects.faults.plant({ kind: 'unavailable', method: 'GET', url: /uploads\//, times: 1000 }),
    );
    const designer = await house.enter('designer');
    await expect(recheckRevision(designer, posted.revisionId)).rejects.toMatchObject({
      reason: 'check-not-failed',
    });
    // As if the store had been away for longer than a job waits for it.
    await database.query(
      "update jobs set created_at = created_at - interval '2 hours' where subject_id = $1",
      [posted.revisionId],
    );
    const job = await settledJob(database, posted.revisionId, 120_000);
    objects.faults.clear();
    expect(job.state).toBe('failed');
    expect(await spentTries(job.id)).toMatchObject({ spent: 3 });
    expect(job.error).toMatch(/store does not answer/);
    const { check } = await viewRevision(designer, posted.revisionId);
    expect(check).toMatchObject({ state: 'failed', error: job.error });

    // Ordered again by those who may post, it is checked; then there is nothing to order.
    await expect(recheckRevision(await house.enter('reviewer'), posted.revisionId)).rejects.toMatchObject({
      code: 'forbidden',
    });
    const { jobId } = await recheckRevision(await house.enter('lead'), posted.revisionId);
    expect(await settledJob(database, posted.revisionId)).toMatchObject({ id: jobId, state: 'done' });
    expect((await viewRevision(designer, posted.revisionId)).check).toMatchObject({
      state: 'finished',
      error: null,
    });
    await expect(recheckRevision(designer, posted.revisionId)).rejects.toMatchObject({
      reason: 'check-not-failed',
    });
    const { rows } = await database.query(
      "select detail->>'jobId' as job from audit_entries where action = 'check.ordered-again'",
    );
    expect(rows).toEqual([{ job: jobId }]);
  });

  it('waits, without spending a try, while the store is away, and is done once it is back', async () => {
    const posted = await postFile(
      database,
      house,
      { fileName: 'patient.stl', bytes: variant(23) },
      () => void objects.faults.plant({ kind: 'unavailable', method: 'GET', url: /uploads\//, times: 1000 }),
    );
    const id = await vi.waitFor(
      async () => {
        const { rows } = await database.query<{ id: string; n: number }>(
          "select id, attempt as n from jobs where subject_id = $1 and state = 'queued'",
          [posted.revisionId],
        );
        if (!(rows[0]?.n >= 4)) throw new Error(`the job stands at ${JSON.stringify(rows[0])}`);
        return rows[0].id;
      },
      { timeout: 120_000, interval: 50 },
    );
    expect(await spentTries(id)).toMatchObject({ spent: 0 });
    objects.faults.clear();
    expect(await settledJob(database, posted.revisionId, 120_000)).toMatchObject({ state: 'done' });
  });

  it('is given up at once where trying again cannot help: other bytes than were posted', async () => {
    const posted = await postFile(database, house, { fileName: 'swapped.stl', bytes: variant(21) }, () => {
      void objects.faults.plant({ kind: 'hold', method: 'GET', url: /uploads\// });
    });
    const { rows } = await database.query<{ store_key: string }>(
      'select m.store_key from meshes m join revisions r on r.mesh_id = m.id where r.id = $1',
      [posted.revisionId],
    );
    await removeObject(rows[0].store_key);
    const { store } = await import('@/lib/storage/store');
    await store().put(rows[0].store_key, variant(22), 'model/stl');
    objects.faults.clear();
    const job = await settledJob(database, posted.revisionId);
    expect(job).toMatchObject({ state: 'failed', attempt: 1 });
    expect(job.error).toMatch(/not the one that was posted/);
  });
});
