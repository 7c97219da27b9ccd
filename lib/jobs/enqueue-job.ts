import type { TenantTx } from '@/db/tenant';
import { workspaceIdOf, type JobContext, type WorkspaceContext } from '@/lib/auth/context';
import { boss } from './boss';
import { bossExecutor, insertJob, type JobKind } from './jobs-data';

/** Message on the queue: ids only; the worker reads the rest as the workspace. */
export type JobMessage = { workspaceId: string; jobId: string };

/** Writes a job and its queue message in the caller's transaction: both stand after commit, or neither. */
export async function enqueueJob(
  tx: TenantTx,
  ctx: WorkspaceContext | JobContext,
  job: { kind: JobKind; subjectId: string; inputDigest: string },
): Promise<string> {
  const workspaceId = workspaceIdOf(ctx);
  const jobId = await insertJob(tx, { workspaceId, ...job });
  await sendMessage(tx, job.kind, { workspaceId, jobId });
  return jobId;
}

/** Puts a message about a job on the queue, in the caller's transaction. */
export async function sendMessage(
  tx: TenantTx,
  kind: JobKind,
  { workspaceId, jobId }: JobMessage,
  afterS = 0,
): Promise<void> {
  const message: JobMessage = { workspaceId, jobId };
  await (await boss()).send(kind, message, { startAfter: afterS, db: bossExecutor(tx) });
}
