import { withTenant } from '@/db/tenant';
import { appendEntry } from '@/lib/audit/append-entry';
import { digestOf } from '@/lib/audit/canonical';
import { requirePermission, type WorkspaceContext } from '@/lib/auth/context';
import { conflict } from '@/lib/errors/app-error';
import { enqueueJob } from '@/lib/jobs/enqueue-job';
import { queueLive } from '@/lib/jobs/queue-live';
import { asId } from './as-id';
import { changeCheckRun, findCheckRun, findJob } from './check-data';
import { loadRevisionParts, lockRevision } from './revision-data';

/**
 * Orders the check of a revision again after it was given up: the same mesh and recipe, a new job. Those who may
 * post. Throws forbidden, not_found, conflict (`not-in-review`, `check-not-failed`).
 */
export async function recheckRevision(ctx: WorkspaceContext, revisionId: string): Promise<{ jobId: string }> {
  requirePermission(ctx, 'revision.post');
  const workspaceId = ctx.workspace.id;
  return withTenant(ctx, async (tx) => {
    const { template, revision } = await lockRevision(tx, workspaceId, asId(revisionId, 'revision'));
    if (revision.state !== 'in_review')
      throw conflict(
        'not-in-review',
        `Revision ${revision.letter} is ${revision.state.replaceAll('_', ' ')}; only one in review is checked again.`,
      );
    const run = await findCheckRun(tx, workspaceId, revision.id);
    const last = run && (await findJob(tx, workspaceId, run.jobId));
    const settled = last?.state !== 'queued' && last?.state !== 'running';
    if (run?.state !== 'failed' || !settled)
      throw conflict(
        'check-not-failed',
        `The check of revision ${revision.letter} has not failed, so there is nothing to order again. Reload to see it.`,
      );
    const { mesh, recipe } = await loadRevisionParts(tx, revision);
    const jobId = await enqueueJob(tx, ctx, {
      kind: 'check-revision',
      subjectId: revision.id,
      inputDigest: digestOf({ meshSha256: mesh.sha256, recipeDigest: recipe.digest }),
    });
    await changeCheckRun(tx, run, { state: 'queued', error: null, finishedAt: null, jobId });
    await appendEntry(tx, ctx, {
      action: 'check.ordered-again',
      subjectKind: 'revision',
      subjectId: revision.id,
      detail: { templateId: template.id, number: template.number, letter: revision.letter, jobId },
    });
    await queueLive(
      tx,
      ctx,
      { name: 'revision.changed', data: { id: revision.id, templateId: template.id } },
      { name: 'template.changed', data: { id: template.id } },
    );
    return { jobId };
  });
}
