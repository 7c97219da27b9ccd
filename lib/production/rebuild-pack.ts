import { withTenant } from '@/db/tenant';
import { requirePermission, type WorkspaceContext } from '@/lib/auth/context';
import { conflict, notFound } from '@/lib/errors/app-error';
import { enqueueJob } from '@/lib/jobs/enqueue-job';
import { queueLive } from '@/lib/jobs/queue-live';
import { latestJobOf } from '@/lib/jobs/jobs-data';
import { asId } from '@/lib/review/as-id';
import { lockRevision } from '@/lib/review/revision-data';
import { packOfRelease, releaseOfRevision } from './production-data';
import { requireAgreed } from './require-agreed';

/**
 * Orders the pack of a release again after its building failed. Producers and leads. Throws forbidden,
 * not_found, conflict (`pack-there`, `pack-not-built` while one is being built, `content-changed`).
 */
export async function rebuildPack(ctx: WorkspaceContext, revisionId: string): Promise<{ jobId: string }> {
  requirePermission(ctx, 'revision.release');
  const workspaceId = ctx.workspace.id;
  return withTenant(ctx, async (tx) => {
    const { revision } = await lockRevision(tx, workspaceId, asId(revisionId, 'revision'));
    const release = await releaseOfRevision(tx, workspaceId, revision.id);
    if (!release) throw notFound('release pack');
    if (await packOfRelease(tx, workspaceId, release.id))
      throw conflict('pack-there', 'The release pack is there already.');
    const job = await latestJobOf(tx, { workspaceId, kind: 'build-pack', subjectId: release.id });
    if (job && (job.state === 'queued' || job.state === 'running'))
      throw conflict('pack-not-built', 'The release pack is being built. Try again in a moment.');
    const lock = await requireAgreed(tx, revision);
    const jobId = await enqueueJob(tx, ctx, {
      kind: 'build-pack',
      subjectId: release.id,
      inputDigest: lock.contentDigest,
    });
    await queueLive(tx, ctx, {
      name: 'revision.changed',
      data: { id: revision.id, templateId: revision.templateId },
    });
    return { jobId };
  });
}
