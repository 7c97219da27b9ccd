import { sql } from 'drizzle-orm';
import { beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { withTenant } from '@/db/tenant';
import { type WorkspaceContext } from '@/lib/auth/context';
import { returnGate } from '@/lib/review/return-gate';
import { signGate } from '@/lib/review/sign-gate';
import { viewContent } from '@/lib/review/view-content';
import { viewDocket } from '@/lib/review/view-docket';
import { viewRevision } from '@/lib/review/view-revision';
import { waiveFinding } from '@/lib/review/waive-finding';
import { withdrawRevision } from '@/lib/review/withdraw-revision';
import { freshDatabase, type FreshDatabase } from '@/tests/support/database';
import {
  entries,
  fingerprint,
  gateOf,
  mailsOf,
  postChecked,
  raise,
  shown,
  sign,
} from '@/tests/support/factory';
import { makeHouse, type House } from '@/tests/support/make-house';
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

describe('returning and withdrawing', () => {
  it('returns with a reason: gates close, everybody else is told, the name stays', async () => {
    const { revisionId, templateId } = await postChecked(house);
    await sign(lead, revisionId);
    const { id } = await gateOf(approver, revisionId, 'client');
    const seen = await shown(approver, revisionId);
    await returnGate(approver, id, { ...seen, reason: 'The logo is mirrored.' });
    const view = await viewRevision(lead, revisionId);
    expect(view).toMatchObject({ state: 'returned', stateReason: 'The logo is mirrored.', lockedAt: null });
    expect(view.gates.map((gate) => gate.state)).toEqual(['passed', 'passed', 'returned']);
    expect(view.gates[2].signatures[0]).toMatchObject({
      decision: 'return',
      reason: 'The logo is mirrored.',
    });
    const told = (await mailsOf(database, house.workspace.id, 'revision-returned')).map(
      ({ person }) => person,
    );
    expect(told).toHaveLength(4);
    expect(told).not.toContain(approver.person.id);
    await refused(() => signGate(approver, id, seen), { code: 'conflict' });
    const next = await postChecked(house, { templateId });
    expect(next.letter).toBe('B');
    expect((await viewRevision(lead, revisionId)).state).toBe('returned');
  });

  it('withdraws by the author before the first signature only', async () => {
    const { revisionId } = await postChecked(house);
    await refused(() => withdrawRevision(lead, revisionId, { reason: 'Not mine.' }), {
      code: 'forbidden',
      reason: 'not-the-author',
    });
    expect((await viewRevision(designer, revisionId)).can.withdraw).toBe(true);
    await sign(lead, revisionId);
    expect((await viewRevision(designer, revisionId)).can.withdraw).toBe(false);
    await refused(() => withdrawRevision(designer, revisionId, { reason: 'Too late.' }), {
      code: 'conflict',
      reason: 'already-signed',
    });
    const other = await postChecked(house);
    await withdrawRevision(designer, other.revisionId, { reason: 'Wrong file.' });
    const view = await viewRevision(lead, other.revisionId);
    expect(view).toMatchObject({ state: 'withdrawn', stateReason: 'Wrong file.' });
    expect(view.gates.map((gate) => gate.state)).toEqual(['passed', 'closed', 'closed']);
    await refused(() => withdrawRevision(designer, other.revisionId, { reason: 'Again.' }), {
      reason: 'not-in-review',
    });
  });

  it('closes a signed revision when the next one is posted, with its names still to be seen', async () => {
    const a = await postChecked(house);
    await sign(lead, a.revisionId);
    await postChecked(house, { templateId: a.templateId });
    const view = await viewRevision(lead, a.revisionId);
    expect(view).toMatchObject({ state: 'withdrawn', stateReason: 'Replaced by B.' });
    expect(view.gates[1].signatures).toHaveLength(1);
  });
});

describe('waiving', () => {
  it('opens the way when every failing finding is waived, with reasons that stay', async () => {
    const { revisionId } = await postChecked(house, { statuses: { draft: 'fail', undercut: 'fail' } });
    const failing = (await viewDocket(lead, revisionId)).findings.filter(({ status }) => status === 'fail');
    expect(failing).toHaveLength(2);
    const reason = 'The part is pulled off by hand; it has worked.';
    const one = await waiveFinding(lead, failing[0].id, { reason });
    expect(one.counts.mustSettle).toBe(1);
    expect((await gateOf(lead, revisionId, 'forming')).state).toBe('open');
    await refused(() => waiveFinding(lead, failing[0].id, { reason }), { reason: 'already-waived' });
    await waiveFinding(lead, failing[1].id, { reason });
    const view = await viewRevision(lead, revisionId);
    expect(view.gates.map((gate) => gate.state)).toEqual(['passed', 'open', 'waiting']);
    expect(view.check.verdict).toBe('fail');
    const [entry] = await entries(database, house.workspace.id, 1);
    expect(entry).toMatchObject({ action: 'finding.waived', detail: { reason, gatesPassed: ['Forming'] } });
    const { summary } = await viewContent(lead, revisionId);
    expect(summary.findings.find(({ checkId }) => checkId === 'draft')?.waived).toBe(
      `${lead.person.name}: ${reason}`,
    );
  });

  it('is only for a failing finding of a revision in review, with a reason', async () => {
    const { revisionId } = await postChecked(house, { statuses: { draft: 'caution' } });
    const { findings } = await viewDocket(lead, revisionId);
    const caution = findings.find(({ status }) => status === 'caution')!;
    await refused(() => waiveFinding(lead, caution.id, { reason: 'It is fine by me.' }), {
      reason: 'not-failing',
    });
    await refused(() => waiveFinding(lead, caution.id, { reason: 'ok' }), { code: 'invalid' });
    await withdrawRevision(designer, revisionId, { reason: 'Wrong file.' });
    await refused(() => waiveFinding(lead, caution.id, { reason: 'It is fine by me.' }), {
      reason: 'not-in-review',
    });
  });
});

describe('what was agreed', () => {
  it('is refused to change by the database itself, for the application’s own role', async () => {
    const { revisionId, templateId } = await postChecked(house);
    const thread = await raise(approver, revisionId, 'Agreed so.');
    await sign(lead, revisionId);
    await sign(approver, revisionId);
    const attempts: [string, ReturnType<typeof sql>][] = [
      [
        'mesh of the revision',
        sql`update revisions set mesh_id = gen_random_uuid() where id = ${revisionId}`,
      ],
      [
        'recipe of the revision',
        sql`update revisions set recipe_id = gen_random_uuid() where id = ${revisionId}`,
      ],
      ['letter', sql`update revisions set letter = 'Z' where id = ${revisionId}`],
      ['note', sql`update revisions set note = 'x' where id = ${revisionId}`],
      ['author', sql`update revisions set author_name = 'x' where id = ${revisionId}`],
      ['back to review', sql`update revisions set state = 'in_review' where id = ${revisionId}`],
      ['delete', sql`delete from revisions where id = ${revisionId}`],
      ['mesh bytes', sql`update meshes set sha256 = 'x' where template_id = ${templateId}`],
      ['mesh key', sql`update meshes set store_key = 'x' where template_id = ${templateId}`],
      ['recipe', sql`update recipes set body = '{}'`],
      ['report', sql`update reports set body = '{}'`],
      ['finding', sql`update findings set status = 'pass' where revision_id = ${revisionId}`],
      ['signature', sql`update signatures set printed_name = 'x' where revision_id = ${revisionId}`],
      ['signature away', sql`delete from signatures where revision_id = ${revisionId}`],
      ['lock', sql`update locks set content_digest = 'x' where revision_id = ${revisionId}`],
      ['lock away', sql`delete from locks where revision_id = ${revisionId}`],
      ['gate', sql`update gates set state = 'open' where revision_id = ${revisionId}`],
      ['check run', sql`update check_runs set verdict = 'fail' where revision_id = ${revisionId}`],
      ['thread', sql`update threads set state = 'settled' where id = ${thread.id}`],
      ['pin', sql`update placements set pin = null where thread_id = ${thread.id}`],
      ['note text', sql`update notes set text = 'x' where thread_id = ${thread.id}`],
      [
        'a note more',
        sql`insert into notes (id, workspace_id, thread_id, revision_id, body, text, author_id, author_name, client_key)
        values (gen_random_uuid(), ${house.workspace.id}, ${thread.id}, ${revisionId}, '{}', 'x', ${lead.person.id}, 'x', gen_random_uuid())`,
      ],
      [
        'a waiver more',
        sql`insert into waivers (id, workspace_id, revision_id, finding_id, reason, waived_by, waived_by_name)
        select gen_random_uuid(), workspace_id, revision_id, id, 'x', ${lead.person.id}, 'x' from findings where revision_id = ${revisionId} limit 1`,
      ],
      ['all locks', sql`truncate locks`],
      ['all signatures', sql`truncate signatures cascade`],
      ['the trigger', sql`alter table locks disable trigger frozen_row`],
      ['replication', sql`set session_replication_role = replica`],
    ];
    const before = await fingerprint(database, house.workspace.id);
    for (const [what, attempt] of attempts) {
      const run = withTenant(lead, (tx) => tx.execute(attempt));
      await expect(run, what).rejects.toMatchObject({
        cause: { code: expect.stringMatching(/^(42501|23001|23514)$/) },
      });
    }
    expect(await fingerprint(database, house.workspace.id)).toBe(before);
  });
});
