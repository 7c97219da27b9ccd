import { withTenant } from '@/db/tenant';
import { requirePermission, type WorkspaceContext } from '@/lib/auth/context';
import { invalid } from '@/lib/errors/app-error';
import { parseInput } from '@/lib/http/read-input';
import { asId } from './as-id';
import { requireSending } from './require-sending';
import { PartDoneInput, type UploadView } from './schemas';
import { changeUpload, lockUpload } from './upload-data';
import { partCountOf, uploadView } from './upload-view';

/**
 * Remembers that the store has a part, so that a reload goes on from there. Bookkeeping of the transfer, not a
 * change of the record: no audit entry. The store itself checks the ETags when the parts are joined.
 */
export async function markPartDone(
  ctx: WorkspaceContext,
  uploadId: string,
  input: unknown,
): Promise<UploadView> {
  requirePermission(ctx, 'revision.post');
  const { number, etag } = parseInput(PartDoneInput, input);
  const id = asId(uploadId, 'upload');
  return withTenant(ctx, async (tx) => {
    const upload = await lockUpload(tx, ctx.workspace.id, id);
    requireSending(ctx, upload);
    const last = partCountOf(upload);
    if (number > last)
      throw invalid('The file has no such part.', [
        { pointer: '/number', detail: `Parts are numbered from 1 to ${last}.` },
      ]);
    const parts = [...upload.parts.filter((part) => part.number !== number), { number, etag }];
    return uploadView(tx, await changeUpload(tx, upload, { parts }));
  });
}
