import { beforeAll, describe, expect, it } from 'vitest';
import type { WorkspaceContext } from '@/lib/auth/context';
import { failCheck } from '@/lib/review/record-check';
import { readReport } from '@/lib/review/read-report';
import { viewDocket } from '@/lib/review/view-docket';
import { viewRevision } from '@/lib/review/view-revision';
import { waiveFinding } from '@/lib/review/waive-finding';
import { withdrawRevision } from '@/lib/review/withdraw-revision';
import { freshDatabase, type FreshDatabase } from '@/tests/support/database';
import { mailsOf, post, postChecked, sign, takeJob } from '@/tests/support/factory';
import { makeHouse, type House } from '@/tests/support/make-house';

let database: FreshDatabase;
let house: House;
let designer: WorkspaceContext;
let lead: WorkspaceContext;
let client: string[];
let staff: string[];

beforeAll(async () => {
  database = await freshDatabase();
  house = await makeHouse(database);
  [designer, lead] = await Promise.all([house.enter('designer'), house.enter('lead')]);
  const { reviewer, approver, producer } = house.people;
  client = [reviewer.person.id, approver.person.id].sort();
  staff = [lead.person.id, producer.person.id].sort();
});

/** The mails of a kind about one revision, and to whom they go. */
async function told(template: string, posted: { templateId: string; letter: string }) {
  const all = await mailsOf(database, house.workspace.id, template);
  const mails = all.filter(({ payload }) =>
    String(payload.path).endsWith(`${posted.templateId}/${posted.letter}`),
  );
  return { people: mails.map(({ person }) => person).sort(), payloads: mails.map(({ payload }) => payload) };
}

describe('the end of a check', () => {
  it('brings onto the page what would help, and what limits the template', async () => {
    const { revisionId } = await postChecked(house);
    const { check } = await viewRevision(lead, revisionId);
    const { body } = await readReport(lead, revisionId);
    const advice = (body.advice as { text: string }[]).map(({ text }) => text);
    expect(check.advice?.map(({ text }) => text)).toEqual(advice);
    expect(check.life).toBe((body.life as { text: string }).text);
  });

  it('mails the poster once when checks fail: which, and the first sentence of each remedy', async () => {
    const posted = await postChecked(house, { statuses: { draft: 'fail', vents: 'fail' } });
    const { people, payloads } = await told('check-fails', posted);
    expect(people).toEqual([designer.person.id]);
    const failing = payloads[0].failing as { check: string; remedy: string }[];
    expect(failing.map(({ check }) => check)).toEqual(['Draft', 'Vents']);
    for (const { remedy } of failing) expect(remedy).toMatch(/^[^\s].*[.!?]$/);
    expect((await told('revision-checked', posted)).people).toEqual([]);
    expect((await told('revision-posted', posted)).people).toEqual(staff);
  });

  it('mails the client when the last failing finding is waived, not before, and the poster no second time', async () => {
    const posted = await postChecked(house, {
      statuses: { draft: 'fail', vents: 'fail', edges: 'caution', sheet: 'not-run' },
    });
    const { findings } = await viewDocket(lead, posted.revisionId);
    const failing = findings.filter(({ status }) => status === 'fail');
    await waiveFinding(lead, failing[0].id, { reason: 'Accepted for a trial run.' });
    expect((await told('revision-checked', posted)).people).toEqual([]);
    await waiveFinding(lead, failing[1].id, { reason: 'Accepted for a trial run.' });
    const { people, payloads } = await told('revision-checked', posted);
    expect(people).toEqual(client);
    expect(payloads[0]).toMatchObject({ waived: 2, look: 1, notRun: 1, authorName: designer.person.name });
    expect((await told('check-fails', posted)).people).toEqual([designer.person.id]);
  });

  it('mails the client at once when nothing fails, and nobody about a revision withdrawn meanwhile', async () => {
    const good = await postChecked(house);
    expect((await told('revision-checked', good)).people).toEqual(client);
    const gone = await post(designer);
    await withdrawRevision(designer, gone.revisionId, { reason: 'Wrong file.' });
    const job = await takeJob(house.workspace.id, 'check-revision', gone.revisionId);
    await failCheck(job.ctx, job.fence, gone.revisionId, 'Not read.');
    expect((await told('check-given-up', gone)).people).toEqual([]);
  });

  it('mails the poster when the check is given up', async () => {
    const posted = await post(designer);
    const job = await takeJob(house.workspace.id, 'check-revision', posted.revisionId);
    await failCheck(job.ctx, job.fence, posted.revisionId, 'The model needs more memory.');
    const { people, payloads } = await told('check-given-up', posted);
    expect(people).toEqual([designer.person.id]);
    expect(payloads[0]).toMatchObject({ reason: 'The model needs more memory.' });
  });
});

describe('a withdrawal', () => {
  it('is mailed to whom the revision was announced, never to who withdraws it', async () => {
    const checked = await postChecked(house);
    await withdrawRevision(designer, checked.revisionId, { reason: 'The logo is mirrored.' });
    const all = await told('revision-withdrawn', checked);
    expect(all.people).toEqual([...client, ...staff].sort());
    expect(all.payloads[0]).toMatchObject({
      printedName: designer.person.name,
      reason: 'The logo is mirrored.',
    });
    const failing = await postChecked(house, { statuses: { draft: 'fail' } });
    await withdrawRevision(designer, failing.revisionId, { reason: 'Draft is too small.' });
    expect((await told('revision-withdrawn', failing)).people).toEqual(staff);
  });

  it('by a newer revision is told to the client as such, and to the studio with the posting', async () => {
    const a = await postChecked(house);
    const b = await post(designer, a.templateId);
    expect(await told('revision-withdrawn', a)).toMatchObject({
      people: client,
      payloads: [{ reason: 'Replaced by B.' }, { reason: 'Replaced by B.' }],
    });
    expect((await told('revision-posted', b)).payloads[0]).toMatchObject({ replaces: 'A' });
  });
});

describe('a signature', () => {
  it('is not mailed to who signed', async () => {
    const posted = await postChecked(house);
    await sign(lead, posted.revisionId);
    expect((await told('revision-signed', posted)).people).toEqual([designer.person.id]);
    await sign(await house.enter('approver'), posted.revisionId);
    const locked = (await told('revision-signed', posted)).payloads.filter((payload) => payload.locked);
    expect(locked.map(({ to }) => (to as { personId: string }).personId)).not.toContain(
      house.people.approver.person.id,
    );
    expect(locked).toHaveLength(4);
  });
});
