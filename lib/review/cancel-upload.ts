import { withTenant } from '@/db/tenant';
import { appendEntry } from '@/lib/audit/append-entry';
import { requirePermission, type WorkspaceContext } from '@/lib/auth/context';
import { queueLive } from '@/lib/jobs/queue-live';
import { store } from '@/lib/storage/store';
import { asId } from './as-id';
import { requireSender } from './require-sending';
import type { UploadView } from './schemas';
import { changeUpload, lockUpload } from './upload-data';
import { uploadView } from './upload-view';

/**
 * Gives up a file that is still on its way; only its sender may. One that has come to its end stays as it is,
 * whoever asks. Asked twice, it answers the same.
 */
export async function cancelUpload(ctx: WorkspaceContext, uploadId: string): Promise<UploadView> {
  requirePermission(ctx, 'revision.post');
  const id = asId(uploadId, 'upload');
  const { view, abort } = await withTenant(ctx, async (tx) => {
    const upload = await lockUpload(tx, ctx.workspace.id, id);
    // Nothing is on its way any more: a draft that no longer wants the file names another one or none.
    if (upload.state !== 'sending' && upload.state !== 'reading')
      return { view: await uploadView(tx, upload), abort: null };
    requireSender(ctx, upload);
    const { templateId } = upload;
    const cancelled = await changeUpload(tx, upload, { state: 'cancelled' });
    await appendEntry(tx, ctx, {
      action: 'upload.cancelled',
      subjectKind: 'upload',
      subjectId: id,
      detail: { templateId, fileName: upload.fileName },
    });
    await queueLive(tx, ctx, { name: 'upload.changed', data: { id, templateId } });
    return { view: await uploadView(tx, cancelled), abort: upload.state === 'sending' ? upload : null };
  });
  if (abort) await store().abortMultipart(abort.storeKey, abort.multipartId);
  return view;
}
