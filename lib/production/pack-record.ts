import type { PackRow } from './production-data';

/** A pack as the audit chain keeps it, field by field. */
export const packRecord = ({
  id,
  releaseId,
  fileName,
  storeKey,
  bytes,
  sha256,
  files,
  createdAt,
}: PackRow) => ({
  id,
  releaseId,
  fileName,
  storeKey,
  bytes,
  sha256,
  files,
  createdAt: createdAt.toISOString(),
});
