import { withTenant, type TenantTx } from '@/db/tenant';
import { appendEntry } from '@/lib/audit/append-entry';
import { digestOf } from '@/lib/audit/canonical';
import { requirePermission, type WorkspaceContext } from '@/lib/auth/context';
import { conflict } from '@/lib/errors/app-error';
import { enqueueJob } from '@/lib/jobs/enqueue-job';
import { queueLive } from '@/lib/jobs/queue-live';
import { isPartAmiss, MissingObject } from '@/lib/storage/guard-store';
import { store } from '@/lib/storage/store';
import { asId } from './as-id';
import { requireSender, requireSending } from './require-sending';
import type { UploadView } from './schemas';
import { changeUpload, findUpload, lockUpload, type UploadRow } from './upload-data';
import { partCountOf, uploadView } from './upload-view';

/** Joins the parts in the store and has the file read by a worker. Asked twice, it answers the same. */
export async function completeUpload(ctx: WorkspaceContext, uploadId: string): Promise<UploadView> {
  requirePermission(ctx, 'revision.post');
  const id = asId(uploadId, 'upload');
  const workspaceId = ctx.workspace.id;
  const upload = await withTenant(ctx, (tx) => findUpload(tx, workspaceId, id));
  requireSender(ctx, upload);
  if (upload.state === 'reading' || upload.state === 'ready')
    return withTenant(ctx, (tx) => uploadView(tx, upload));
  requireSending(ctx, upload);
  const missing = partCountOf(upload) - upload.parts.length;
  if (missing > 0)
    throw conflict(
      'parts-missing',
      `The store does not have the whole file yet: ${missing} of ${partCountOf(upload)} parts are missing. Send them first.`,
    );
  const files = store();
  try {
    await files.completeMultipart(upload.storeKey, upload.multipartId, upload.parts);
  } catch (error) {
    if (isPartAmiss(error)) return forgetParts(ctx, id);
    if (error instanceof MissingObject) return refuseLost(ctx, id);
    throw error;
  }
  const there = await files.head(upload.storeKey);
  return withTenant(ctx, async (tx) => {
    const now = await lockUpload(tx, workspaceId, id);
    if (now.state === 'reading' || now.state === 'ready') return uploadView(tx, now);
    requireSending(ctx, now);
    if (there?.bytes !== upload.bytes)
      return refuse(tx, ctx, now, {
        code: 'length',
        message: `The store received ${there?.bytes ?? 0} bytes, but the file was announced with ${upload.bytes}. Send it again.`,
      });
    const reading = await changeUpload(tx, now, { state: 'reading' });
    await enqueueJob(tx, ctx, {
      kind: 'read-upload',
      subjectId: id,
      inputDigest: digestOf({ storeKey: upload.storeKey, bytes: upload.bytes, unit: upload.unit }),
    });
    await appendEntry(tx, ctx, {
      action: 'upload.completed',
      subjectKind: 'upload',
      subjectId: id,
      detail: { templateId: upload.templateId, fileName: upload.fileName, bytes: upload.bytes },
    });
    await queueLive(tx, ctx, { name: 'upload.changed', data: { id, templateId: upload.templateId } });
    return uploadView(tx, reading);
  });
}

/** The store has other parts than we were told: all are sent again, under the same upload. */
async function forgetParts(ctx: WorkspaceContext, id: string): Promise<UploadView> {
  const joined = await withTenant(ctx, async (tx) => {
    const now = await lockUpload(tx, ctx.workspace.id, id);
    if (now.state === 'reading' || now.state === 'ready') return uploadView(tx, now);
    requireSending(ctx, now);
    await changeUpload(tx, now, { parts: [] });
    return null;
  });
  if (joined) return joined;
  throw conflict(
    'parts-missing',
    'The store does not have the parts of this file as they were sent. Send them again.',
  );
}

/** The store knows nothing of this upload any more: it was cleared away there before it was complete. */
async function refuseLost(ctx: WorkspaceContext, id: string): Promise<UploadView> {
  return withTenant(ctx, async (tx) => {
    const now = await lockUpload(tx, ctx.workspace.id, id);
    if (now.state === 'reading' || now.state === 'ready') return uploadView(tx, now);
    requireSending(ctx, now);
    return refuse(tx, ctx, now, {
      code: 'lost',
      message: 'The store no longer has the parts of this file: sending took too long. Send it again.',
    });
  });
}

async function refuse(
  tx: TenantTx,
  ctx: WorkspaceContext,
  upload: UploadRow,
  why: { code: string; message: string },
): Promise<UploadView> {
  const refusal = { ...why, reasons: [] };
  const refused = await changeUpload(tx, upload, { state: 'refused', refusal });
  await appendEntry(tx, ctx, {
    action: 'upload.refused',
    subjectKind: 'upload',
    subjectId: upload.id,
    detail: { templateId: upload.templateId, fileName: upload.fileName, ...refusal },
  });
  await queueLive(tx, ctx, {
    name: 'upload.changed',
    data: { id: upload.id, templateId: upload.templateId },
  });
  return uploadView(tx, refused);
}
