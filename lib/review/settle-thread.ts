import { withTenant } from '@/db/tenant';
import { appendEntry } from '@/lib/audit/append-entry';
import { requirePermission, type WorkspaceContext } from '@/lib/auth/context';
import { parseInput } from '@/lib/http/read-input';
import { queueLive } from '@/lib/jobs/queue-live';
import { advanceGates } from './advance-gates';
import { asId } from './as-id';
import { changedMeanwhile } from './changed-meanwhile';
import { changeThread, findThread, insertPlacements, newestPlacement } from './docket-data';
import { viewThreadRow } from './docket-view';
import { loadThread } from './load-docket';
import { workspacePeople } from './people-data';
import { requireOpenDocket } from './require-open-docket';
import { findRevision, lockRevision } from './revision-data';
import { tellToday } from './revision-mails';
import { SettleInput, type ThreadView } from './schemas';

/**
 * Settles a thread, or opens it again, if it is still at the version that the caller saw. One that is opened
 * again after its revision was followed by another in review travels there, or nobody would see it.
 */
export async function settleThread(
  ctx: WorkspaceContext,
  threadId: string,
  input: unknown,
): Promise<ThreadView> {
  requirePermission(ctx, 'docket.settle');
  const { settled, version } = parseInput(SettleInput, input);
  const id = asId(threadId, 'thread');
  const workspaceId = ctx.workspace.id;
  return withTenant(ctx, async (tx) => {
    const placement = await newestPlacement(tx, workspaceId, id);
    const { template, revision } = await lockRevision(tx, workspaceId, placement.revisionId);
    const thread = await findThread(tx, workspaceId, id);
    const state = settled ? 'settled' : 'open';
    if (thread.state === state) return viewThreadRow(await loadThread(tx, workspaceId, id));
    if (thread.version !== version) throw changedMeanwhile('thread', thread.version);
    await requireOpenDocket(tx, revision, thread);
    await changeThread(tx, thread, { state, by: settled ? ctx.person : null });
    const latestId = template.latestRevisionId;
    if (!settled && latestId && latestId !== revision.id && !thread.afterApproval) {
      const latest = await findRevision(tx, workspaceId, latestId);
      if (latest.state === 'in_review')
        await insertPlacements(tx, [
          {
            workspaceId,
            threadId: id,
            revisionId: latest.id,
            pin: placement.pin,
            standing: placement.pin ? 'carried' : 'free',
            carriedFrom: revision.id,
          },
        ]);
    }
    await appendEntry(tx, ctx, {
      action: settled ? 'thread.settled' : 'thread.reopened',
      subjectKind: 'thread',
      subjectId: id,
      detail: {
        templateId: template.id,
        number: template.number,
        revisionId: revision.id,
        letter: revision.letter,
        mustSettle: thread.mustSettle,
      },
    });
    // An automatic gate may have waited for this item.
    if (settled && thread.mustSettle && revision.state === 'in_review')
      await advanceGates(tx, ctx, template, revision);
    await queueLive(
      tx,
      ctx,
      { name: 'docket.changed', data: { revisionId: revision.id, threadId: id } },
      { name: 'revision.changed', data: { id: revision.id, templateId: template.id } },
      { name: 'template.changed', data: { id: template.id } },
    );
    await tellToday(tx, ctx, await workspacePeople(tx, workspaceId), revision.id);
    return viewThreadRow(await loadThread(tx, workspaceId, id));
  });
}
