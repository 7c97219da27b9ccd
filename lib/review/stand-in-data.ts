import { and, asc, eq, gte, isNull, lte, sql } from 'drizzle-orm';
import { standIns } from '@/db/schema/gates';
import { workspaces } from '@/db/schema/workspaces';
import type { TenantTx } from '@/db/tenant';

export type StandInRow = typeof standIns.$inferSelect;

/** The day that it is in the workspace. */
const today = (workspaceId: string) =>
  sql`(select (clock_timestamp() at time zone w.time_zone)::date from ${workspaces} w where w.id = ${workspaceId})`;

/** Who signs for whom today. With `heldBy` the rows of that stand-in are held until commit, so that none is ended meanwhile. */
export async function activeStandIns(
  tx: TenantTx,
  workspaceId: string,
  options: { heldBy?: string } = {},
): Promise<StandInRow[]> {
  const active = and(
    eq(standIns.workspaceId, workspaceId),
    isNull(standIns.endedAt),
    lte(standIns.fromOn, today(workspaceId)),
    gte(standIns.untilOn, today(workspaceId)),
  );
  if (options.heldBy)
    await tx
      .select({ id: standIns.id })
      .from(standIns)
      .where(and(active, eq(standIns.standInId, options.heldBy)))
      .for('share');
  return tx.select().from(standIns).where(active).orderBy(asc(standIns.id));
}

/** Those that stand today or will, the soonest first. */
export async function comingStandIns(tx: TenantTx, workspaceId: string): Promise<StandInRow[]> {
  return tx
    .select()
    .from(standIns)
    .where(
      and(
        eq(standIns.workspaceId, workspaceId),
        isNull(standIns.endedAt),
        gte(standIns.untilOn, today(workspaceId)),
      ),
    )
    .orderBy(asc(standIns.fromOn), asc(standIns.id));
}

export async function dayOfWorkspace(tx: TenantTx, workspaceId: string): Promise<string> {
  const { rows } = await tx.execute<{ day: string }>(sql`select ${today(workspaceId)}::text as day`);
  return rows[0].day;
}

export async function insertStandIn(tx: TenantTx, row: typeof standIns.$inferInsert): Promise<StandInRow> {
  const [made] = await tx.insert(standIns).values(row).returning();
  return made;
}

export async function lockStandIn(tx: TenantTx, workspaceId: string, id: string): Promise<StandInRow | null> {
  const [row] = await tx
    .select()
    .from(standIns)
    .where(and(eq(standIns.workspaceId, workspaceId), eq(standIns.id, id)))
    .for('update');
  return row ?? null;
}

export async function endStandInRow(tx: TenantTx, row: StandInRow): Promise<void> {
  await tx
    .update(standIns)
    .set({ endedAt: sql`clock_timestamp()` })
    .where(and(eq(standIns.workspaceId, row.workspaceId), eq(standIns.id, row.id)));
}
