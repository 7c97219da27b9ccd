import { withTenant } from '@/db/tenant';
import { jobContext } from '@/lib/auth/context';
import { AppError } from '@/lib/errors/app-error';
import { log } from '@/lib/log/log';
import type { EnginePool } from './engine-pool';
import { sendMessage, type JobMessage } from './enqueue-job';
import { JobStopped, PermanentFailure, reasonOf } from './job-errors';
import type { JobAtWork, JobHandler } from './job-handler';
import {
  claimJob,
  leaseS,
  markDone,
  markFailed,
  markQueued,
  renewLease,
  triesAllowed,
  type JobKind,
} from './jobs-data';
import { progressReporter } from './report-progress';

const heartbeatMs = 10_000;
/** Age up to which a job waits for a service that is away without spending a try, and its longest pause. */
const patienceMs = 60 * 60_000;
const longestPauseS = 90;

export type JobRunner = {
  worker: string;
  engine: EnginePool;
  handlers: Record<JobKind, JobHandler>;
  /** Aborted when this process stops. */
  stopping: AbortSignal;
};

/**
 * One message of the queue: takes the job if it is to be had, keeps its lease alive, runs its handler and
 * settles the row. Never throws for a job's own failure; a message for a job that is settled or held is dropped.
 */
export async function runJob(message: JobMessage, runner: JobRunner): Promise<void> {
  const ctx = jobContext(message.workspaceId);
  if (runner.stopping.aborted) return;
  const job = await withTenant(ctx, (tx) => claimJob(tx, { ...message, worker: runner.worker }));
  if (!job) return;
  const fence = { jobId: job.id, attempt: job.attempt };
  const handler = runner.handlers[job.kind];
  const stop = new AbortController();
  const halt = (why: JobStopped['why']) => () => stop.abort(new JobStopped(why));
  const work: JobAtWork = {
    ctx,
    job,
    fence,
    signal: stop.signal,
    engine: runner.engine,
    onProgress: progressReporter(ctx, job),
  };
  if (job.attempt - job.handedBack > triesAllowed) {
    const reason = job.error ?? `The worker stopped ${triesAllowed} times in the middle of it.`;
    return giveUp(work, handler, reason);
  }

  const onStopping = halt('worker-stops');
  runner.stopping.addEventListener('abort', onStopping, { once: true });
  const limit = setTimeout(halt('time-limit'), handler.timeLimitS * 1000);
  const endHeartbeat = startHeartbeat(work, halt('lease-lost'));
  try {
    await untilStopped(handler.run(work), stop.signal);
    const held = { workspaceId: job.workspaceId, ...fence };
    const done = await withTenant(ctx, (tx) => markDone(tx, held));
    if (!done) throw new JobStopped('lease-lost');
    log().info({ job: job.id, kind: job.kind, attempt: job.attempt }, 'job done');
  } catch (error) {
    await settleFailure(work, handler, stop.signal.aborted ? stop.signal.reason : error);
  } finally {
    clearTimeout(limit);
    endHeartbeat();
    runner.stopping.removeEventListener('abort', onStopping);
  }
}

/**
 * The work's end, or the signal's reason as soon as it fires: a handler that hangs does not hold up the hand-over.
 * What it may still do afterwards is fenced out.
 */
async function untilStopped(work: Promise<void>, signal: AbortSignal): Promise<void> {
  let onAbort: () => void = () => undefined;
  const stopped = new Promise<never>((_, reject) => {
    onAbort = () => reject(signal.reason);
    signal.addEventListener('abort', onAbort, { once: true });
  });
  try {
    signal.throwIfAborted();
    await Promise.race([work, stopped]);
  } finally {
    signal.removeEventListener('abort', onAbort);
    work.catch(() => undefined);
    stopped.catch(() => undefined);
  }
}

/** Renews the lease; stops the work once another try could begin, also when the database cannot be asked. */
function startHeartbeat({ ctx, job, fence }: JobAtWork, lost: () => void): () => void {
  const held = { workspaceId: job.workspaceId, ...fence };
  let goodUntil = Date.now() + leaseS * 1000;
  const timer = setInterval(() => {
    const asked = Date.now();
    withTenant(ctx, (tx) => renewLease(tx, held)).then(
      (still) => (still ? (goodUntil = asked + leaseS * 1000) : lost()),
      () => Date.now() > goodUntil && lost(),
    );
  }, heartbeatMs);
  return () => clearInterval(timer);
}

async function settleFailure(work: JobAtWork, handler: JobHandler, error: unknown): Promise<void> {
  const { job } = work;
  const stopped = error instanceof JobStopped ? error.why : null;
  if (stopped === 'lease-lost') return void log().warn({ job: job.id }, 'job left to another try');
  if (stopped === 'worker-stops') return requeue(work, { error: job.error, unspent: true, afterS: 0 });

  log().error({ job: job.id, kind: job.kind, attempt: job.attempt, err: error }, 'job failed');
  const tries = job.attempt - job.handedBack;
  // A store that is away says nothing against the job: it waits, for as long as an outage may reasonably last.
  const young = Date.now() - job.createdAt.getTime() < patienceMs;
  if (error instanceof AppError && error.code === 'unavailable' && young)
    return requeue(work, {
      error: reasonOf(error),
      unspent: true,
      afterS: Math.min(2 ** job.attempt, longestPauseS),
    });
  if (error instanceof PermanentFailure || tries >= triesAllowed)
    return giveUp(work, handler, reasonOf(error));
  await requeue(work, { error: reasonOf(error), unspent: false, afterS: 2 ** tries });
}

async function requeue(
  { ctx, job, fence }: JobAtWork,
  { error, unspent, afterS }: { error: string | null; unspent: boolean; afterS: number },
): Promise<void> {
  const { workspaceId } = job;
  await withTenant(ctx, async (tx) => {
    if (!(await markQueued(tx, { workspaceId, ...fence, error, unspent }))) return;
    await sendMessage(tx, job.kind, { workspaceId, jobId: job.id }, afterS);
  });
}

/** How often those concerned are tried to be told before the job is closed without them. */
const farewells = 10;

/**
 * The people concerned are told first. Where that fails, or this process dies in between, the job stays held:
 * its lease runs out, and the next try comes straight here.
 */
async function giveUp(work: JobAtWork, handler: JobHandler, reason: string): Promise<void> {
  const { ctx, job, fence } = work;
  try {
    await handler.giveUp(work, reason);
  } catch (error) {
    if (job.attempt - job.handedBack < triesAllowed + farewells) throw error;
    log().error({ err: error, job: job.id }, 'job closed without telling those concerned');
  }
  await withTenant(ctx, (tx) => markFailed(tx, { workspaceId: job.workspaceId, ...fence, error: reason }));
}
