import { withTenant } from '@/db/tenant';
import type { JobContext } from '@/lib/auth/context';
import { log } from '@/lib/log/log';
import { workspaceChannel } from '@/realtime/channels';
import { publish } from '@/realtime/publish';
import type { OnProgress } from './engine-pool';
import { writeProgress, type JobRow } from './jobs-data';

const everyMs = 500;

/**
 * Progress of one job: into its row and straight to the open pages, at most twice a second. Progress is
 * worth nothing later, so it skips the outbox, and what cannot be sent is dropped.
 */
export function progressReporter(ctx: JobContext, job: JobRow): OnProgress {
  let last = 0;
  let busy = false;
  return (stage, fraction) => {
    const now = Date.now();
    if (busy || now - last < everyMs) return;
    busy = true;
    last = now;
    const progress = Math.min(1, Math.max(0, fraction));
    send(ctx, job, stage, progress)
      .catch((error) => log().debug({ err: error, job: job.id }, 'progress not sent'))
      .finally(() => (busy = false));
  };
}

async function send(ctx: JobContext, job: JobRow, stage: string, progress: number): Promise<void> {
  const held = { workspaceId: job.workspaceId, jobId: job.id, attempt: job.attempt, stage, progress };
  if (!(await withTenant(ctx, (tx) => writeProgress(tx, held)))) return;
  await publish([
    {
      channel: workspaceChannel(job.workspaceId),
      name: 'job.progressed',
      data: { id: job.id, subjectId: job.subjectId, stage: stage.slice(0, 60), progress },
    },
  ]);
}
