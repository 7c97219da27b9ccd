import { withTenant } from '@/db/tenant';
import type { JobContext } from '@/lib/auth/context';
import { entriesAfter, readHead } from './data';
import { verifyChain, verifyHead, type ChainHead, type StoredEntry } from './verify-chain';
import { revisionsToVerify, subjectsOf } from './verify-data';
import { verifyObject } from './verify-objects';
import { planFaults } from './verify-plans';
import { verifyRevision } from './verify-revision';

export type WorkspaceVerdict = {
  head: ChainHead;
  entries: number;
  revisions: number;
  objects: number;
  faults: string[];
};

const pageSize = 1_000;

/**
 * Verifies one workspace: its chain, then its gate plans and every locked revision against it. With `objects` the bytes in the
 * store are read as well; with `anchor` a head that was kept elsewhere must still be part of the chain.
 */
export async function verifyWorkspace(
  ctx: JobContext,
  { objects = false, anchor }: { objects?: boolean; anchor?: ChainHead } = {},
): Promise<WorkspaceVerdict> {
  const { workspaceId } = ctx;
  let anchored: string | undefined;
  async function* pages() {
    for (let after = 0; ;) {
      const rows = await withTenant(ctx, (tx) => entriesAfter(tx, workspaceId, after, pageSize));
      const page = rows.map(({ at, ...row }): StoredEntry => ({ ...row, at: at.toISOString() }));
      anchored ??= page.find(({ seq }) => seq === anchor?.seq)?.hash;
      if (page.length) yield page;
      if (page.length < pageSize) return;
      after = page[page.length - 1].seq;
    }
  }
  // Entries may be added meanwhile: the head is read first, and may be behind the chain's end then.
  const before = await withTenant(ctx, (tx) => readHead(tx, workspaceId));
  const { head, fault } = await verifyChain(pages());
  const verdict: WorkspaceVerdict = { head, entries: head.seq, revisions: 0, objects: 0, faults: [] };
  if (fault) {
    verdict.faults.push(`audit entry ${fault.seq}: ${fault.what}`);
    return verdict;
  }
  const after = await withTenant(ctx, (tx) => readHead(tx, workspaceId));
  const moved = (before?.seq ?? 0) < (after?.seq ?? 0);
  const headFault = moved && (after?.seq ?? 0) > head.seq ? null : verifyHead(head, after);
  if (headFault) verdict.faults.push(`audit head: ${headFault}`);
  if (anchor && anchor.seq > 0 && anchored !== anchor.hash)
    verdict.faults.push(
      `audit entry ${anchor.seq}: it is not the one that was remembered; the chain was cut or rewritten`,
    );
  verdict.faults.push(...(await planFaults(ctx)));
  await verifyRevisions(ctx, objects, verdict);
  return verdict;
}

async function verifyRevisions(ctx: JobContext, objects: boolean, verdict: WorkspaceVerdict): Promise<void> {
  const { workspaceId } = ctx;
  const mustBeLocked = ['approved', 'released', 'superseded', 'retired', 'recalled'];
  const rows = await withTenant(ctx, (tx) => revisionsToVerify(tx, workspaceId));
  const told = await withTenant(ctx, (tx) => subjectsOf(tx, workspaceId, 'revision.locked'));
  for (const { subjectId, seq, detail } of told)
    if (!rows.some(({ revision }) => revision.id === subjectId))
      verdict.faults.push(
        `revision ${String(detail.letter)} (${subjectId}): it was locked in entry ${seq}, but is not there as locked`,
      );
  for (const { revision, number, locked } of rows) {
    if (!locked && !mustBeLocked.includes(revision.state)) continue;
    const found = await withTenant(ctx, (tx) => verifyRevision(tx, revision)).catch((error: Error) => ({
      faults: [`it cannot be read whole (${error.message})`],
      objects: [],
    }));
    const faults = [...found.faults];
    if (objects)
      for (const object of found.objects) {
        const fault = await verifyObject(object);
        verdict.objects += 1;
        if (fault) faults.push(fault);
      }
    verdict.revisions += 1;
    verdict.faults.push(...faults.map((fault) => `revision ${number} ${revision.letter}: ${fault}`));
  }
}
