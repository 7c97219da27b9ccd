import type { TenantTx } from '@/db/tenant';
import type { UploadView } from './schemas';
import { meshOfUpload, type UploadRow } from './upload-data';

/**
 * Bytes of one part; fixed, so that a reload finds the same parts. The least that S3 takes in all but the last (5 MiB),
 * because only whole parts are kept when sending breaks off.
 */
export const partBytes = 5 * 1024 * 1024;

export const partCountOf = (upload: Pick<UploadRow, 'bytes' | 'partBytes'>) =>
  Math.ceil(upload.bytes / upload.partBytes);

/** Bytes that part `number` (from 1) holds. */
export const bytesOfPart = (upload: Pick<UploadRow, 'bytes' | 'partBytes'>, number: number) =>
  Math.min(upload.partBytes, upload.bytes - (number - 1) * upload.partBytes);

export async function uploadView(tx: TenantTx, upload: UploadRow): Promise<UploadView> {
  const mesh = await meshOfUpload(tx, upload);
  return {
    id: upload.id,
    fileName: upload.fileName,
    bytes: upload.bytes,
    lastModified: upload.lastModified,
    unit: upload.unit as UploadView['unit'],
    partBytes: upload.partBytes,
    partCount: partCountOf(upload),
    partsDone: upload.parts.map((part) => part.number).sort((a, b) => a - b),
    state: upload.state,
    refusal: upload.refusal,
    mesh: mesh
      ? {
          id: mesh.id,
          sha256: mesh.sha256,
          format: mesh.format,
          unit: mesh.unit as UploadView['unit'],
          triangles: mesh.triangles,
          boundsMm: mesh.boundsMm,
        }
      : null,
  };
}
