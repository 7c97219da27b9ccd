import type { TenantTx } from '@/db/tenant';
import { lastEditor, type DraftRow } from './draft-data';
import { revisionLetter } from './letters';
import { latestRevision } from './revision-data';
import type { DraftView } from './schemas';
import { findUpload } from './upload-data';
import { uploadView } from './upload-view';

/** A draft with its upload and the letter that posting would give it. */
export async function draftView(tx: TenantTx, draft: DraftRow): Promise<DraftView> {
  const latest = await latestRevision(tx, draft.workspaceId, draft.templateId);
  const upload = draft.uploadId ? await findUpload(tx, draft.workspaceId, draft.uploadId) : null;
  return {
    id: draft.id,
    templateId: draft.templateId,
    nextLetter: revisionLetter(latest?.ordinal ?? 0),
    recipe: draft.recipe,
    note: draft.note,
    upload: upload ? await uploadView(tx, upload) : null,
    version: draft.version,
    changedAt: draft.changedAt.toISOString(),
    changedBy: await lastEditor(tx, draft),
  };
}
