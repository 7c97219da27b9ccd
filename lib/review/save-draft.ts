import { withTenant } from '@/db/tenant';
import { canonical, digestOf } from '@/lib/audit/canonical';
import { requirePermission, type WorkspaceContext } from '@/lib/auth/context';
import { conflict, invalid } from '@/lib/errors/app-error';
import { parseInput } from '@/lib/http/read-input';
import { queueLive } from '@/lib/jobs/queue-live';
import { asId } from './as-id';
import { changedMeanwhile } from './changed-meanwhile';
import { changeDraft, findDraft } from './draft-data';
import { draftView } from './draft-view';
import { lockTemplate } from './revision-data';
import { SaveDraftInput, type DraftView } from './schemas';
import { findUpload } from './upload-data';

const maxRecipeChars = 20_000;

/**
 * Saves a draft that is still at the version that the caller saw. It saves itself as one types, so this is the one
 * change without an audit entry: a draft is a working paper until posting puts its digests on the chain. The recipe may be half done: it is judged
 * when it is posted. Limits are the studio's and not part of it.
 */
export async function saveDraft(
  ctx: WorkspaceContext,
  templateId: string,
  input: unknown,
): Promise<DraftView> {
  requirePermission(ctx, 'revision.post');
  const { uploadId, recipe, note, version } = parseInput(SaveDraftInput, input);
  if (canonical(recipe).length > maxRecipeChars)
    throw invalid('The recipe is larger than a recipe can be.', [
      { pointer: '/recipe', detail: `At most ${maxRecipeChars} characters as JSON.` },
    ]);
  if ('limits' in recipe)
    throw invalid('Limits are not part of a draft.', [
      { pointer: '/recipe/limits', detail: 'A lead sets them for the whole studio, on its library page.' },
    ]);
  const id = asId(templateId, 'template');
  const workspaceId = ctx.workspace.id;
  return withTenant(ctx, async (tx) => {
    await lockTemplate(tx, workspaceId, id);
    const draft = await findDraft(tx, workspaceId, id, { lock: true });
    if (!draft) throw conflict('no-draft', 'There is no draft any more: it was posted or discarded. Reload.');
    if (draft.version !== version) throw changedMeanwhile('draft', draft.version);
    if (uploadId) await requireOwnUpload(tx, workspaceId, id, uploadId);
    const before = { uploadId: draft.uploadId, recipe: draft.recipe, note: draft.note };
    if (digestOf(before) === digestOf({ uploadId, recipe, note })) return draftView(tx, draft);
    const saved = await changeDraft(tx, draft, { uploadId, recipe, note, changedBy: ctx.person.id });
    await queueLive(tx, ctx, { name: 'draft.changed', data: { id: draft.id, templateId: id } });
    return draftView(tx, saved);
  });
}

async function requireOwnUpload(
  tx: Parameters<typeof findUpload>[0],
  workspaceId: string,
  templateId: string,
  uploadId: string,
): Promise<void> {
  const upload = await findUpload(tx, workspaceId, uploadId);
  if (upload.templateId !== templateId)
    throw invalid('This file was sent for another template.', [
      { pointer: '/uploadId', detail: 'Send the file here.' },
    ]);
}
