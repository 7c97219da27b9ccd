import { withTenant } from '@/db/tenant';
import type { JobContext } from '@/lib/auth/context';
import type { MeshUnit } from '@/lib/formability/recipe';
import { findUpload } from './upload-data';

/** What a worker needs to read an uploaded file. Throws not_found for an upload that is not of the workspace. */
export async function loadUploadInput(ctx: JobContext, uploadId: string) {
  const upload = await withTenant(ctx, (tx) => findUpload(tx, ctx.workspaceId, uploadId));
  return {
    fileName: upload.fileName,
    bytes: upload.bytes,
    unit: upload.unit as MeshUnit,
    storeKey: upload.storeKey,
    state: upload.state,
  };
}
