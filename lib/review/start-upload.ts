import { withTenant } from '@/db/tenant';
import { appendEntry } from '@/lib/audit/append-entry';
import { requirePermission, type WorkspaceContext } from '@/lib/auth/context';
import { AppError } from '@/lib/errors/app-error';
import { parseInput } from '@/lib/http/read-input';
import { queueLive } from '@/lib/jobs/queue-live';
import { uploadKey } from '@/lib/storage/keys';
import { store } from '@/lib/storage/store';
import { asId } from './as-id';
import { UNREAD_MEDIA_TYPE } from './mesh-format';
import { StartUploadInput, type UploadView } from './schemas';
import { findTemplate } from './template-data';
import { countUnfinished, insertUpload } from './upload-data';
import { partBytes, uploadView } from './upload-view';

const mostUnfinished = 20;

/** Begins sending a file straight to the store. Its size is fixed here; each part's address is signed for its length. */
export async function startUpload(
  ctx: WorkspaceContext,
  templateId: string,
  input: unknown,
): Promise<UploadView> {
  requirePermission(ctx, 'revision.post');
  const { fileName, bytes, unit, lastModified } = parseInput(StartUploadInput, input);
  const id = asId(templateId, 'template');
  const workspaceId = ctx.workspace.id;
  await withTenant(ctx, async (tx) => {
    await findTemplate(tx, workspaceId, id);
    if ((await countUnfinished(tx, workspaceId, ctx.person.id)) >= mostUnfinished)
      throw new AppError(
        'limit_exceeded',
        `You began ${mostUnfinished} files within a day that were not sent to their end. Finish or cancel some of them, or come back tomorrow.`,
        { reason: 'too-many-uploads' },
      );
  });
  const storeKey = uploadKey(workspaceId);
  const multipartId = await store().startMultipart(storeKey, UNREAD_MEDIA_TYPE);
  return withTenant(ctx, async (tx) => {
    const upload = await insertUpload(tx, {
      workspaceId,
      templateId: id,
      fileName,
      bytes,
      lastModified,
      unit,
      storeKey,
      multipartId,
      partBytes,
      createdBy: ctx.person.id,
    });
    await appendEntry(tx, ctx, {
      action: 'upload.started',
      subjectKind: 'upload',
      subjectId: upload.id,
      detail: { templateId: id, fileName, bytes, unit },
    });
    await queueLive(tx, ctx, { name: 'upload.changed', data: { id: upload.id, templateId: id } });
    return uploadView(tx, upload);
  });
}
