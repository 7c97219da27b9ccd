import { withTenant } from '@/db/tenant';
import { requirePermission, type WorkspaceContext } from '@/lib/auth/context';
import { conflict, notFound } from '@/lib/errors/app-error';
import { latestJobOf } from '@/lib/jobs/jobs-data';
import { asId } from '@/lib/review/as-id';
import { requireNotRecalled } from '@/lib/review/recalled';
import { findRevision } from '@/lib/review/revision-data';
import { store } from '@/lib/storage/store';
import { packOfRelease, releaseOfRevision } from './production-data';

/**
 * A short-lived address of the release pack. Throws not_found before the release, conflict `pack-not-built`
 * while it is being built or after it failed, and `recalled` for anyone but a lead once it was recalled.
 */
export async function openPack(ctx: WorkspaceContext, revisionId: string): Promise<string> {
  requirePermission(ctx, 'pack.download');
  const workspaceId = ctx.workspace.id;
  const pack = await withTenant(ctx, async (tx) => {
    const revision = await findRevision(tx, workspaceId, asId(revisionId, 'revision'));
    const release = await releaseOfRevision(tx, workspaceId, revision.id);
    if (!release) throw notFound('release pack');
    requireNotRecalled(ctx, revision);
    const found = await packOfRelease(tx, workspaceId, release.id);
    if (found) return found;
    const job = await latestJobOf(tx, { workspaceId, kind: 'build-pack', subjectId: release.id });
    throw conflict(
      'pack-not-built',
      job?.state === 'failed'
        ? `The release pack could not be built: ${job.error} A producer or lead can order it again.`
        : 'The release pack is being built. Try again in a moment.',
    );
  });
  return store().presignGet(pack.storeKey, { fileName: pack.fileName, contentType: 'application/zip' });
}
