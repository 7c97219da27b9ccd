import { withTenant } from '@/db/tenant';
import { appendEntry } from '@/lib/audit/append-entry';
import { requirePermission, type WorkspaceContext } from '@/lib/auth/context';
import { queueLive } from '@/lib/jobs/queue-live';
import { asId } from './as-id';
import { deleteDraft, findDraft } from './draft-data';
import { lockTemplate } from './revision-data';

/** Throws the draft away; posted revisions are not touched. Done before: nothing happens. */
export async function discardDraft(
  ctx: WorkspaceContext,
  templateId: string,
): Promise<{ discarded: boolean }> {
  requirePermission(ctx, 'revision.post');
  const id = asId(templateId, 'template');
  const workspaceId = ctx.workspace.id;
  return withTenant(ctx, async (tx) => {
    const template = await lockTemplate(tx, workspaceId, id);
    const draft = await findDraft(tx, workspaceId, id, { lock: true });
    if (!draft) return { discarded: false };
    await deleteDraft(tx, draft);
    await appendEntry(tx, ctx, {
      action: 'draft.discarded',
      subjectKind: 'draft',
      subjectId: draft.id,
      detail: { templateId: id, number: template.number },
    });
    await queueLive(tx, ctx, { name: 'draft.changed', data: { id: draft.id, templateId: id } });
    return { discarded: true };
  });
}
