import { withTenant } from '@/db/tenant';
import { requirePermission, type WorkspaceContext } from '@/lib/auth/context';
import { invalid } from '@/lib/errors/app-error';
import { parseInput } from '@/lib/http/read-input';
import { store } from '@/lib/storage/store';
import type { z } from 'zod';
import { asId } from './as-id';
import { requireSending } from './require-sending';
import { PresignPartsInput, type PresignedParts } from './schemas';
import { findUpload } from './upload-data';
import { bytesOfPart, partCountOf } from './upload-view';

/** Addresses in the store for some parts of a file, each for exactly its bytes and for a quarter of an hour. */
export async function presignParts(
  ctx: WorkspaceContext,
  uploadId: string,
  input: unknown,
): Promise<z.output<typeof PresignedParts>> {
  requirePermission(ctx, 'revision.post');
  const { parts } = parseInput(PresignPartsInput, input);
  const id = asId(uploadId, 'upload');
  const upload = await withTenant(ctx, (tx) => findUpload(tx, ctx.workspace.id, id));
  requireSending(ctx, upload);
  const last = partCountOf(upload);
  const beyond = parts.findIndex((number) => number > last);
  if (beyond >= 0)
    throw invalid('The file has no such part.', [
      { pointer: `/parts/${beyond}`, detail: `Parts are numbered from 1 to ${last}.` },
    ]);
  const made = [...new Set(parts)].map(async (number) => {
    const bytes = bytesOfPart(upload, number);
    return {
      number,
      bytes,
      url: await store().presignPart(upload.storeKey, upload.multipartId, number, bytes),
    };
  });
  return { parts: await Promise.all(made) };
}
