import { withTenant } from '@/db/tenant';
import { jobContext } from '@/lib/auth/context';
import { log } from '@/lib/log/log';
import { sendMessage } from './enqueue-job';
import { hasWaitingMessage } from './jobs-data';
import { neglectedJobs } from './sweep-data';

/**
 * Puts jobs back on the queue whose worker was killed or whose message was lost. Claiming decides who gets
 * one, so two sweeps at once do no harm.
 */
export async function sweepJobs(): Promise<number> {
  let sent = 0;
  for (const job of await neglectedJobs(200)) {
    sent += await withTenant(jobContext(job.workspaceId), async (tx) => {
      if (await hasWaitingMessage(tx, job.kind, job.id)) return 0;
      await sendMessage(tx, job.kind, { workspaceId: job.workspaceId, jobId: job.id });
      return 1;
    });
  }
  if (sent) log().warn({ jobs: sent }, 'neglected jobs put back on the queue');
  return sent;
}
