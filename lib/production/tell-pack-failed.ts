import { withTenant } from '@/db/tenant';
import { appendEntry } from '@/lib/audit/append-entry';
import type { JobContext } from '@/lib/auth/context';
import { holdsJob, type Fence } from '@/lib/jobs/fence';
import { queueLive } from '@/lib/jobs/queue-live';
import { findRevision } from '@/lib/review/revision-data';
import { findRelease } from './production-data';

/** Records that a pack could not be built; the revision's page then says why and offers to order it again. */
export async function tellPackFailed(
  ctx: JobContext,
  fence: Fence,
  releaseId: string,
  reason: string,
): Promise<void> {
  await withTenant(ctx, async (tx) => {
    if (!(await holdsJob(tx, ctx, fence))) return;
    const release = await findRelease(tx, ctx.workspaceId, releaseId);
    if (!release) return;
    const revision = await findRevision(tx, ctx.workspaceId, release.revisionId);
    await appendEntry(tx, ctx, {
      action: 'pack.failed',
      subjectKind: 'pack',
      subjectId: releaseId,
      detail: { templateId: revision.templateId, revisionId: revision.id, letter: revision.letter, reason },
    });
    await queueLive(tx, ctx, {
      name: 'revision.changed',
      data: { id: revision.id, templateId: revision.templateId },
    });
  });
}
