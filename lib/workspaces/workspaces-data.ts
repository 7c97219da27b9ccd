import { and, asc, count, desc, eq, inArray, sql } from 'drizzle-orm';
import { auditEntries } from '@/db/schema/trail';
import { gatePlans, invitations, members, workspaces, type GateRule } from '@/db/schema/workspaces';
import type { TenantTx } from '@/db/tenant';
import type { Role } from './role-names';

export type NewWorkspace = {
  id: string;
  studioId: string;
  name: string;
  slug: string;
  code: string;
  timeZone: string;
};

/** False when the slug is taken. Nothing is read back: the row is visible only after its staff rows stand. */
export async function insertWorkspace(tx: TenantTx, row: NewWorkspace): Promise<boolean> {
  const result = await tx.insert(workspaces).values(row).onConflictDoNothing();
  return (result.rowCount ?? 0) === 1;
}

export async function findWorkspaceByCode(tx: TenantTx, studioId: string, code: string) {
  const [row] = await tx
    .select({ id: workspaces.id, name: workspaces.name })
    .from(workspaces)
    .where(and(eq(workspaces.studioId, studioId), eq(workspaces.code, code)));
  return row ?? null;
}

export async function insertGatePlan(
  tx: TenantTx,
  row: { id: string; workspaceId: string; number: number; gates: GateRule[]; createdBy: string },
) {
  const [made] = await tx.insert(gatePlans).values(row).returning();
  return made;
}

/** The version of the gate plan that the next posted revision gets. */
export async function findLatestGatePlan(tx: TenantTx, workspaceId: string) {
  const [row] = await tx
    .select()
    .from(gatePlans)
    .where(eq(gatePlans.workspaceId, workspaceId))
    .orderBy(sql`${gatePlans.number} desc`)
    .limit(1);
  return row ?? null;
}

/** Every version of the gate plan, newest first, with the name of who made it as the audit chain has it. */
export async function listGatePlans(tx: TenantTx, workspaceId: string, limit: number) {
  return tx
    .select({ plan: gatePlans, madeBy: auditEntries.actorName })
    .from(gatePlans)
    .leftJoin(
      auditEntries,
      and(
        eq(auditEntries.workspaceId, gatePlans.workspaceId),
        eq(auditEntries.subjectKind, 'gate-plan'),
        eq(auditEntries.subjectId, gatePlans.id),
      ),
    )
    .where(eq(gatePlans.workspaceId, workspaceId))
    .orderBy(desc(gatePlans.number))
    .limit(limit);
}

/** Holds the workspace's row: versions of its plan are made one after another. */
export async function lockWorkspace(tx: TenantTx, workspaceId: string): Promise<void> {
  await tx
    .select({ id: workspaces.id })
    .from(workspaces)
    .where(eq(workspaces.id, workspaceId))
    // Not 'update': rows that refer to the workspace are written by others meanwhile, some under the chain's head.
    .for('no key update');
}

/** An invitation that was neither answered nor taken back, and has not run out. */
const mayStillJoin = and(eq(invitations.status, 'pending'), sql`${invitations.expiresAt} > now()`);

/** Clients who are invited and may still come, by role. */
export async function countInvited(
  tx: TenantTx,
  workspaceId: string,
): Promise<Partial<Record<Role, number>>> {
  const rows = await tx
    .select({ role: invitations.role, n: count() })
    .from(invitations)
    .where(and(eq(invitations.workspaceId, workspaceId), mayStillJoin))
    .groupBy(invitations.role);
  return Object.fromEntries(rows.map(({ role, n }) => [role, n]));
}

/** A studio's workspaces with the counts of its list, in three statements whatever their number. */
export async function listStudioWorkspaces(tx: TenantTx, studioId: string) {
  const rows = await tx
    .select()
    .from(workspaces)
    .where(eq(workspaces.studioId, studioId))
    .orderBy(asc(workspaces.name), asc(workspaces.id));
  const ids = rows.map((row) => row.id);
  if (!ids.length) return [];
  const clients = await tx
    .select({ id: members.workspaceId, n: count() })
    .from(members)
    .where(and(inArray(members.workspaceId, ids), inArray(members.role, ['reviewer', 'approver'])))
    .groupBy(members.workspaceId);
  const pending = await tx
    .select({ id: invitations.workspaceId, n: count() })
    .from(invitations)
    .where(and(inArray(invitations.workspaceId, ids), mayStillJoin))
    .groupBy(invitations.workspaceId);
  const of = (counts: { id: string; n: number }[], id: string) => counts.find((c) => c.id === id)?.n ?? 0;
  return rows.map((row) => ({ ...row, clients: of(clients, row.id), pending: of(pending, row.id) }));
}
