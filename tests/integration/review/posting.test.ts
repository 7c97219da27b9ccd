import { beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { withTenant } from '@/db/tenant';
import { digestOf } from '@/lib/audit/canonical';
import type { WorkspaceContext } from '@/lib/auth/context';
import { enterWorkspace } from '@/lib/auth/enter';
import { fillRecipe } from '@/lib/formability/fill-recipe';
import { claimJob } from '@/lib/jobs/jobs-data';
import { cancelUpload } from '@/lib/review/cancel-upload';
import { changeTemplate } from '@/lib/review/change-template';
import { completeUpload } from '@/lib/review/complete-upload';
import { createTemplate } from '@/lib/review/create-template';
import { discardDraft } from '@/lib/review/discard-draft';
import { listRevisions } from '@/lib/review/list-revisions';
import { markPartDone } from '@/lib/review/mark-part-done';
import { openDraft } from '@/lib/review/open-draft';
import { postRevision } from '@/lib/review/post-revision';
import { presignParts } from '@/lib/review/presign-parts';
import {
  failCheck,
  finishCheck,
  loadCheckInput,
  recordDerivative,
  startCheck,
} from '@/lib/review/record-check';
import { acceptUpload, refuseUpload } from '@/lib/review/record-upload';
import { saveDraft } from '@/lib/review/save-draft';
import { startUpload } from '@/lib/review/start-upload';
import { viewDocket } from '@/lib/review/view-docket';
import { viewRevision } from '@/lib/review/view-revision';
import { viewTemplate } from '@/lib/review/view-template';
import { viewUpload } from '@/lib/review/view-upload';
import { freshDatabase, type FreshDatabase } from '@/tests/support/database';
import {
  blockStl,
  entries,
  fingerprint,
  mailsOf,
  newTemplate,
  post,
  postChecked,
  readyDraft,
  reportOn,
  runCheck,
  sendMesh,
  takeJob,
} from '@/tests/support/factory';
import { joinStudio, makeHouse, type House } from '@/tests/support/make-house';

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

async function refused(run: () => Promise<unknown>, expected: Record<string, unknown>): Promise<void> {
  const before = await fingerprint(database, house.workspace.id);
  await expect(run()).rejects.toMatchObject(expected);
  expect(await fingerprint(database, house.workspace.id)).toBe(before);
}

describe('templates', () => {
  it('carry the workspace’s code and the next serial, and are on the chain', async () => {
    const made = await createTemplate(lead, { title: '  Lid for cups ', dueOn: '2027-03-01' });
    expect(made).toMatchObject({
      number: `${house.workspace.code}-001`,
      title: 'Lid for cups',
      dueOn: '2027-03-01',
      standing: 'draft',
      latestLetter: null,
      verdict: null,
      openMustSettle: 0,
      version: 1,
    });
    const [entry] = await entries(database, house.workspace.id, 1);
    expect(entry).toMatchObject({ action: 'template.created', subject_id: made.id });
    expect((await createTemplate(lead, { title: 'Next' })).number).toBe(`${house.workspace.code}-002`);
  });

  it.each([
    [{ title: '' }, '/title'],
    [{ title: 'A title of more than 25 signs' }, '/title'],
    [{ title: 'x', dueOn: '2027-02-30' }, '/dueOn'],
    [{ title: 7 }, '/title'],
  ])('refuse %j', async (input, pointer) => {
    await refused(() => createTemplate(lead, input), { code: 'invalid', errors: [{ pointer }] });
  });

  it('change at the version that was seen, else not at all', async () => {
    const { id, version } = await createTemplate(lead, { title: 'Before' });
    const changed = await changeTemplate(designer, id, { title: 'After', dueOn: '2027-05-05', version });
    expect(changed).toMatchObject({ title: 'After', dueOn: '2027-05-05', version: version + 1 });
    await refused(() => changeTemplate(lead, id, { title: 'Other', version }), {
      code: 'precondition_failed',
      reason: 'changed-meanwhile',
    });
    expect((await viewTemplate(lead, id)).title).toBe('After');
  });
});

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
    const bytes = 20_000_000;
    const upload = await startUpload(designer, templateId, { fileName: 'big.stl', bytes });
    expect(upload).toMatchObject({ state: 'sending', partBytes: 8_388_608, partCount: 3, partsDone: [] });
    const { parts } = await presignParts(designer, upload.id, { parts: [3, 1, 1] });
    expect(parts.map(({ number, bytes: length }) => [number, length])).toEqual([
      [3, bytes - 2 * 8_388_608],
      [1, 8_388_608],
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

  it.each([
    [{ fileName: 'a.stl', bytes: 0 }, '/bytes'],
    [{ fileName: 'a.stl', bytes: 500_000_001 }, '/bytes'],
    [{ fileName: '', bytes: 10 }, '/fileName'],
    [{ fileName: 'a.stl', bytes: 10, unit: 'parsec' }, '/unit'],
  ])('refuse %j', async (input, pointer) => {
    const templateId = await newTemplate(designer);
    await refused(() => startUpload(designer, templateId, input), { code: 'invalid', errors: [{ pointer }] });
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

describe('posting', () => {
  it('freezes mesh and recipe, lays out the gates, queues the check and tells everybody else', async () => {
    const templateId = await newTemplate(designer);
    const version = await readyDraft(designer, templateId);
    const draft = await openDraft(designer, templateId);
    const { revisionId, letter } = await postRevision(designer, templateId, { version });
    expect(letter).toBe('A');
    const view = await viewRevision(lead, revisionId);
    expect(view).toMatchObject({
      state: 'in_review',
      note: 'Please look.',
      author: { id: designer.person.id },
      mesh: { sha256: draft.upload?.mesh?.sha256, triangles: 12 },
      check: { state: 'queued', verdict: null },
      contentDigest: null,
    });
    expect(view.recipe).toEqual(
      fillRecipe({ ...draft.recipe, mesh: { ...(draft.recipe.mesh as object), unit: 'mm' } }),
    );
    expect(view.gates.map(({ key, state }) => [key, state])).toEqual([
      ['forming', 'open'],
      ['studio', 'waiting'],
      ['client', 'waiting'],
    ]);
    const { rows } = await database.query<{ kind: string; input_digest: string }>(
      'select kind, input_digest from jobs where subject_id = $1',
      [revisionId],
    );
    expect(rows).toEqual([
      {
        kind: 'check-revision',
        input_digest: digestOf({ meshSha256: view.mesh.sha256, recipeDigest: digestOf(view.recipe) }),
      },
    ]);
    const mails = await mailsOf(database, house.workspace.id, 'revision-posted');
    const told = mails
      .filter(({ payload }) => String(payload.path).endsWith(`${templateId}/A`))
      .map(({ person }) => person);
    expect(new Set(told)).toEqual(
      new Set(
        Object.values(house.people)
          .map(({ person }) => person.id)
          .filter((id) => id !== designer.person.id),
      ),
    );
    const [entry] = await entries(database, house.workspace.id, 1);
    expect(entry).toMatchObject({
      action: 'revision.posted',
      detail: { letter: 'A', meshSha256: view.mesh.sha256 },
    });
    expect(await viewTemplate(lead, templateId)).toMatchObject({ standing: 'in_review', latestLetter: 'A' });
    const next = await openDraft(designer, templateId);
    expect(next).toMatchObject({ nextLetter: 'B', upload: null });
    expect(next.recipe).toEqual(draft.recipe);
  });

  it('is refused where something is missing or stale, and says what', async () => {
    const templateId = await newTemplate(designer);
    await refused(() => postRevision(designer, templateId, { version: 1 }), { reason: 'no-draft' });
    const { version, recipe } = await openDraft(designer, templateId);
    await refused(() => postRevision(designer, templateId, { version }), {
      reason: 'file-not-ready',
      message: 'Choose a file first: the draft has none.',
    });
    const uploadId = await sendMesh(designer, templateId);
    const saved = await saveDraft(designer, templateId, { uploadId, recipe, note: '', version });
    await refused(() => postRevision(designer, templateId, { version }), { code: 'precondition_failed' });
    const bad = {
      ...recipe,
      sheet: { material: 'unobtainium', gaugeMm: -1 },
      print: { nozzleMm: 'wide' },
    };
    const worse = await saveDraft(designer, templateId, {
      uploadId,
      recipe: bad,
      note: '',
      version: saved.version,
    });
    await refused(() => postRevision(designer, templateId, { version: worse.version }), {
      code: 'invalid',
      errors: [
        { pointer: '/recipe/sheet/material', detail: expect.stringContaining('unknown sheet material') },
        { pointer: '/recipe/sheet/gaugeMm' },
        { pointer: '/recipe/print/nozzleMm' },
      ],
    });
    const inches = await saveDraft(designer, templateId, {
      uploadId,
      recipe: { ...recipe, mesh: { unit: 'in' } },
      note: '',
      version: worse.version,
    });
    await refused(() => postRevision(designer, templateId, { version: inches.version }), {
      code: 'invalid',
      errors: [{ pointer: '/recipe/mesh/unit' }],
    });
  });

  it('judges under the studio’s limits of that moment', async () => {
    await database.query(
      `insert into studio_limits (id, studio_id, limits) values (gen_random_uuid(), $1, '{"draftMinDeg": 7, "unheardOf": 1}')
       on conflict (studio_id) do update set limits = excluded.limits`,
      [lead.studio.id],
    );
    const { revisionId } = await post(designer);
    expect((await viewRevision(lead, revisionId)).recipe).toMatchObject({ limits: { draftMinDeg: 7 } });
    await database.query("update studio_limits set limits = '{}' where studio_id = $1", [lead.studio.id]);
  });

  it('letters revisions as drawing practice does', async () => {
    const { templateId } = await postChecked(house);
    for (let i = 0; i < 8; i++) await post(designer, templateId);
    const letters = (await listRevisions(lead, templateId)).map(({ letter }) => letter);
    expect(letters).toEqual(['K', 'J', 'H', 'G', 'F', 'E', 'D', 'C', 'B', 'A'].slice(1));
  });
});

describe('the records of a worker', () => {
  it('store one report, list its findings, and pass the automatic gate', async () => {
    const { revisionId } = await postChecked(house, { statuses: { draft: 'caution' } });
    const view = await viewRevision(lead, revisionId);
    expect(view.check).toMatchObject({ state: 'finished', verdict: 'caution', error: null });
    expect(view.gates.map(({ state }) => state)).toEqual(['passed', 'open', 'waiting']);
    const { findings, counts } = await viewDocket(lead, revisionId);
    expect(findings.length).toBeGreaterThan(5);
    expect(counts).toEqual({ mustSettle: 0, look: 1, settled: 0 });
    const { rows } = await database.query<{ body: unknown; sha256: string }>(
      'select body, sha256 from reports r join check_runs c on c.report_id = r.id where c.revision_id = $1',
      [revisionId],
    );
    expect(rows[0].sha256).toBe(digestOf(rows[0].body));
  });

  it('are written once: a repeat changes nothing, a lost worker changes nothing', async () => {
    const { revisionId } = await post(designer);
    const first = await takeJob(house.workspace.id, 'check-revision', revisionId);
    const input = await loadCheckInput(first.ctx, revisionId);
    const report = reportOn({ sha256: input.mesh.sha256, recipe: input.recipe }, {});
    await database.query("update jobs set lease_until = now() - interval '1 minute' where id = $1", [
      first.fence.jobId,
    ]);
    const second = await withTenant(first.ctx, (tx) =>
      claimJob(tx, { workspaceId: house.workspace.id, jobId: first.fence.jobId, worker: 'other' }),
    );
    const before = await fingerprint(database, house.workspace.id);
    await startCheck(first.ctx, first.fence, revisionId);
    await finishCheck(first.ctx, first.fence, revisionId, { report, engineVersion: report.engine });
    await failCheck(first.ctx, first.fence, revisionId, 'Lost.');
    await recordDerivative(first.ctx, first.fence, revisionId, input.mesh.id, 'model', {
      storeKey: 'derivatives/x',
      bytes: 1,
      sha256: 'x',
      meta: {},
    });
    expect(await fingerprint(database, house.workspace.id)).toBe(before);
    const fence = { jobId: first.fence.jobId, attempt: second!.attempt };
    await finishCheck(first.ctx, fence, revisionId, { report, engineVersion: report.engine });
    const after = await fingerprint(database, house.workspace.id);
    await finishCheck(first.ctx, fence, revisionId, { report, engineVersion: report.engine });
    await failCheck(first.ctx, fence, revisionId, 'Late.');
    expect(await fingerprint(database, house.workspace.id)).toBe(after);
    expect((await viewRevision(lead, revisionId)).check.verdict).toBe('pass');
  });

  it('know a report again for the same bytes and recipe, and refuse one on other bytes', async () => {
    const templateId = await newTemplate(designer);
    const uploadId = await sendMesh(designer, templateId);
    const revisions = [];
    for (let i = 0; i < 2; i++) {
      const draft = await openDraft(designer, templateId);
      const { version } = await saveDraft(designer, templateId, {
        uploadId,
        recipe: draft.recipe,
        note: `${i}`,
        version: draft.version,
      });
      revisions.push((await postRevision(designer, templateId, { version })).revisionId);
      if (i === 0) await runCheck(house.workspace.id, revisions[0], { draft: 'fail' });
    }
    const job = await takeJob(house.workspace.id, 'check-revision', revisions[1]);
    const input = await loadCheckInput(job.ctx, revisions[1]);
    expect(input.knownReport).toMatchObject({ input: { sha256: input.mesh.sha256 } });
    const other = reportOn({ sha256: 'f'.repeat(64), recipe: input.recipe }, {});
    await expect(
      finishCheck(job.ctx, job.fence, revisions[1], { report: other, engineVersion: other.engine }),
    ).rejects.toThrow('other bytes');
    const better = reportOn({ sha256: input.mesh.sha256, recipe: input.recipe }, {});
    await finishCheck(job.ctx, job.fence, revisions[1], { report: better, engineVersion: better.engine });
    expect((await viewRevision(lead, revisions[1])).check.verdict).toBe('fail');
    const { rows } = await database.query('select 1 from reports where mesh_sha256 = $1', [
      input.mesh.sha256,
    ]);
    expect(rows).toHaveLength(1);
  });

  it('say so when a check could not be made, and leave closed revisions closed', async () => {
    const { revisionId, templateId } = await post(designer);
    const job = await takeJob(house.workspace.id, 'check-revision', revisionId);
    await startCheck(job.ctx, job.fence, revisionId);
    expect((await viewRevision(lead, revisionId)).check.state).toBe('running');
    await failCheck(job.ctx, job.fence, revisionId, 'The engine stopped three times.');
    expect((await viewRevision(lead, revisionId)).check).toMatchObject({
      state: 'failed',
      error: 'The engine stopped three times.',
    });
    const late = await post(designer, templateId);
    await post(designer, templateId);
    await runCheck(house.workspace.id, late.revisionId);
    const closed = await viewRevision(lead, late.revisionId);
    expect(closed).toMatchObject({ state: 'withdrawn', check: { state: 'finished' } });
    expect(closed.gates.map(({ state }) => state)).toEqual(['closed', 'closed', 'closed']);
  });

  it('are of their own workspace only', async () => {
    const other = await makeHouse(database);
    const { revisionId } = await post(designer);
    const foreign = await takeJob(
      other.workspace.id,
      'check-revision',
      (await post(await other.enter('designer'))).revisionId,
    );
    await expect(loadCheckInput(foreign.ctx, revisionId)).rejects.toMatchObject({ code: 'not_found' });
    const uploadId = await sendMesh(designer, await newTemplate(designer));
    const before = await fingerprint(database, house.workspace.id);
    await expect(startCheck(foreign.ctx, foreign.fence, revisionId)).rejects.toMatchObject({
      code: 'not_found',
    });
    const mesh = {
      sha256: 'x',
      bytes: 1,
      format: 'stl-binary' as const,
      triangles: 1,
      boundsMm: { min: [], max: [] },
    };
    await expect(acceptUpload(foreign.ctx, foreign.fence, uploadId, mesh)).rejects.toMatchObject({
      code: 'not_found',
    });
    expect(await fingerprint(database, house.workspace.id)).toBe(before);
  });
});

describe('a second designer', () => {
  it('works on the same draft, and whoever posts is the author', async () => {
    const other = await joinStudio(database, await house.enterStudio('lead'), 'designer');
    const second = await enterWorkspace(other.person, house.workspace.id);
    const templateId = await newTemplate(designer);
    const version = await readyDraft(designer, templateId);
    const { revisionId } = await postRevision(second, templateId, { version });
    expect((await viewRevision(lead, revisionId)).author.id).toBe(other.person.id);
  });
});
