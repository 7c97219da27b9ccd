import { beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { withTenant } from '@/db/tenant';
import { digestOf } from '@/lib/audit/canonical';
import { personContext, type WorkspaceContext } from '@/lib/auth/context';
import { verifyRevision } from '@/lib/audit/verify-revision';
import { releaseRevision } from '@/lib/production/release-revision';
import { changeTemplate } from '@/lib/review/change-template';
import { openDraft } from '@/lib/review/open-draft';
import { postRevision } from '@/lib/review/post-revision';
import { findRevision } from '@/lib/review/revision-data';
import { saveDraft } from '@/lib/review/save-draft';
import { viewTemplate } from '@/lib/review/view-template';
import { viewToday } from '@/lib/review/view-today';
import { loadAgreed } from '@/lib/review/load-agreed';
import { replyToThread } from '@/lib/review/reply-to-thread';
import { signGate } from '@/lib/review/sign-gate';
import { viewContent } from '@/lib/review/view-content';
import { viewDocket } from '@/lib/review/view-docket';
import { viewRevision } from '@/lib/review/view-revision';
import { freshDatabase, type FreshDatabase } from '@/tests/support/database';
import {
  approved,
  entries,
  gateOf,
  mailsOf,
  note,
  post,
  postChecked,
  raise,
  runCheck,
  sendMesh,
  shown,
  sign,
} from '@/tests/support/factory';
import { makeHouse, testPassword, type House } from '@/tests/support/make-house';
import { refusedIn } from '@/tests/support/refused';

let database: FreshDatabase;
let house: House;
let designer: WorkspaceContext;
let lead: WorkspaceContext;
let approver: WorkspaceContext;

beforeAll(async () => {
  database = await freshDatabase();
  house = await makeHouse(database);
});
beforeEach(async () => {
  [designer, lead, approver] = await Promise.all([
    house.enter('designer'),
    house.enter('lead'),
    house.enter('approver'),
  ]);
});

const refused = refusedIn(() => ({ database, house }));

describe('signing', () => {
  it('records name, role, meaning, time, zone and digest, and tells who is next', async () => {
    const { revisionId } = await postChecked(house);
    const studio = await gateOf(lead, revisionId, 'studio');
    expect(studio.awaited).toEqual([lead.person.name]);
    const { digest, password } = await shown(lead, revisionId);
    const { rows: before } = await database.query<{ now: Date }>('select clock_timestamp() as now');
    const result = await signGate(lead, studio.id, { digest, password });
    const { rows: after } = await database.query<{ now: Date }>('select clock_timestamp() as now');
    expect(result).toMatchObject({
      gatePassed: true,
      locked: false,
      signature: {
        decision: 'sign',
        printedName: lead.person.name,
        role: 'lead',
        meaning: studio.meaning,
        contentDigest: digest,
        timeZone: lead.person.timeZone,
      },
    });
    const at = new Date(result.signature.signedAt).getTime();
    expect(at).toBeGreaterThanOrEqual(before[0].now.getTime() - 1);
    expect(at).toBeLessThanOrEqual(after[0].now.getTime() + 1);

    const [entry] = await entries(database, house.workspace.id, 1);
    expect(entry).toMatchObject({ action: 'gate.signed', subject_id: revisionId });
    expect(entry.detail).toMatchObject({
      gate: 'Studio',
      contentDigest: digest,
      signatureId: result.signature.id,
    });
    expect(JSON.stringify(entry)).not.toContain(testPassword);

    const waits = (await mailsOf(database, house.workspace.id, 'gate-waits')).filter(
      (mail) => mail.payload.gateName === 'Client' && String(mail.payload.path).length > 0,
    );
    expect(waits.at(-1)?.person).toBe(approver.person.id);
    expect((await gateOf(lead, revisionId, 'client')).awaited).toEqual([approver.person.name]);
  });

  it('stores the very digest that was shown, over the content that can be recomputed', async () => {
    const { revisionId } = await postChecked(house);
    const { digest, content, summary } = await viewContent(lead, revisionId);
    expect(digestOf(content)).toBe(digest);
    expect(summary).toMatchObject({ verdict: 'pass', gatePlan: 'Plan 1: Forming, Studio, Client' });
    expect(summary.recipe.length).toBeGreaterThan(8);
    expect((await viewRevision(lead, revisionId)).contentDigest).toBe(digest);
  });

  it('is refused for another digest, and says what to do', async () => {
    const { revisionId } = await postChecked(house);
    const { id } = await gateOf(lead, revisionId, 'studio');
    const seen = await shown(lead, revisionId);
    await raise(approver, revisionId, 'One more thing.');
    await refused(() => signGate(lead, id, seen), {
      code: 'conflict',
      reason: 'content-changed',
      message: expect.stringContaining('Nothing was signed'),
    });
    expect((await sign(lead, revisionId)).gatePassed).toBe(true);
  });

  it('is refused with a wrong password, which is never written down', async () => {
    const { revisionId } = await postChecked(house);
    const { id } = await gateOf(lead, revisionId, 'studio');
    const { digest } = await shown(lead, revisionId);
    await refused(() => signGate(lead, id, { digest, password: 'not the right one' }), {
      code: 'forbidden',
      reason: 'wrong-password',
    });
    await refused(() => signGate(lead, id, { digest: 'short', password: '' }), { code: 'invalid' });
  });

  it('keeps four eyes: the author never signs, not even as designer among designers', async () => {
    const posted = await post(lead);
    await runCheck(house.workspace.id, posted.revisionId);
    const { id, awaited } = await gateOf(lead, posted.revisionId, 'studio');
    expect(awaited).toEqual([designer.person.name]);
    const seen = await shown(lead, posted.revisionId);
    await refused(() => signGate(lead, id, seen), { code: 'forbidden', reason: 'four-eyes' });
    await sign(designer, posted.revisionId);
  });

  it('keeps four eyes also from who sent the mesh that somebody else posted', async () => {
    const { templateId } = await postChecked(house);
    const uploadId = await sendMesh(lead, templateId);
    const draft = await openDraft(designer, templateId);
    const { version } = await saveDraft(designer, templateId, {
      uploadId,
      recipe: draft.recipe,
      note: '',
      version: draft.version,
    });
    const { revisionId } = await postRevision(designer, templateId, { version });
    await runCheck(house.workspace.id, revisionId);
    const { id, awaited } = await gateOf(lead, revisionId, 'studio');
    expect(awaited).toEqual([]);
    expect((await viewRevision(lead, revisionId)).can.sign).toBeNull();
    const waits = async ({ person }: WorkspaceContext) =>
      (await viewToday(personContext(person))).items.filter(
        ({ kind, letter }) => kind === 'sign' && letter === 'B',
      );
    expect(await waits(lead)).toEqual([]);
    const seen = await shown(lead, revisionId);
    await refused(() => signGate(lead, id, seen), {
      code: 'forbidden',
      reason: 'four-eyes',
      message: expect.stringContaining('You sent the mesh of revision B'),
    });
  });

  it('covers title and due date: a change of either has to be read first, and what was signed stands', async () => {
    const { revisionId, templateId } = await postChecked(house);
    const rename = async (change: object) => {
      const { version } = await viewTemplate(lead, templateId);
      await changeTemplate(lead, templateId, { ...change, version });
    };
    const { id } = await gateOf(lead, revisionId, 'studio');
    const first = (await viewRevision(lead, revisionId)).template.title;
    const seen = await shown(lead, revisionId);
    await rename({ dueOn: '2027-02-03' });
    await refused(() => signGate(lead, id, seen), { code: 'conflict', reason: 'content-changed' });
    await sign(lead, revisionId);
    await rename({ title: 'Between the gates' });
    await sign(approver, revisionId);
    await rename({ title: 'After the lock', dueOn: null });
    const agreed = await loadAgreed(lead, revisionId);
    const named = { title: 'Between the gates', dueOn: '2027-02-03' };
    expect(agreed.template).toMatchObject(named);
    expect(agreed.lock.content.template).toMatchObject(named);
    expect(agreed.signatures.map(({ content }) => content?.template.title)).toEqual([
      first,
      'Between the gates',
    ]);
    await releaseRevision(lead, revisionId, {});
    const verified = await withTenant(lead, async (tx) =>
      verifyRevision(tx, await findRevision(tx, house.workspace.id, revisionId)),
    );
    expect(verified.faults).toEqual([]);
  });

  it('asks each gate for its own roles, in order', async () => {
    const { revisionId } = await postChecked(house);
    const studio = await gateOf(lead, revisionId, 'studio');
    const client = await gateOf(lead, revisionId, 'client');
    const seen = await shown(lead, revisionId);
    await refused(() => signGate(approver, studio.id, seen), { code: 'forbidden', reason: 'role' });
    await refused(() => signGate(approver, client.id, seen), { code: 'conflict', reason: 'gate-not-open' });
    const forming = await gateOf(lead, revisionId, 'forming');
    await refused(() => signGate(lead, forming.id, seen), { code: 'conflict', reason: 'automatic-gate' });
    await signGate(lead, studio.id, seen);
    await refused(() => signGate(lead, studio.id, seen), { code: 'conflict', reason: 'already-signed' });
    await refused(() => signGate(lead, client.id, seen), { code: 'forbidden', reason: 'role' });
  });

  it('is refused before the check has finished and while a failing finding is open', async () => {
    const { revisionId } = await post(designer);
    await expect(viewContent(lead, revisionId)).rejects.toMatchObject({ reason: 'check-not-finished' });
    const failing = await postChecked(house, { statuses: { draft: 'fail', undercut: 'fail' } });
    const { id } = await gateOf(lead, failing.revisionId, 'studio');
    const seen = await shown(lead, failing.revisionId);
    await refused(() => signGate(lead, id, seen), { code: 'conflict', reason: 'gate-not-open' });
  });

  it('shuts the gate while an item must be settled, and names the item', async () => {
    const { revisionId } = await postChecked(house);
    const thread = await raise(approver, revisionId, 'The rim is too thin.', { mustSettle: true });
    const { id } = await gateOf(lead, revisionId, 'studio');
    const seen = await shown(lead, revisionId);
    await refused(() => signGate(lead, id, seen), {
      code: 'conflict',
      reason: 'must-settle',
      message: 'Studio stays shut: one item must be settled first.',
      errors: [{ pointer: `/threads/${thread.id}`, detail: `${approver.person.name}: The rim is too thin.` }],
    });
  });

  it('counts a role as it is at that moment, not as the page had it', async () => {
    const { revisionId } = await postChecked(house);
    const { id } = await gateOf(lead, revisionId, 'studio');
    const seen = await shown(lead, revisionId);
    await database.query("update members set role = 'producer' where user_id = $1 and workspace_id = $2", [
      lead.person.id,
      house.workspace.id,
    ]);
    try {
      await expect(signGate(lead, id, seen)).rejects.toMatchObject({ code: 'forbidden', reason: 'role' });
    } finally {
      await database.query("update members set role = 'lead' where user_id = $1 and workspace_id = $2", [
        lead.person.id,
        house.workspace.id,
      ]);
    }
  });
});

describe('the last signature', () => {
  it('locks content and docket, approves, supersedes the older approved one and mails everybody else', async () => {
    const first = await approved(house);
    const second = await approved(house, first.templateId);
    expect(await viewRevision(lead, first.revisionId)).toMatchObject({
      state: 'superseded',
      stateReason: 'Superseded by B.',
    });
    const view = await viewRevision(lead, second.revisionId);
    expect(view.gates.every((gate) => gate.state === 'passed')).toBe(true);
    const agreed = await loadAgreed(lead, second.revisionId);
    expect(view.contentDigest).toBe(agreed.lock.contentDigest);
    expect(digestOf(agreed.lock.content)).toBe(agreed.lock.contentDigest);
    expect(digestOf(agreed.report.body)).toBe(agreed.report.sha256);
    expect(digestOf(agreed.recipe.body)).toBe(agreed.recipe.digest);
    expect(agreed.lock.docket.findings.length).toBe(agreed.lock.content.docket.findings.length);
    const mails = (await mailsOf(database, house.workspace.id, 'revision-signed')).filter(
      ({ payload }) => payload.locked && payload.digest === agreed.lock.contentDigest,
    );
    expect(new Set(mails.map((mail) => mail.person))).toEqual(
      new Set(
        Object.values(house.people)
          .map(({ person }) => person.id)
          .filter((id) => id !== approver.person.id),
      ),
    );
  });

  it('keeps what is said afterwards apart, and outside the digest', async () => {
    const { revisionId } = await postChecked(house);
    const open = await raise(approver, revisionId, 'Nice.');
    await sign(lead, revisionId);
    await sign(approver, revisionId);
    const { contentDigest } = await viewRevision(lead, revisionId);
    await refused(() => replyToThread(lead, open.id, note('Too late.')), { reason: 'revision-locked' });
    const later = await raise(lead, revisionId, 'For the next time.', { mustSettle: true });
    expect(later).toMatchObject({ afterApproval: true, mustSettle: false });
    await replyToThread(approver, later.id, note('Noted.'));
    expect((await viewContent(lead, revisionId)).digest).toBe(contentDigest);
    const agreed = await loadAgreed(lead, revisionId);
    expect(agreed.lock.docket.threads.map((thread) => thread.id)).toEqual([open.id]);
  });

  it('lets open items of a locked docket go on with the next revision', async () => {
    const a = await postChecked(house);
    const open = await raise(approver, a.revisionId, 'A softer edge, one day.', {
      pin: { at: [0, 0, 20], normal: [0, 0, 1], view: null },
    });
    await sign(lead, a.revisionId);
    await sign(approver, a.revisionId);
    const later = await raise(approver, a.revisionId, 'And a chamfer.');
    const b = await postChecked(house, { templateId: a.templateId });
    const { threads } = await viewDocket(lead, b.revisionId);
    expect(
      threads.map(({ standing, afterApproval, notes }) => [standing, afterApproval, notes[0].text]),
    ).toEqual([
      ['carried', false, 'A softer edge, one day.'],
      ['free', false, 'And a chamfer.'],
    ]);
    expect(threads.map((thread) => thread.id)).not.toContain(open.id);
    const answered = await replyToThread(designer, threads[0].id, note('It is in B.'));
    expect(answered.notes.map((one) => one.text)).toEqual(['A softer edge, one day.', 'It is in B.']);
    expect((await viewDocket(lead, a.revisionId)).threads.map((thread) => thread.id)).toEqual([
      open.id,
      later.id,
    ]);
    await sign(lead, b.revisionId);
    await sign(approver, b.revisionId);
    const c = await postChecked(house, { templateId: a.templateId });
    const again = (await viewDocket(lead, c.revisionId)).threads;
    expect(again[0].notes.map((one) => one.text)).toEqual(['A softer edge, one day.', 'It is in B.']);
  });
});
