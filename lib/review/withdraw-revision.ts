import { withTenant } from '@/db/tenant';
import { requirePermission, type WorkspaceContext } from '@/lib/auth/context';
import { conflict, forbidden } from '@/lib/errors/app-error';
import { parseInput } from '@/lib/http/read-input';
import { asId } from './as-id';
import { closeRevision } from './close-revision';
import { workspacePeople } from './people-data';
import { countSignatures, lockRevision } from './revision-data';
import { tellToday } from './revision-mails';
import { ReasonInput } from './schemas';
import { tellWithdrawn } from './tell-withdrawn';

/** The author takes a revision back before anyone has signed it. It stays to be read, as withdrawn. */
export async function withdrawRevision(
  ctx: WorkspaceContext,
  revisionId: string,
  input: unknown,
): Promise<{ state: 'withdrawn' }> {
  requirePermission(ctx, 'revision.withdraw');
  const { reason } = parseInput(ReasonInput, input);
  const id = asId(revisionId, 'revision');
  const workspaceId = ctx.workspace.id;
  return withTenant(ctx, async (tx) => {
    const { template, revision } = await lockRevision(tx, workspaceId, id);
    if (revision.authorId !== ctx.person.id)
      throw forbidden(`Only ${revision.authorName}, who posted it, can withdraw it.`, 'not-the-author');
    if (revision.state !== 'in_review')
      throw conflict(
        'not-in-review',
        `Revision ${revision.letter} is not in review, so it cannot be withdrawn.`,
      );
    if ((await countSignatures(tx, workspaceId, id)) > 0)
      throw conflict(
        'already-signed',
        `Revision ${revision.letter} has been signed, so it cannot be withdrawn. Ask for its return, or post the next one.`,
      );
    await closeRevision(tx, ctx, revision, 'withdrawn', reason);
    await tellWithdrawn(tx, ctx, { template, revision, reason });
    await tellToday(tx, ctx, await workspacePeople(tx, workspaceId), id);
    return { state: 'withdrawn' };
  });
}
