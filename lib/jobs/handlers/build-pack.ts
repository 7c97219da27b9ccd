import { buildPack, PackRefused } from '@/lib/production/build-pack';
import { tellPackFailed } from '@/lib/production/tell-pack-failed';
import { PermanentFailure } from '../job-errors';
import type { JobHandler } from '../job-handler';

/** Builds the pack of a release. */
export const buildPackHandler: JobHandler = {
  timeLimitS: 600,

  async run({ ctx, job, fence, signal, onProgress }) {
    onProgress('packing', 0.1);
    try {
      await buildPack(ctx, fence, job.subjectId, signal);
    } catch (error) {
      if (error instanceof PackRefused) throw new PermanentFailure(error.message);
      throw error;
    }
  },

  giveUp: ({ ctx, job, fence }, reason) => tellPackFailed(ctx, fence, job.subjectId, reason),
};
