import { beforeAll, describe, expect, it } from 'vitest';
import { viewDocket } from '@/lib/review/view-docket';
import { viewRevision } from '@/lib/review/view-revision';
import { loadAgreed } from '@/lib/review/load-agreed';
import { digestOf } from '@/lib/audit/canonical';
import { freshDatabase, type FreshDatabase } from '@/tests/support/database';
import { makeHouse, type House } from '@/tests/support/make-house';
import { entries, mailsOf, postChecked, raise, sign } from '@/tests/support/factory';
import { settleThread } from '@/lib/review/settle-thread';
import { replyToThread } from '@/lib/review/reply-to-thread';
import { note } from '@/tests/support/factory';

let database: FreshDatabase;
let house: House;
beforeAll(async () => {
  database = await freshDatabase();
  house = await makeHouse(database);
});

describe('the life of a template', () => {
  it('fails, is mended in the next revision, carries its items, is signed and locked', async () => {
    const designer = await house.enter('designer');
    const approver = await house.enter('approver');
    const lead = await house.enter('lead');
    const a = await postChecked(house, { statuses: { draft: 'fail' } });
    expect(a.letter).toBe('A');
    const first = await viewRevision(approver, a.revisionId);
    expect(first.check).toMatchObject({ state: 'finished', verdict: 'fail', progress: 1 });
    expect(first.gates.map((gate) => gate.state)).toEqual(['open', 'waiting', 'waiting']);
    expect(first.can.sign).toBeNull();

    const docket = await viewDocket(approver, a.revisionId);
    const failing = docket.findings.find((finding) => finding.status === 'fail')!;
    const asked = await raise(approver, a.revisionId, 'Why does this wall stick?', {
      findingId: failing.id,
      mustSettle: true,
    });
    const pinned = await raise(approver, a.revisionId, 'Round this corner.', {
      pin: { at: [1, 2, 3], normal: [0, 0, 1], view: null },
    });
    await replyToThread(designer, asked.id, note('Too little draft. B has 8°.'));

    const b = await postChecked(house, { templateId: a.templateId });
    expect(b.letter).toBe('B');
    expect(await viewRevision(approver, a.revisionId)).toMatchObject({
      state: 'withdrawn',
      stateReason: 'Replaced by B.',
    });
    const carried = await viewDocket(approver, b.revisionId);
    expect(carried.threads.map(({ id, standing, openedOn }) => ({ id, standing, openedOn }))).toEqual([
      { id: asked.id, standing: 'free', openedOn: 'A' },
      { id: pinned.id, standing: 'carried', openedOn: 'A' },
    ]);
    const now = carried.findings.find((finding) => finding.checkId === failing.checkId)!;
    expect(carried.threads[0].findingId).toBe(now.id);

    expect((await viewRevision(lead, b.revisionId)).can.sign?.blocked).toBe(
      'One item must be settled first.',
    );
    await expect(sign(lead, b.revisionId)).rejects.toMatchObject({
      code: 'conflict',
      reason: 'must-settle',
      errors: [
        { pointer: `/threads/${asked.id}`, detail: expect.stringContaining('Why does this wall stick?') },
      ],
    });
    const thread = carried.threads[0];
    await settleThread(approver, thread.id, { settled: true, version: thread.version });

    expect(await sign(lead, b.revisionId)).toMatchObject({ gatePassed: true, locked: false });
    await replyToThread(designer, pinned.id, note('Done, 2 mm.'));
    const last = await sign(approver, b.revisionId);
    expect(last).toMatchObject({ gatePassed: true, locked: true });
    const final = await viewRevision(designer, b.revisionId);
    expect(final).toMatchObject({ state: 'approved', contentDigest: last.signature.contentDigest });
    expect(final.lockedAt).not.toBeNull();

    const agreed = await loadAgreed(designer, b.revisionId);
    expect(agreed.lock.contentDigest).toBe(digestOf(agreed.lock.content));
    expect(agreed.signatures.map((signature) => signature.gateName)).toEqual(['Studio', 'Client']);
    for (const signature of agreed.signatures)
      expect(digestOf(signature.content)).toBe(signature.contentDigest);
    expect(agreed.signatures[0].contentDigest).not.toBe(agreed.lock.contentDigest);
    expect((await entries(database, house.workspace.id, 3)).map((entry) => entry.action)).toEqual([
      'revision.locked',
      'gate.signed',
      'note.posted',
    ]);
    // Two postings, each to lead and producer; the client hears of the one that can be looked at.
    expect((await mailsOf(database, house.workspace.id, 'revision-posted')).length).toBe(4);
    expect((await mailsOf(database, house.workspace.id, 'revision-checked')).length).toBe(2);
  });
});
