import { withTenant } from '@/db/tenant';
import { appendEntry } from '@/lib/audit/append-entry';
import { requirePermission, type WorkspaceContext } from '@/lib/auth/context';
import { queueLive } from '@/lib/jobs/queue-live';
import { asId } from './as-id';
import { findDraft, insertDraft } from './draft-data';
import { draftView } from './draft-view';
import { libraryDefaults } from './library-data';
import { recipeFromLibrary, recipeFromRevision } from './prefill-recipe';
import { latestRevision, loadRevisionParts, lockTemplate } from './revision-data';
import type { DraftView } from './schemas';

/** The draft of a template's next revision; made, with a recipe to begin from, where there is none. */
export async function openDraft(ctx: WorkspaceContext, templateId: string): Promise<DraftView> {
  requirePermission(ctx, 'revision.post');
  const id = asId(templateId, 'template');
  const workspaceId = ctx.workspace.id;
  return withTenant(ctx, async (tx) => {
    const template = await lockTemplate(tx, workspaceId, id);
    const known = await findDraft(tx, workspaceId, id);
    if (known) return draftView(tx, known);
    const latest = await latestRevision(tx, workspaceId, id);
    const recipe = latest
      ? recipeFromRevision((await loadRevisionParts(tx, latest)).recipe.body)
      : recipeFromLibrary(await libraryDefaults(tx, ctx.studio.id));
    const draft = await insertDraft(tx, { workspaceId, templateId: id, recipe, authorId: ctx.person.id });
    await appendEntry(tx, ctx, {
      action: 'draft.opened',
      subjectKind: 'draft',
      subjectId: draft.id,
      detail: { templateId: id, number: template.number, after: latest?.letter ?? null },
    });
    await queueLive(tx, ctx, { name: 'draft.changed', data: { id: draft.id, templateId: id } });
    return draftView(tx, draft);
  });
}
