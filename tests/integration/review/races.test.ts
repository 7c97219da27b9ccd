import { beforeAll, describe, expect, it } from 'vitest';
import { joinWorkspace, makeHouse, type House } from '@/tests/support/make-house';
import type { WorkspaceContext } from '@/lib/auth/context';
import { enterWorkspace } from '@/lib/auth/enter';
import { entryHash, genesis } from '@/lib/audit/chain';
import { createTemplate } from '@/lib/review/create-template';
import { openDraft } from '@/lib/review/open-draft';
import { openThread } from '@/lib/review/open-thread';
import { postRevision } from '@/lib/review/post-revision';
import { returnGate } from '@/lib/review/return-gate';
import { settleThread } from '@/lib/review/settle-thread';
import { signGate } from '@/lib/review/sign-gate';
import { viewContent } from '@/lib/review/view-content';
import { withdrawRevision } from '@/lib/review/withdraw-revision';
import { digestOf } from '@/lib/audit/canonical';
import { loadAgreed } from '@/lib/review/load-agreed';
import { removeMember } from '@/lib/workspaces/remove-member';
import { freshDatabase, type FreshDatabase } from '@/tests/support/database';
import {
  gateOf,
  newTemplate,
  note,
  postChecked,
  raise,
  readyDraft,
  shown,
  sign,
} from '@/tests/support/factory';
import { rounds } from '@/tests/support/rounds';

let database: FreshDatabase;
let house: House;
let approvers: WorkspaceContext[];

beforeAll(async () => {
  database = await freshDatabase();
  house = await makeHouse(database);
  const lead = await house.enter('lead');
  const more = await joinWorkspace(database, lead, 'approver');
  approvers = [await house.enter('approver'), await enterWorkspace(more.person, house.workspace.id)];
});

type Settled = { done: number; codes: string[]; reasons: string[] };

async function together(...runs: Promise<unknown>[]): Promise<Settled> {
  const all = await Promise.allSettled(runs);
  const failed = all
    .filter((one) => one.status === 'rejected')
    .map((one) => one.reason as { code: string; reason: string });
  return {
    done: all.length - failed.length,
    codes: failed.map((error) => error.code),
    reasons: failed.map((error) => error.reason),
  };
}

async function countOf(table: string, revisionId: string): Promise<number> {
  const { rows } = await database.query<{ n: number }>(
    `select count(*)::int as n from ${table} where revision_id = $1`,
    [revisionId],
  );
  return rows[0].n;
}

/** The workspace's chain, read as a superuser and recomputed: gap-free, each entry on the one before. */
async function requireWholeChain(): Promise<void> {
  const { rows } = await database.query<Record<string, unknown>>(
    'select * from audit_entries where workspace_id = $1 order by seq',
    [house.workspace.id],
  );
  let previous = genesis;
  rows.forEach((row, i) => {
    expect(row.seq).toBe(i + 1);
    expect(row.previous).toBe(previous);
    previous = entryHash(previous, {
      workspaceId: row.workspace_id as string,
      seq: row.seq as number,
      at: (row.at as Date).toISOString(),
      actorId: row.actor_id as string | null,
      actorName: row.actor_name as string,
      action: row.action as string,
      subjectKind: row.subject_kind as string,
      subjectId: row.subject_id as string,
      detail: row.detail as Record<string, unknown>,
    });
    expect(row.hash).toBe(previous);
  });
  const { rows: heads } = await database.query<{ seq: number; hash: string }>(
    'select seq, hash from audit_heads where workspace_id = $1',
    [house.workspace.id],
  );
  expect(heads[0]).toEqual({ seq: rows.length, hash: previous });
}

/** Stands a revision before the client's gate, with this quorum. */
async function beforeClient(quorum: number): Promise<{ revisionId: string; gateId: string }> {
  const { rows } = await database.query<{ gates: Record<string, unknown>[] }>(
    'select gates from gate_plans where workspace_id = $1 order by number limit 1',
    [house.workspace.id],
  );
  const gates = rows[0].gates.map((rule) => (rule.key === 'client' ? { ...rule, quorum } : rule));
  await database.query(
    `insert into gate_plans (id, workspace_id, number, gates)
     select gen_random_uuid(), $1, max(number) + 1, $2 from gate_plans where workspace_id = $1`,
    [house.workspace.id, JSON.stringify(gates)],
  );
  const { revisionId } = await postChecked(house);
  await sign(await house.enter('lead'), revisionId);
  return { revisionId, gateId: (await gateOf(approvers[0], revisionId, 'client')).id };
}

const everyRound = Array.from({ length: rounds(3, 500) }, (_, round) => round + 1);

describe('two signatures at once', () => {
  it.each(everyRound)('with a quorum of one: one lock, one signature (round %i)', async () => {
    const { revisionId, gateId } = await beforeClient(1);
    const seen = await shown(approvers[0], revisionId);
    const { done, codes } = await together(...approvers.map((ctx) => signGate(ctx, gateId, seen)));
    expect(done).toBe(1);
    expect(codes).toEqual(['conflict']);
    expect(await countOf('locks', revisionId)).toBe(1);
    expect(await countOf('signatures', revisionId)).toBe(2);
    await requireWholeChain();
  });

  it.each(everyRound)('with a quorum of two: both count, one lock (round %i)', async () => {
    const { revisionId, gateId } = await beforeClient(2);
    const seen = await shown(approvers[0], revisionId);
    const { done } = await together(...approvers.map((ctx) => signGate(ctx, gateId, seen)));
    expect(done).toBe(2);
    expect(await countOf('locks', revisionId)).toBe(1);
    expect(await countOf('signatures', revisionId)).toBe(3);
    await requireWholeChain();
  });

  it('of one person count once', async () => {
    const { revisionId, gateId } = await beforeClient(2);
    const seen = await shown(approvers[0], revisionId);
    const { done, reasons } = await together(
      signGate(approvers[0], gateId, seen),
      signGate(approvers[0], gateId, seen),
      signGate(approvers[0], gateId, seen),
    );
    expect(done).toBe(1);
    expect(reasons).toEqual(['already-signed', 'already-signed']);
    expect(await countOf('locks', revisionId)).toBe(0);
  });
});

describe('signing against', () => {
  it.each(everyRound)('a return: one of them decides (round %i)', async () => {
    const { revisionId, gateId } = await beforeClient(1);
    const seen = await shown(approvers[0], revisionId);
    const { done, codes } = await together(
      signGate(approvers[0], gateId, seen),
      returnGate(approvers[1], gateId, { ...seen, reason: 'Not like this.' }),
    );
    expect(done).toBe(1);
    expect(codes).toEqual(['conflict']);
    const { rows } = await database.query<{ state: string }>('select state from revisions where id = $1', [
      revisionId,
    ]);
    expect(await countOf('locks', revisionId)).toBe(rows[0].state === 'approved' ? 1 : 0);
    await requireWholeChain();
  });

  it.each(everyRound)(
    'the next post: locked and then followed, or replaced and not locked (round %i)',
    async () => {
      const { revisionId, gateId } = await beforeClient(1);
      const designer = await house.enter('designer');
      const { rows: found } = await database.query<{ template_id: string }>(
        'select template_id from revisions where id = $1',
        [revisionId],
      );
      const templateId = found[0].template_id;
      const version = await readyDraft(designer, templateId);
      const seen = await shown(approvers[0], revisionId);
      const { codes } = await together(
        signGate(approvers[0], gateId, seen),
        postRevision(designer, templateId, { version }),
      );
      const { rows } = await database.query<{ letter: string; state: string }>(
        'select letter, state from revisions where template_id = $1 order by ordinal',
        [templateId],
      );
      const locked = await countOf('locks', revisionId);
      expect(rows).toEqual([
        { letter: 'A', state: locked ? 'approved' : 'withdrawn' },
        { letter: 'B', state: 'in_review' },
      ]);
      expect(codes).toEqual(locked ? [] : ['conflict']);
      await requireWholeChain();
    },
  );

  it.each(everyRound)('a note: it is in what was agreed, or outside and marked so (round %i)', async () => {
    const { revisionId, gateId } = await beforeClient(1);
    const seen = await shown(approvers[0], revisionId);
    const lead = await house.enter('lead');
    await together(signGate(approvers[0], gateId, seen), openThread(lead, revisionId, note('One more.')));
    const { rows } = await database.query<{ after_approval: boolean }>(
      'select after_approval from threads where revision_id = $1',
      [revisionId],
    );
    const locked = (await countOf('locks', revisionId)) === 1;
    expect(rows).toEqual([{ after_approval: locked }]);
    if (locked) {
      const agreed = await loadAgreed(lead, revisionId);
      expect(agreed.lock.content.docket.threads).toEqual([]);
      expect((await viewContent(lead, revisionId)).digest).toBe(digestOf(agreed.lock.content));
    }
  });

  it.each(everyRound)(
    'the removal of the signer: signed while a member, or not at all (round %i)',
    async () => {
      const { revisionId, gateId } = await beforeClient(1);
      const lead = await house.enter('lead');
      const joined = await joinWorkspace(database, lead, 'approver');
      const leaving = await enterWorkspace(joined.person, house.workspace.id);
      const seen = await shown(approvers[0], revisionId);
      const { codes } = await together(signGate(leaving, gateId, seen), removeMember(lead, joined.person.id));
      expect(['', 'forbidden', 'not_found']).toContain(codes.join());
      const { rows } = await database.query<{ n: number }>(
        'select count(*)::int as n from signatures where signer_id = $1',
        [joined.person.id],
      );
      expect(rows[0].n).toBe(codes.length ? 0 : 1);
      expect(await countOf('locks', revisionId)).toBe(rows[0].n);
      await requireWholeChain();
    },
  );

  it('withdrawing, before the studio has signed', async () => {
    const { revisionId } = await postChecked(house);
    const lead = await house.enter('lead');
    const { id } = await gateOf(lead, revisionId, 'studio');
    const { done, codes } = await together(
      signGate(lead, id, await shown(lead, revisionId)),
      withdrawRevision(await house.enter('designer'), revisionId, { reason: 'Wrong file.' }),
    );
    expect(done).toBe(1);
    expect(codes).toEqual(['conflict']);
  });
});

describe('posting twice', () => {
  it('makes one revision of one draft', async () => {
    const designer = await house.enter('designer');
    const templateId = await newTemplate(designer);
    const version = await readyDraft(designer, templateId);
    const { done, reasons } = await together(
      ...[1, 2, 3].map(() => postRevision(designer, templateId, { version })),
    );
    expect(done).toBe(1);
    expect(reasons).toEqual(['no-draft', 'no-draft']);
    const { rows } = await database.query('select letter from revisions where template_id = $1', [
      templateId,
    ]);
    expect(rows).toEqual([{ letter: 'A' }]);
  });

  it('opens one draft for two who begin at once', async () => {
    const designer = await house.enter('designer');
    const lead = await house.enter('lead');
    const templateId = await newTemplate(designer);
    const [one, two] = await Promise.all([openDraft(designer, templateId), openDraft(lead, templateId)]);
    expect(one.id).toBe(two.id);
  });
});

describe('numbers and items', () => {
  it('numbers templates without gaps, however many are opened at once', async () => {
    const lead = await house.enter('lead');
    const made = await Promise.all(
      Array.from({ length: 12 }, () => createTemplate(lead, { title: 'At once' })),
    );
    const serials = made.map(({ number }) => Number(number.split('-')[1])).sort((a, b) => a - b);
    expect(new Set(serials).size).toBe(12);
    expect(serials[11] - serials[0]).toBe(11);
    await requireWholeChain();
  });

  it('writes a note once, however often it is sent under one key', async () => {
    const { revisionId } = await postChecked(house);
    const lead = await house.enter('lead');
    const said = note('Only once.');
    const answers = await Promise.all([1, 2, 3, 4].map(() => openThread(lead, revisionId, said)));
    expect(new Set(answers.map((thread) => thread.id)).size).toBe(1);
    expect(await countOf('notes', revisionId)).toBe(1);
  });

  it('settles a thread once, and refuses who saw an older one', async () => {
    const { revisionId } = await postChecked(house);
    const lead = await house.enter('lead');
    const thread = await raise(lead, revisionId, 'Settle me.');
    const settled = await settleThread(lead, thread.id, { settled: true, version: thread.version });
    const again = await settleThread(approvers[0], thread.id, { settled: true, version: thread.version });
    expect(again.version).toBe(settled.version);
    await expect(
      settleThread(approvers[0], thread.id, { settled: false, version: thread.version }),
    ).rejects.toMatchObject({
      code: 'precondition_failed',
    });
  });
});
