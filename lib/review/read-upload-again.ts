import { withTenant } from '@/db/tenant';
import { appendEntry } from '@/lib/audit/append-entry';
import { digestOf } from '@/lib/audit/canonical';
import { requirePermission, type WorkspaceContext } from '@/lib/auth/context';
import { conflict } from '@/lib/errors/app-error';
import { parseInput } from '@/lib/http/read-input';
import { enqueueJob } from '@/lib/jobs/enqueue-job';
import { queueLive } from '@/lib/jobs/queue-live';
import { asId } from './as-id';
import { hasOwnUnit } from './mesh-format';
import { UploadUnitInput, type UploadView } from './schemas';
import { changeUpload, lockUpload, meshOfUpload } from './upload-data';
import { uploadView } from './upload-view';

/**
 * Has a file that was read be read in another unit of length, without sending it again: the bytes are in the store.
 * A mesh that a revision was posted with keeps its unit; this makes another one. Files that name their unit keep it.
 */
export async function readUploadAgain(
  ctx: WorkspaceContext,
  uploadId: string,
  input: unknown,
): Promise<UploadView> {
  requirePermission(ctx, 'revision.post');
  const { unit } = parseInput(UploadUnitInput, input);
  const id = asId(uploadId, 'upload');
  return withTenant(ctx, async (tx) => {
    const upload = await lockUpload(tx, ctx.workspace.id, id);
    if (upload.unit === unit && (upload.state === 'ready' || upload.state === 'reading'))
      return uploadView(tx, upload);
    const mesh = await meshOfUpload(tx, upload);
    // Refused for its size only: in another unit it may be a template.
    const misread = upload.state === 'refused' && upload.refusal?.code === 'out_of_range';
    if (upload.state !== 'ready' && !misread)
      throw conflict(
        'upload-not-ready',
        'Only a file that was read can be read in another unit. Wait for it, or send it anew.',
      );
    if (mesh && hasOwnUnit(mesh.format))
      throw conflict(
        'own-unit',
        `This file says itself that it is in ${mesh.unit}. Export it in another unit and send that.`,
      );
    const reading = await changeUpload(tx, upload, { state: 'reading', unit, meshId: null, refusal: null });
    await enqueueJob(tx, ctx, {
      kind: 'read-upload',
      subjectId: id,
      inputDigest: digestOf({ storeKey: upload.storeKey, bytes: upload.bytes, unit }),
    });
    await appendEntry(tx, ctx, {
      action: 'upload.read-again',
      subjectKind: 'upload',
      subjectId: id,
      detail: { templateId: upload.templateId, fileName: upload.fileName, from: upload.unit, to: unit },
    });
    await queueLive(tx, ctx, { name: 'upload.changed', data: { id, templateId: upload.templateId } });
    return uploadView(tx, reading);
  });
}
