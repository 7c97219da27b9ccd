import { randomUUID } from 'node:crypto';
import { beforeAll, describe, expect, it } from 'vitest';
import type { WorkspaceContext } from '@/lib/auth/context';
import { cancelUpload } from '@/lib/review/cancel-upload';
import { changeTemplate } from '@/lib/review/change-template';
import { completeUpload } from '@/lib/review/complete-upload';
import { createTemplate } from '@/lib/review/create-template';
import { discardDraft } from '@/lib/review/discard-draft';
import { listRevisions } from '@/lib/review/list-revisions';
import { locateFile } from '@/lib/review/locate-file';
import { markPartDone } from '@/lib/review/mark-part-done';
import { openDraft } from '@/lib/review/open-draft';
import { openThread } from '@/lib/review/open-thread';
import { postRevision } from '@/lib/review/post-revision';
import { presignParts } from '@/lib/review/presign-parts';
import { readReport } from '@/lib/review/read-report';
import { replyToThread } from '@/lib/review/reply-to-thread';
import { returnGate } from '@/lib/review/return-gate';
import { saveDraft } from '@/lib/review/save-draft';
import { settleThread } from '@/lib/review/settle-thread';
import { signGate } from '@/lib/review/sign-gate';
import { startUpload } from '@/lib/review/start-upload';
import { viewContent } from '@/lib/review/view-content';
import { viewDocket } from '@/lib/review/view-docket';
import { viewRevision, viewRevisionByLetter } from '@/lib/review/view-revision';
import { viewTemplate } from '@/lib/review/view-template';
import { viewUpload } from '@/lib/review/view-upload';
import { waiveFinding } from '@/lib/review/waive-finding';
import { withdrawRevision } from '@/lib/review/withdraw-revision';
import { loadAgreed } from '@/lib/review/load-agreed';
import type { Role } from '@/lib/workspaces/roles';
import { freshDatabase, type FreshDatabase } from '@/tests/support/database';
import { fingerprint, gateOf, note, postChecked, raise, readyDraft, shown } from '@/tests/support/factory';
import { makeHouse, testPassword, type House } from '@/tests/support/make-house';

/** Everything of one workspace that a verb can name. */
type Ids = {
  template: string;
  revision: string;
  upload: string;
  thread: string;
  finding: string;
  gate: string;
  digest: string;
  draftVersion: number;
};
type Call = (ctx: WorkspaceContext, ids: Ids) => Promise<unknown>;

const reason = 'It has to change for good reasons.';
const reads: Record<string, Call> = {
  viewTemplate: (ctx, ids) => viewTemplate(ctx, ids.template),
  listRevisions: (ctx, ids) => listRevisions(ctx, ids.template),
  viewRevision: (ctx, ids) => viewRevision(ctx, ids.revision),
  viewRevisionByLetter: (ctx, ids) => viewRevisionByLetter(ctx, ids.template, 'A'),
  viewDocket: (ctx, ids) => viewDocket(ctx, ids.revision),
  viewContent: (ctx, ids) => viewContent(ctx, ids.revision),
  readReport: (ctx, ids) => readReport(ctx, ids.revision),
};
const made: Record<string, { call: Call; may: Role[] }> = {
  changeTemplate: {
    call: (ctx, ids) => changeTemplate(ctx, ids.template, { title: 'Other', version: 99 }),
    may: ['designer', 'lead'],
  },
  openDraft: { call: (ctx, ids) => openDraft(ctx, ids.template), may: ['designer', 'lead'] },
  saveDraft: {
    call: (ctx, ids) => saveDraft(ctx, ids.template, { uploadId: null, recipe: {}, note: '', version: 99 }),
    may: ['designer', 'lead'],
  },
  discardDraft: { call: (ctx, ids) => discardDraft(ctx, ids.template), may: ['designer', 'lead'] },
  startUpload: {
    call: (ctx, ids) => startUpload(ctx, ids.template, { fileName: 'a.stl', bytes: 100 }),
    may: ['designer', 'lead'],
  },
  viewUpload: { call: (ctx, ids) => viewUpload(ctx, ids.upload), may: ['designer', 'lead'] },
  presignParts: {
    call: (ctx, ids) => presignParts(ctx, ids.upload, { parts: [1] }),
    may: ['designer', 'lead'],
  },
  markPartDone: {
    call: (ctx, ids) => markPartDone(ctx, ids.upload, { number: 1, etag: 'x' }),
    may: ['designer', 'lead'],
  },
  completeUpload: { call: (ctx, ids) => completeUpload(ctx, ids.upload), may: ['designer', 'lead'] },
  cancelUpload: { call: (ctx, ids) => cancelUpload(ctx, ids.upload), may: ['designer', 'lead'] },
  postRevision: {
    call: (ctx, ids) => postRevision(ctx, ids.template, { version: 99 }),
    may: ['designer', 'lead'],
  },
  withdrawRevision: {
    call: (ctx, ids) => withdrawRevision(ctx, ids.revision, { reason }),
    may: ['designer', 'lead'],
  },
  openThread: {
    call: (ctx, ids) => openThread(ctx, ids.revision, note('Hello.')),
    may: ['designer', 'lead', 'producer', 'reviewer', 'approver'],
  },
  replyToThread: {
    call: (ctx, ids) => replyToThread(ctx, ids.thread, note('Hello.')),
    may: ['designer', 'lead', 'producer', 'reviewer', 'approver'],
  },
  settleThread: {
    call: (ctx, ids) => settleThread(ctx, ids.thread, { settled: true, version: 1 }),
    may: ['designer', 'lead', 'producer', 'reviewer', 'approver'],
  },
  waiveFinding: { call: (ctx, ids) => waiveFinding(ctx, ids.finding, { reason }), may: ['lead'] },
  signGate: {
    call: (ctx, ids) => signGate(ctx, ids.gate, { digest: ids.digest, password: testPassword }),
    may: ['designer', 'lead', 'approver'],
  },
  returnGate: {
    call: (ctx, ids) => returnGate(ctx, ids.gate, { digest: ids.digest, password: testPassword, reason }),
    may: ['designer', 'lead', 'approver'],
  },
  locateMesh: {
    call: (ctx, ids) => locateFile(ctx, ids.revision, 'mesh'),
    may: ['designer', 'lead', 'producer', 'approver'],
  },
};

let database: FreshDatabase;
let house: House;
let other: House;
let ids: Ids;
let missing: Ids;

beforeAll(async () => {
  database = await freshDatabase();
  house = await makeHouse(database);
  other = await makeHouse(database);
  const designer = await house.enter('designer');
  const { templateId, revisionId } = await postChecked(house, { statuses: { draft: 'caution' } });
  const thread = await raise(designer, revisionId, 'Look here.');
  const draftVersion = await readyDraft(designer, templateId);
  const draft = await openDraft(designer, templateId);
  const docket = await viewDocket(designer, revisionId);
  ids = {
    template: templateId,
    revision: revisionId,
    upload: draft.upload!.id,
    thread: thread.id,
    finding: docket.findings[0].id,
    gate: (await gateOf(designer, revisionId, 'studio')).id,
    digest: (await shown(designer, revisionId)).digest,
    draftVersion,
  };
  const id = randomUUID();
  missing = { ...ids, template: id, revision: id, upload: id, thread: id, finding: id, gate: id };
});

async function outcome(run: Promise<unknown>): Promise<{ code: string; message: string }> {
  return run.then(
    () => ({ code: 'done', message: '' }),
    (error: { code?: string; message: string }) => ({ code: error.code ?? 'thrown', message: error.message }),
  );
}

const everything = {
  ...Object.fromEntries(Object.entries(made).map(([name, { call }]) => [name, call])),
  ...reads,
};

describe('another tenant', () => {
  it.each(Object.keys(everything))('learns nothing from %s and changes nothing', async (name) => {
    const before = await fingerprint(database, house.workspace.id);
    const stranger = await other.enter('lead');
    const foreign = await outcome(everything[name](stranger, ids));
    const absent = await outcome(everything[name](stranger, missing));
    expect(foreign.code).toBe('not_found');
    expect(foreign).toEqual(absent);
    expect(await fingerprint(database, house.workspace.id)).toBe(before);
  });

  it('gets nothing agreed either', async () => {
    expect((await outcome(loadAgreed(await other.enter('lead'), ids.revision))).code).toBe('not_found');
  });

  it.each(['viewTemplate', 'viewRevision', 'replyToThread', 'waiveFinding', 'viewUpload', 'signGate'])(
    'is answered alike by %s for an id that cannot be one',
    async (name) => {
      const ctx = await house.enter('lead');
      const odd = Object.fromEntries(Object.keys(ids).map((key) => [key, "'; drop"])) as unknown as Ids;
      const answer = await outcome(everything[name](ctx, { ...odd, digest: ids.digest }));
      expect(answer).toEqual(await outcome(everything[name](ctx, missing)));
      expect(answer.code).toBe('not_found');
    },
  );
});

const roles: Role[] = ['designer', 'lead', 'producer', 'reviewer', 'approver'];

describe('a role that does not allow it', () => {
  const cells = Object.entries(made).flatMap(([name, { may }]) =>
    roles.filter((role) => !may.includes(role)).map((role) => [role, name] as const),
  );
  it.each(cells)('%s may not %s', async (role, name) => {
    const before = await fingerprint(database, house.workspace.id);
    const answer = await outcome(made[name].call(await house.enter(role), ids));
    expect(answer.code).toBe('forbidden');
    expect(answer.message).toContain(`Your role here is ${role}`);
    expect(await fingerprint(database, house.workspace.id)).toBe(before);
  });

  it.each(['producer', 'reviewer', 'approver'] as const)('%s may not open a template', async (role) => {
    const answer = await outcome(createTemplate(await house.enter(role), { title: 'Mine' }));
    expect(answer.code).toBe('forbidden');
  });

  it.each(roles)('every role reads: %s', async (role) => {
    const ctx = await house.enter(role);
    for (const [name, call] of Object.entries(reads))
      expect([name, (await outcome(call(ctx, ids))).code]).toEqual([name, 'done']);
  });
});
