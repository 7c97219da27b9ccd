import type { TenantTx } from '@/db/tenant';
import { workspaceIdOf, type JobContext } from '@/lib/auth/context';
import { lockAttempt } from './jobs-data';

/** Which try of which job writes. A later try has a higher number, and the earlier one writes nothing more. */
export type Fence = { jobId: string; attempt: number };

/**
 * Whether this try still holds the job; its row is locked until the transaction ends, so that no other try
 * can begin between the question and the write. Asked first in every transaction of a handler.
 */
export async function holdsJob(tx: TenantTx, ctx: JobContext, fence: Fence): Promise<boolean> {
  return lockAttempt(tx, { workspaceId: workspaceIdOf(ctx), ...fence });
}
