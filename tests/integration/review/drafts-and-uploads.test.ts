import { beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { personContext, type WorkspaceContext } from '@/lib/auth/context';
import { fillRecipe } from '@/lib/formability/fill-recipe';
import { cancelUpload } from '@/lib/review/cancel-upload';
import { completeUpload } from '@/lib/review/complete-upload';
import { discardDraft } from '@/lib/review/discard-draft';
import { markPartDone } from '@/lib/review/mark-part-done';
import { openDraft } from '@/lib/review/open-draft';
import { postRevision } from '@/lib/review/post-revision';
import { presignParts } from '@/lib/review/presign-parts';
import { readUploadAgain } from '@/lib/review/read-upload-again';
import { acceptUpload, refuseUpload } from '@/lib/review/record-upload';
import { saveDraft } from '@/lib/review/save-draft';
import { startUpload } from '@/lib/review/start-upload';
import { viewToday } from '@/lib/review/view-today';
import { viewUpload } from '@/lib/review/view-upload';
import { store } from '@/lib/storage/store';
import { freshDatabase, type FreshDatabase } from '@/tests/support/database';
import { blockStl, entries, fingerprint, newTemplate, sendMesh, takeJob } from '@/tests/support/factory';
import { makeHouse, type House } from '@/tests/support/make-house';
import { refusedIn } from '@/tests/support/refused';

let database: FreshDatabase;
let house: House;
let designer: WorkspaceContext;
let lead: WorkspaceContext;

beforeAll(async () => {
  database = await freshDatabase();
  house = await makeHouse(database);
});
beforeEach(async () => {
  [designer, lead] = await Promise.all([house.enter('designer'), house.enter('lead')]);
});

const refused = refusedIn(() => ({ database, house }));

describe('drafts', () => {
  it('begin with the studio’s library and its defaults', async () => {
    const studio = lead.studio.id;
    await database.query('update machines set is_default = false where studio_id = $1', [studio]);
    await database.query(
      `insert into machines (id, studio_id, name, forming_x_mm, forming_y_mm, max_height_mm, frame_margin_mm, pressure_bar, is_default)
       values (gen_random_uuid(), $1, 'Small frame', 210, 160, 70, 12, 3.5, true)`,
      [studio],
    );
    await database.query('update sheets set is_default = false where studio_id = $1', [studio]);
    await database.query(
      `insert into sheets (id, studio_id, name, material, gauge_mm, min_formed_mm, is_default)
       values (gen_random_uuid(), $1, 'Clear 0.5', 'apet', 0.5, 0.2, true)`,
      [studio],
    );
    const templateId = await newTemplate(designer);
    const draft = await openDraft(designer, templateId);
    expect(draft).toMatchObject({ nextLetter: 'A', upload: null, note: '', version: 1 });
    expect(draft.recipe).toMatchObject({
      machine: { formingAreaMm: [210, 160], maxHeightMm: 70, frameMarginMm: 12, pressureBar: 3.5 },
      sheet: { material: 'apet', gaugeMm: 0.5, minFormedMm: 0.2 },
    });
    expect(draft.recipe).not.toHaveProperty('limits');
    expect(draft.recipe).not.toHaveProperty('sheet.formingC');
    expect(fillRecipe(draft.recipe).sheet.gaugeMm).toBe(0.5);
    expect((await openDraft(lead, templateId)).id).toBe(draft.id);
  });

  it('save what is half done, once for each version', async () => {
    const templateId = await newTemplate(designer);
    const draft = await openDraft(designer, templateId);
    const recipe = { ...draft.recipe, print: { nozzleMm: null } };
    const saved = await saveDraft(designer, templateId, { uploadId: null, recipe, note: 'Hm.', version: 1 });
    expect(saved).toMatchObject({ note: 'Hm.', version: 2 });
    await refused(
      () => saveDraft(lead, templateId, { uploadId: null, recipe: {}, note: 'Mine.', version: 1 }),
      { code: 'precondition_failed' },
    );
    const same = await saveDraft(designer, templateId, { uploadId: null, recipe, note: 'Hm.', version: 2 });
    expect(same.version).toBe(2);
    await refused(
      () => saveDraft(designer, templateId, { uploadId: null, recipe: { limits: {} }, note: '', version: 2 }),
      { code: 'invalid', errors: [{ pointer: '/recipe/limits' }] },
    );
    const large = { print: { material: 'x'.repeat(30_000) } };
    await refused(
      () => saveDraft(designer, templateId, { uploadId: null, recipe: large, note: '', version: 2 }),
      { code: 'invalid', errors: [{ pointer: '/recipe' }] },
    );
    expect(await discardDraft(designer, templateId)).toEqual({ discarded: true });
    expect(await discardDraft(designer, templateId)).toEqual({ discarded: false });
    await refused(
      () => saveDraft(designer, templateId, { uploadId: null, recipe: {}, note: '', version: 2 }),
      {
        reason: 'no-draft',
      },
    );
  });

  it('say who saved them last, so that a second tab of one person is told from a colleague', async () => {
    const templateId = await newTemplate(designer);
    const draft = await openDraft(designer, templateId);
    expect(draft.changedBy).toEqual({ id: designer.person.id, name: designer.person.name });
    const { recipe, version } = draft;
    await saveDraft(lead, templateId, { uploadId: null, recipe, note: 'By the lead.', version });
    expect((await openDraft(designer, templateId)).changedBy).toEqual({
      id: lead.person.id,
      name: lead.person.name,
    });
  });

  it('are on the desk of whoever began them once they hold something', async () => {
    const templateId = await newTemplate(designer);
    const { recipe, version } = await openDraft(designer, templateId);
    const drafts = async (ctx: WorkspaceContext) =>
      (await viewToday(personContext(ctx.person))).items.filter(
        (item) => item.kind === 'draft' && item.path.includes(templateId),
      );
    expect(await drafts(designer)).toEqual([]);
    await saveDraft(designer, templateId, { uploadId: null, recipe, note: 'Begun.', version });
    expect(await drafts(designer)).toHaveLength(1);
    expect(await drafts(lead)).toEqual([]);
    await discardDraft(designer, templateId);
    expect(await drafts(designer)).toEqual([]);
  });

  it('take a file of the same template only', async () => {
    const one = await newTemplate(designer);
    const two = await newTemplate(designer);
    const uploadId = await sendMesh(designer, one);
    const { version } = await openDraft(designer, two);
    await refused(() => saveDraft(designer, two, { uploadId, recipe: {}, note: '', version }), {
      code: 'invalid',
      errors: [{ pointer: '/uploadId' }],
    });
  });
});

describe('uploads', () => {
  it('fix size and parts at the start, and remember the parts that the store has', async () => {
    const templateId = await newTemplate(designer);
    const bytes = 12_000_000;
    const upload = await startUpload(designer, templateId, { fileName: 'big.stl', bytes });
    expect(upload).toMatchObject({ state: 'sending', partBytes: 5_242_880, partCount: 3, partsDone: [] });
    const { parts } = await presignParts(designer, upload.id, { parts: [3, 1, 1] });
    expect(parts.map(({ number, bytes: length }) => [number, length])).toEqual([
      [3, bytes - 2 * 5_242_880],
      [1, 5_242_880],
    ]);
    await refused(() => presignParts(designer, upload.id, { parts: [1, 4] }), {
      code: 'invalid',
      errors: [{ pointer: '/parts/1' }],
    });
    await markPartDone(designer, upload.id, { number: 3, etag: 'c' });
    await markPartDone(designer, upload.id, { number: 1, etag: 'a' });
    await markPartDone(designer, upload.id, { number: 1, etag: 'b' });
    expect((await viewUpload(designer, upload.id)).partsDone).toEqual([1, 3]);
    await refused(() => completeUpload(designer, upload.id), {
      reason: 'parts-missing',
      message: expect.stringContaining('1 of 3 parts are missing'),
    });
    await refused(() => markPartDone(designer, upload.id, { number: 4, etag: 'x' }), { code: 'invalid' });
  });

  it('belong to whoever began them', async () => {
    const templateId = await newTemplate(designer);
    const upload = await startUpload(designer, templateId, { fileName: 'a.stl', bytes: 100 });
    for (const run of [
      () => presignParts(lead, upload.id, { parts: [1] }),
      () => markPartDone(lead, upload.id, { number: 1, etag: 'x' }),
      () => completeUpload(lead, upload.id),
      () => cancelUpload(lead, upload.id),
    ])
      await refused(run, { code: 'forbidden', reason: 'not-your-upload' });
  });

  it('are read by one job, however often they are completed', async () => {
    const templateId = await newTemplate(designer);
    const bytes = blockStl(7);
    const upload = await startUpload(designer, templateId, { fileName: 'a.stl', bytes: bytes.length });
    const { parts } = await presignParts(designer, upload.id, { parts: [1] });
    const sent = await fetch(parts[0].url, { method: 'PUT', body: Buffer.from(bytes) });
    await markPartDone(designer, upload.id, { number: 1, etag: sent.headers.get('etag') });
    const answers = await Promise.all([1, 2, 3].map(() => completeUpload(designer, upload.id)));
    expect(answers.map(({ state }) => state)).toEqual(['reading', 'reading', 'reading']);
    const { rows } = await database.query('select kind from jobs where subject_id = $1', [upload.id]);
    expect(rows).toEqual([{ kind: 'read-upload' }]);
    const { rows: queued } = await database.query(
      "select 1 from pgboss.job where name = 'read-upload' and data->>'workspaceId' = $1",
      [house.workspace.id],
    );
    expect(queued.length).toBeGreaterThan(0);
    await refused(() => presignParts(designer, upload.id, { parts: [1] }), { reason: 'upload-not-sending' });
  });

  it('are refused when the store has another length than was announced', async () => {
    const templateId = await newTemplate(designer);
    const upload = await startUpload(designer, templateId, { fileName: 'a.stl', bytes: 684 });
    const { parts } = await presignParts(designer, upload.id, { parts: [1] });
    const sent = await fetch(parts[0].url, { method: 'PUT', body: Buffer.from(blockStl()) });
    await markPartDone(designer, upload.id, { number: 1, etag: sent.headers.get('etag') });
    await database.query('update uploads set bytes = 700 where id = $1', [upload.id]);
    const answer = await completeUpload(designer, upload.id);
    expect(answer).toMatchObject({ state: 'refused', refusal: { code: 'length' } });
    expect(answer.refusal?.message).toBe(
      'The store received 684 bytes, but the file was announced with 700. Send it again.',
    );
  });

  it('can be given up', async () => {
    const templateId = await newTemplate(designer);
    const upload = await startUpload(designer, templateId, { fileName: 'a.stl', bytes: 100 });
    expect((await cancelUpload(designer, upload.id)).state).toBe('cancelled');
    expect((await cancelUpload(designer, upload.id)).state).toBe('cancelled');
    await refused(() => completeUpload(designer, upload.id), { reason: 'upload-not-sending' });
    const ready = await sendMesh(designer, templateId);
    expect((await cancelUpload(designer, ready)).state).toBe('ready');
  });

  it('that came to their end are let be, whoever gives them up', async () => {
    const templateId = await newTemplate(designer);
    const ready = await sendMesh(designer, templateId);
    const before = await fingerprint(database, house.workspace.id);
    expect((await cancelUpload(lead, ready)).state).toBe('ready');
    expect(await fingerprint(database, house.workspace.id)).toBe(before);
    for (const state of ['refused', 'cancelled']) {
      const upload = await startUpload(designer, templateId, { fileName: 'a.stl', bytes: 100 });
      await database.query('update uploads set state = $2 where id = $1', [upload.id, state]);
      const then = await fingerprint(database, house.workspace.id);
      expect((await cancelUpload(lead, upload.id)).state).toBe(state);
      expect(await fingerprint(database, house.workspace.id)).toBe(then);
    }
  });

  it('keep when the file was last written, where it is known', async () => {
    const templateId = await newTemplate(designer);
    const lastModified = 1_790_000_000_123;
    const known = await startUpload(designer, templateId, { fileName: 'a.stl', bytes: 100, lastModified });
    expect((await viewUpload(designer, known.id)).lastModified).toBe(lastModified);
    const unknown = await startUpload(designer, templateId, { fileName: 'a.stl', bytes: 100 });
    expect((await viewUpload(designer, unknown.id)).lastModified).toBeNull();
  });

  it('that were begun and left stop new ones for a day only', async () => {
    const templateId = await newTemplate(lead);
    const start = () => startUpload(lead, templateId, { fileName: 'a.stl', bytes: 100 });
    const first = await start();
    for (let begun = 1; begun < 20; begun++) await start();
    await refused(start, { code: 'limit_exceeded', reason: 'too-many-uploads' });
    await database.query("update uploads set created_at = now() - interval '25 hours' where id = $1", [
      first.id,
    ]);
    const second = await start();
    await refused(start, { reason: 'too-many-uploads' });
    await database.query("update uploads set state = 'reading' where id = $1", [second.id]);
    expect((await start()).state).toBe('sending');
  });

  it('forget their parts when the store has other ones, and can be sent again', async () => {
    const templateId = await newTemplate(designer);
    const bytes = blockStl(11);
    const upload = await startUpload(designer, templateId, { fileName: 'a.stl', bytes: bytes.length });
    const send = async () => {
      const { parts } = await presignParts(designer, upload.id, { parts: [1] });
      const sent = await fetch(parts[0].url, { method: 'PUT', body: Buffer.from(bytes) });
      return sent.headers.get('etag');
    };
    await send();
    await markPartDone(designer, upload.id, { number: 1, etag: '"00000000000000000000000000000000"' });
    await expect(completeUpload(designer, upload.id)).rejects.toMatchObject({
      code: 'conflict',
      reason: 'parts-missing',
      message: expect.stringContaining('Send them again'),
    });
    expect(await viewUpload(designer, upload.id)).toMatchObject({ state: 'sending', partsDone: [] });
    await markPartDone(designer, upload.id, { number: 1, etag: await send() });
    expect((await completeUpload(designer, upload.id)).state).toBe('reading');
  });

  it('are refused in words when the store has cleared them away', async () => {
    const templateId = await newTemplate(designer);
    const upload = await startUpload(designer, templateId, { fileName: 'a.stl', bytes: 684 });
    await markPartDone(designer, upload.id, { number: 1, etag: '"00000000000000000000000000000000"' });
    const { rows } = await database.query('select store_key, multipart_id from uploads where id = $1', [
      upload.id,
    ]);
    await store().abortMultipart(rows[0].store_key, rows[0].multipart_id);
    const answer = await completeUpload(designer, upload.id);
    expect(answer).toMatchObject({ state: 'refused', refusal: { code: 'lost' } });
    expect(answer.refusal?.message).toContain('Send it again.');
    const [entry] = await entries(database, house.workspace.id, 1);
    expect(entry).toMatchObject({ action: 'upload.refused', subject_id: upload.id });
  });

  it.each([
    [{ fileName: 'a.stl', bytes: 0 }, '/bytes'],
    [{ fileName: 'a.stl', bytes: 500_000_001 }, '/bytes'],
    [{ fileName: '', bytes: 10 }, '/fileName'],
    [{ fileName: 'a.stl', bytes: 10, unit: 'parsec' }, '/unit'],
  ])('refuse %j', async (input, pointer) => {
    const templateId = await newTemplate(designer);
    await refused(() => startUpload(designer, templateId, input), { code: 'invalid', errors: [{ pointer }] });
  });

  it('are read again in another unit without being sent again', async () => {
    const templateId = await newTemplate(designer);
    const uploadId = await sendMesh(designer, templateId);
    const before = await viewUpload(designer, uploadId);
    const reading = await readUploadAgain(designer, uploadId, { unit: 'in' });
    expect(reading).toMatchObject({ state: 'reading', unit: 'in', mesh: null });
    expect(await readUploadAgain(lead, uploadId, { unit: 'in' })).toMatchObject({ state: 'reading' });
    const [entry] = await entries(database, house.workspace.id, 1);
    expect(entry).toMatchObject({ action: 'upload.read-again', subject_id: uploadId });
    const job = await takeJob(designer.workspace.id, 'read-upload', uploadId);
    await acceptUpload(job.ctx, job.fence, uploadId, {
      sha256: before.mesh!.sha256,
      bytes: before.bytes,
      format: 'stl-binary',
      unit: 'in',
      triangles: 12,
      boundsMm: { min: [-762, -762, 0], max: [762, 762, 508] },
    });
    const after = await viewUpload(designer, uploadId);
    expect(after).toMatchObject({ state: 'ready', mesh: { unit: 'in', sha256: before.mesh!.sha256 } });
    expect(after.mesh!.id).not.toBe(before.mesh!.id);
  });

  it('are read again when only their size in the unit given was out of range', async () => {
    const templateId = await newTemplate(designer);
    const uploadId = await sendMesh(designer, templateId);
    const refuseAs = async (code: string, unit: string) => {
      await readUploadAgain(designer, uploadId, { unit });
      const job = await takeJob(designer.workspace.id, 'read-upload', uploadId);
      await refuseUpload(job.ctx, job.fence, uploadId, { code, message: 'It is out of range.', reasons: [] });
    };
    await refuseAs('out_of_range', 'm');
    const again = await readUploadAgain(designer, uploadId, { unit: 'cm' });
    expect(again).toMatchObject({ state: 'reading', unit: 'cm', refusal: null });
    const job = await takeJob(designer.workspace.id, 'read-upload', uploadId);
    await refuseUpload(job.ctx, job.fence, uploadId, { code: 'truncated', message: 'Cut off.', reasons: [] });
    await refused(() => readUploadAgain(designer, uploadId, { unit: 'mm' }), { reason: 'upload-not-ready' });
  });

  it('are not read in another unit before they were read once, or where the file names its own', async () => {
    const templateId = await newTemplate(designer);
    const sending = await startUpload(designer, templateId, { fileName: 'a.stl', bytes: 684 });
    await refused(() => readUploadAgain(designer, sending.id, { unit: 'cm' }), {
      reason: 'upload-not-ready',
    });
    await refused(() => readUploadAgain(designer, sending.id, { unit: 'ell' }), {
      code: 'invalid',
      errors: [{ pointer: '/unit' }],
    });
    const uploadId = await sendMesh(designer, templateId);
    await readUploadAgain(designer, uploadId, { unit: 'cm' });
    const job = await takeJob(designer.workspace.id, 'read-upload', uploadId);
    await acceptUpload(job.ctx, job.fence, uploadId, {
      sha256: 'ab'.repeat(32),
      bytes: 684,
      format: '3mf',
      unit: 'mm',
      triangles: 12,
      boundsMm: { min: [0, 0, 0], max: [1, 1, 1] },
    });
    await refused(() => readUploadAgain(designer, uploadId, { unit: 'm' }), { reason: 'own-unit' });
  });

  it('say why a file cannot be used, and the draft stays', async () => {
    const templateId = await newTemplate(designer);
    const uploadId = await sendMesh(designer, templateId);
    await database.query("update uploads set state = 'reading', mesh_id = null where id = $1", [uploadId]);
    await database.query("update jobs set state = 'queued' where subject_id = $1", [uploadId]);
    const { version } = await openDraft(designer, templateId);
    const saved = await saveDraft(designer, templateId, { uploadId, recipe: {}, note: 'x', version });
    const job = await takeJob(house.workspace.id, 'read-upload', uploadId);
    await refuseUpload(job.ctx, job.fence, uploadId, {
      code: 'truncated',
      message: 'The file ends in the middle.',
      reasons: ['12 triangles announced, 3 there'],
    });
    const draft = await openDraft(designer, templateId);
    expect(draft.upload).toMatchObject({ state: 'refused', refusal: { code: 'truncated' }, mesh: null });
    await refused(() => postRevision(designer, templateId, { version: saved.version }), {
      reason: 'file-not-ready',
      message: 'The file was refused. Send another one.',
    });
  });
});
