import { uuidv7 } from 'uuidv7';
import { withTenant } from '@/db/tenant';
import { appendEntry } from '@/lib/audit/append-entry';
import { requirePermission, type WorkspaceContext } from '@/lib/auth/context';
import { conflict, forbidden } from '@/lib/errors/app-error';
import { parseInput } from '@/lib/http/read-input';
import { enqueueJob } from '@/lib/jobs/enqueue-job';
import { lockRevision, moveRevision } from '@/lib/review/revision-data';
import { holdRole } from '@/lib/review/people-data';
import { permits } from '@/lib/workspaces/roles';
import { asId } from '@/lib/review/as-id';
import { ReleaseInput } from '@/lib/review/schemas';
import { insertRelease } from './production-data';
import { requireAgreed } from './require-agreed';
import { tellPeople } from './tell-people';

export type ReleaseView = {
  id: string;
  revisionId: string;
  byName: string;
  at: string;
  note: string;
  contentDigest: string;
};

/**
 * Hands an approved revision to production: producers and leads only. Orders the pack and tells the people
 * concerned. Throws forbidden, not_found, conflict (`not-approved`, `not-locked`, `content-changed`).
 */
export async function releaseRevision(
  ctx: WorkspaceContext,
  revisionId: string,
  input: unknown,
): Promise<ReleaseView> {
  requirePermission(ctx, 'revision.release');
  const { note } = parseInput(ReleaseInput, input);
  const workspaceId = ctx.workspace.id;
  return withTenant(ctx, async (tx) => {
    const { template, revision } = await lockRevision(tx, workspaceId, asId(revisionId, 'revision'));
    if (revision.state !== 'approved')
      throw conflict(
        'not-approved',
        `Revision ${revision.letter} is ${revision.state.replace('_', ' ')}; only an approved one can be released.`,
      );
    // The role as it is at this moment, held until commit: it goes on record with the release.
    const role = await holdRole(tx, workspaceId, ctx.person.id);
    if (!role || !permits(role, 'revision.release'))
      throw forbidden('You may no longer release in this workspace.');
    const lock = await requireAgreed(tx, revision);
    const releaseId = uuidv7();
    const jobId = await enqueueJob(tx, ctx, {
      kind: 'build-pack',
      subjectId: releaseId,
      inputDigest: lock.contentDigest,
    });
    const release = await insertRelease(tx, {
      id: releaseId,
      workspaceId,
      revisionId: revision.id,
      releasedBy: ctx.person.id,
      releasedByName: ctx.person.name,
      note,
      jobId,
    });
    const moved = await moveRevision(tx, ctx, revision, 'released', null);
    const occasion = `revision-released:${release.id}`;
    await tellPeople(tx, ctx, { template, revision: moved, occasion }, (base) => ({
      template: 'revision-released',
      ...base,
      printedName: ctx.person.name,
      note,
      digest: lock.contentDigest,
    }));
    await appendEntry(tx, ctx, {
      action: 'revision.released',
      subjectKind: 'revision',
      subjectId: revision.id,
      detail: {
        templateId: template.id,
        letter: revision.letter,
        releaseId,
        releasedAt: release.createdAt.toISOString(),
        jobId,
        role,
        contentDigest: lock.contentDigest,
        note,
      },
    });
    return {
      id: release.id,
      revisionId: revision.id,
      byName: release.releasedByName,
      at: release.createdAt.toISOString(),
      note,
      contentDigest: lock.contentDigest,
    };
  });
}
