import type { TenantTx } from '@/db/tenant';
import { appendEntry } from '@/lib/audit/append-entry';
import type { WorkspaceContext } from '@/lib/auth/context';
import { closeGates } from './gate-data';
import { moveRevision, type RevisionRow } from './revision-data';

/** Ends a review without an approval: the gates that have not passed close, the revision goes its way. */
export async function closeRevision(
  tx: TenantTx,
  ctx: WorkspaceContext,
  revision: RevisionRow,
  to: 'returned' | 'withdrawn',
  reason: string,
): Promise<RevisionRow> {
  await closeGates(tx, ctx.workspace.id, revision.id);
  const moved = await moveRevision(tx, ctx, revision, to, reason);
  await appendEntry(tx, ctx, {
    action: `revision.${to}`,
    subjectKind: 'revision',
    subjectId: revision.id,
    detail: { templateId: revision.templateId, letter: revision.letter, reason },
  });
  return moved;
}
