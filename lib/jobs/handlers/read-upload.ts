import { acceptUpload, refuseUpload } from '@/lib/review/record-upload';
import { loadUploadInput } from '@/lib/review/load-upload-input';
import { MissingObject } from '@/lib/storage/guard-store';
import { LengthMismatch, readObject } from '@/lib/storage/read-object';
import { store } from '@/lib/storage/store';
import type { JobHandler } from '../job-handler';

/** Reads a sent file: length, hash and format decide whether it may become a mesh. */
export const readUploadHandler: JobHandler = {
  timeLimitS: 300,

  async run({ ctx, job, fence, signal, engine, onProgress }) {
    const upload = await loadUploadInput(ctx, job.subjectId);
    if (upload.state !== 'reading') return;
    onProgress('reading', 0.1);
    try {
      const { bytes, sha256 } = await readObject(store(), upload.storeKey, upload.bytes, signal);
      onProgress('inspecting', 0.6);
      const answer = await engine.inspect({ bytes, unit: upload.unit }, signal);
      if (!answer.ok) {
        const { code, message, reasons } = answer;
        return await refuseUpload(ctx, fence, job.subjectId, { code, message, reasons });
      }
      const { format, unit, triangles, boundsMm } = answer.inspection;
      await acceptUpload(ctx, fence, job.subjectId, {
        sha256,
        bytes: upload.bytes,
        format,
        unit,
        triangles,
        boundsMm,
      });
    } catch (error) {
      const refusal = incomplete(error, upload.fileName);
      if (!refusal) throw error;
      await refuseUpload(ctx, fence, job.subjectId, refusal);
    }
  },

  giveUp: ({ ctx, job, fence }, reason) =>
    refuseUpload(ctx, fence, job.subjectId, {
      code: 'not_read',
      message: `The file could not be read: ${reason} Send it again; the draft is kept.`,
      reasons: [],
    }),
};

function incomplete(error: unknown, fileName: string) {
  if (error instanceof LengthMismatch)
    return {
      code: 'incomplete',
      message: `${fileName} arrived with ${error.found} of ${error.expected} bytes. Send it again.`,
      reasons: [],
    };
  if (error instanceof MissingObject)
    return {
      code: 'missing',
      message: `${fileName} did not arrive in the store. Send it again.`,
      reasons: [],
    };
  return null;
}
