import { withTenant } from '@/db/tenant';
import { requirePermission, type WorkspaceContext } from '@/lib/auth/context';
import { asId } from './as-id';
import { revisionsOf } from './revision-data';
import type { RevisionSummary } from './schemas';
import { findTemplate } from './template-data';

/** The revisions of a template, newest first. */
export async function listRevisions(ctx: WorkspaceContext, templateId: string): Promise<RevisionSummary[]> {
  requirePermission(ctx, 'workspace.read');
  const id = asId(templateId, 'template');
  return withTenant(ctx, async (tx) => {
    await findTemplate(tx, ctx.workspace.id, id);
    const rows = await revisionsOf(tx, ctx.workspace.id, id);
    return rows.reverse().map(({ revision, verdict }) => ({
      id: revision.id,
      letter: revision.letter,
      ordinal: revision.ordinal,
      state: revision.state,
      stateReason: revision.stateReason,
      stateAt: revision.stateAt.toISOString(),
      postedAt: revision.postedAt.toISOString(),
      authorName: revision.authorName,
      note: revision.note,
      verdict,
    }));
  });
}
