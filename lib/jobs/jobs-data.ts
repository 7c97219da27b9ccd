import { and, eq, lt, or, sql } from 'drizzle-orm';
import { jobs } from '@/db/schema/checks';
import type { TenantTx } from '@/db/tenant';

export type JobRow = typeof jobs.$inferSelect;
export type JobKind = JobRow['kind'];
type Named = { workspaceId: string; jobId: string };
type Held = Named & { attempt: number };

export const leaseS = 30;
/** Tries before a job is given up; those that were handed back unspent do not count. */
export const triesAllowed = 3;

const named = ({ workspaceId, jobId }: Named) => and(eq(jobs.workspaceId, workspaceId), eq(jobs.id, jobId));
/** The job as this try holds it; a later try has raised `attempt`. */
const held = (h: Held) => and(named(h), eq(jobs.attempt, h.attempt), eq(jobs.state, 'running'));
const leaseEnd = sql`clock_timestamp() + make_interval(secs => ${leaseS})`;
const now = sql`clock_timestamp()`;

export async function insertJob(tx: TenantTx, row: typeof jobs.$inferInsert): Promise<string> {
  const [made] = await tx.insert(jobs).values(row).returning({ id: jobs.id });
  return made.id;
}

export async function readJob(tx: TenantTx, job: Named): Promise<JobRow | null> {
  const [row] = await tx.select().from(jobs).where(named(job));
  return row ?? null;
}

/** The latest job of a kind about a subject, e.g. the pack of a release. */
export async function latestJobOf(
  tx: TenantTx,
  { workspaceId, kind, subjectId }: { workspaceId: string; kind: JobKind; subjectId: string },
): Promise<JobRow | null> {
  const [row] = await tx
    .select()
    .from(jobs)
    .where(and(eq(jobs.workspaceId, workspaceId), eq(jobs.kind, kind), eq(jobs.subjectId, subjectId)))
    .orderBy(sql`${jobs.createdAt} desc, ${jobs.id} desc`)
    .limit(1);
  return row ?? null;
}

/** Takes a job that waits, or whose worker fell silent, under a new attempt number. Null: nothing to take. */
export async function claimJob(tx: TenantTx, job: Named & { worker: string }): Promise<JobRow | null> {
  const silent = and(eq(jobs.state, 'running'), lt(jobs.leaseUntil, now));
  const [row] = await tx
    .update(jobs)
    .set({
      state: 'running',
      attempt: sql`${jobs.attempt} + 1`,
      leaseUntil: leaseEnd,
      worker: job.worker,
      startedAt: sql`coalesce(${jobs.startedAt}, ${now})`,
      stage: null,
      progress: 0,
    })
    .where(and(named(job), or(eq(jobs.state, 'queued'), silent)))
    .returning();
  return row ?? null;
}

/** Prolongs the lease. False: the job was taken over, cancelled or settled, and this try must stop. */
export async function renewLease(tx: TenantTx, job: Held): Promise<boolean> {
  const rows = await tx
    .update(jobs)
    .set({ leaseUntil: leaseEnd })
    .where(held(job))
    .returning({ id: jobs.id });
  return rows.length > 0;
}

/** Locks the row and says whether this try still holds it. */
export async function lockAttempt(tx: TenantTx, job: Held): Promise<boolean> {
  const rows = await tx.select({ id: jobs.id }).from(jobs).where(held(job)).for('update');
  return rows.length > 0;
}

export async function writeProgress(
  tx: TenantTx,
  job: Held & { stage: string; progress: number },
): Promise<boolean> {
  const rows = await tx
    .update(jobs)
    .set({ stage: job.stage, progress: job.progress })
    .where(held(job))
    .returning({ id: jobs.id });
  return rows.length > 0;
}

export async function markDone(tx: TenantTx, job: Held): Promise<boolean> {
  const rows = await tx
    .update(jobs)
    .set({ state: 'done', leaseUntil: null, progress: 1, stage: null, error: null, finishedAt: now })
    .where(held(job))
    .returning({ id: jobs.id });
  return rows.length > 0;
}

/** Back to the queue: after a failed try, or unspent, from a worker that stops or finds a service away. */
export async function markQueued(
  tx: TenantTx,
  job: Held & { error: string | null; unspent: boolean },
): Promise<boolean> {
  const rows = await tx
    .update(jobs)
    .set({
      state: 'queued',
      leaseUntil: null,
      worker: null,
      stage: null,
      progress: 0,
      error: job.error,
      handedBack: sql`${jobs.handedBack} + ${job.unspent ? 1 : 0}`,
    })
    .where(held(job))
    .returning({ id: jobs.id });
  return rows.length > 0;
}

export async function markFailed(tx: TenantTx, job: Held & { error: string }): Promise<boolean> {
  const rows = await tx
    .update(jobs)
    .set({ state: 'failed', leaseUntil: null, error: job.error, finishedAt: now })
    .where(held(job))
    .returning({ id: jobs.id });
  return rows.length > 0;
}

/** Stops a job that is no longer wanted; a worker in the middle of it finds out at its next heartbeat. */
export async function markCancelled(tx: TenantTx, job: Named): Promise<boolean> {
  const rows = await tx
    .update(jobs)
    .set({ state: 'cancelled', leaseUntil: null, finishedAt: now })
    .where(and(named(job), or(eq(jobs.state, 'queued'), eq(jobs.state, 'running'))))
    .returning({ id: jobs.id });
  return rows.length > 0;
}

/** Whether the queue holds a message for this job that nobody has fetched yet. */
export async function hasWaitingMessage(tx: TenantTx, kind: JobKind, jobId: string): Promise<boolean> {
  const { rows } = await tx.execute(sql`select 1 from pgboss.job
    where name = ${kind} and state in ('created', 'retry') and data->>'jobId' = ${jobId} limit 1`);
  return rows.length > 0;
}

/** Runs pg-boss's own statements inside the caller's transaction. */
export function bossExecutor(tx: TenantTx) {
  return {
    async executeSql(text: string, values: unknown[] = []) {
      // pg-boss speaks $1, $2 …; drizzle's raw client of this transaction takes the same text.
      const session = (
        tx as unknown as {
          session: { client: { query(t: string, v: unknown[]): Promise<{ rows: unknown[] }> } };
        }
      ).session;
      const { rows } = await session.client.query(text, values);
      return { rows: rows as never[], rowCount: rows.length };
    },
  };
}
