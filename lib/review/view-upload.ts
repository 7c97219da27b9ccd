import { withTenant } from '@/db/tenant';
import { requirePermission, type WorkspaceContext } from '@/lib/auth/context';
import { asId } from './as-id';
import type { UploadView } from './schemas';
import { findUpload } from './upload-data';
import { uploadView } from './upload-view';

/** How far a file is: which parts the store has, whether it was read, why it was refused. */
export async function viewUpload(ctx: WorkspaceContext, uploadId: string): Promise<UploadView> {
  requirePermission(ctx, 'revision.post');
  const id = asId(uploadId, 'upload');
  return withTenant(ctx, async (tx) => uploadView(tx, await findUpload(tx, ctx.workspace.id, id)));
}
