import { beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { withTenant } from '@/db/tenant';
import { digestOf } from '@/lib/audit/canonical';
import type { WorkspaceContext } from '@/lib/auth/context';
import { enterWorkspace } from '@/lib/auth/enter';
import { fillRecipe } from '@/lib/formability/fill-recipe';
import { claimJob } from '@/lib/jobs/jobs-data';
import { listRevisions } from '@/lib/review/list-revisions';
import { openDraft } from '@/lib/review/open-draft';
import { postRevision } from '@/lib/review/post-revision';
import {
  failCheck,
  finishCheck,
  loadCheckInput,
  recordDerivative,
  startCheck,
} from '@/lib/review/record-check';
import { acceptUpload } from '@/lib/review/record-upload';
import { saveDraft } from '@/lib/review/save-draft';
import { viewDocket } from '@/lib/review/view-docket';
import { viewRevision } from '@/lib/review/view-revision';
import { viewTemplate } from '@/lib/review/view-template';
import { freshDatabase, type FreshDatabase } from '@/tests/support/database';
import {
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

describe('posting', () => {
  it('freezes mesh and recipe, lays out the gates, queues the check and tells the rest of the studio', async () => {
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
    expect(new Set(told)).toEqual(new Set([lead.person.id, house.people.producer.person.id]));
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
      unit: 'mm' as const,
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
