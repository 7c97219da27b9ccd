import { withTenant } from '@/db/tenant';
import { appendEntry } from '@/lib/audit/append-entry';
import type { JobContext } from '@/lib/auth/context';
import type { MeshUnit } from '@/lib/formability/recipe';
import { holdsJob, type Fence } from '@/lib/jobs/fence';
import { queueLive } from '@/lib/jobs/queue-live';
import { insertMesh } from './check-data';
import { changeUpload, lockUpload } from './upload-data';

export type ReadMesh = {
  /** Lower-case hex SHA-256 of the exact bytes in the store. */
  sha256: string;
  bytes: number;
  format: 'stl-binary' | 'stl-ascii' | '3mf' | 'step';
  /** That the file was read in: its own where it has one, the one that was given with it otherwise. */
  unit: MeshUnit;
  triangles: number;
  boundsMm: { min: number[]; max: number[] };
};

/**
 * Records that an uploaded file can be read: it becomes a mesh, under the key that it was sent to.
 * Changes nothing when the upload is no longer being read, or when another worker has the job.
 */
export async function acceptUpload(
  ctx: JobContext,
  fence: Fence,
  uploadId: string,
  mesh: ReadMesh,
): Promise<void> {
  await withTenant(ctx, async (tx) => {
    if (!(await holdsJob(tx, ctx, fence))) return;
    const upload = await lockUpload(tx, ctx.workspaceId, uploadId);
    if (upload.state !== 'reading') return;
    const meshId = await insertMesh(tx, {
      workspaceId: ctx.workspaceId,
      templateId: upload.templateId,
      fileName: upload.fileName,
      storeKey: upload.storeKey,
      createdBy: upload.createdBy,
      ...mesh,
    });
    await changeUpload(tx, upload, { state: 'ready', meshId });
    await appendEntry(tx, ctx, {
      action: 'upload.accepted',
      subjectKind: 'upload',
      subjectId: upload.id,
      detail: {
        templateId: upload.templateId,
        fileName: upload.fileName,
        sha256: mesh.sha256,
        bytes: mesh.bytes,
        triangles: mesh.triangles,
      },
    });
    await queueLive(tx, ctx, {
      name: 'upload.changed',
      data: { id: upload.id, templateId: upload.templateId },
    });
  });
}

/** Records why a file cannot be used: what is wrong, where, what to do. The draft stays. */
export async function refuseUpload(
  ctx: JobContext,
  fence: Fence,
  uploadId: string,
  refusal: { code: string; message: string; reasons: string[] },
): Promise<void> {
  await withTenant(ctx, async (tx) => {
    if (!(await holdsJob(tx, ctx, fence))) return;
    const upload = await lockUpload(tx, ctx.workspaceId, uploadId);
    if (upload.state !== 'reading') return;
    const kept = { ...refusal, reasons: refusal.reasons.slice(0, 20) };
    await changeUpload(tx, upload, { state: 'refused', refusal: kept });
    await appendEntry(tx, ctx, {
      action: 'upload.refused',
      subjectKind: 'upload',
      subjectId: upload.id,
      detail: { templateId: upload.templateId, fileName: upload.fileName, ...kept },
    });
    await queueLive(tx, ctx, {
      name: 'upload.changed',
      data: { id: upload.id, templateId: upload.templateId },
    });
  });
}
