import { and, asc, eq, lt, or, sql } from 'drizzle-orm';
import { relayDatabase } from '@/db/client';
import { jobs } from '@/db/schema/checks';
import { gates } from '@/db/schema/gates';

const waitedLongS = 30;

/** Jobs of every workspace whose worker fell silent, or that nobody has picked up. Ids and states only. */
export async function neglectedJobs(limit: number) {
  const silent = and(eq(jobs.state, 'running'), lt(jobs.leaseUntil, sql`clock_timestamp()`));
  const waiting = and(
    eq(jobs.state, 'queued'),
    lt(jobs.createdAt, sql`clock_timestamp() - make_interval(secs => ${waitedLongS})`),
  );
  return relayDatabase()
    .select({ id: jobs.id, workspaceId: jobs.workspaceId, kind: jobs.kind, state: jobs.state })
    .from(jobs)
    .where(or(silent, waiting))
    .orderBy(asc(jobs.createdAt))
    .limit(limit);
}

/** Workspaces where a gate is open. Ids only: what the gates are about is read as a job of each. */
export async function workspacesWithOpenGates(): Promise<string[]> {
  const rows = await relayDatabase()
    .selectDistinct({ workspaceId: gates.workspaceId })
    .from(gates)
    .where(eq(gates.state, 'open'))
    .orderBy(asc(gates.workspaceId));
  return rows.map((row) => row.workspaceId);
}
