import { and, asc, eq, sql } from 'drizzle-orm';
import { users } from '@/db/schema/identity';
import { studioEntries } from '@/db/schema/trail';
import { studioInvitations, studioMembers, studios, workspaces } from '@/db/schema/workspaces';
import type { TenantTx } from '@/db/tenant';
import type { Person, Studio } from '@/lib/auth/context';
import type { StudioRole } from '@/lib/workspaces/roles';

/** False when the slug is taken. Nothing is read back: the row is visible only after its first lead stands. */
export async function insertStudio(tx: TenantTx, row: Studio): Promise<boolean> {
  const result = await tx.insert(studios).values(row).onConflictDoNothing();
  return (result.rowCount ?? 0) === 1;
}

/** Adds an entry to what was done at the studio, in the change's own transaction. */
export async function insertStudioEntry(
  tx: TenantTx,
  ctx: { person: Person; studio: Studio },
  action: string,
  detail: Record<string, unknown>,
): Promise<void> {
  await tx.insert(studioEntries).values({
    studioId: ctx.studio.id,
    actorId: ctx.person.id,
    actorName: ctx.person.name,
    action,
    detail,
  });
}

/** The studio's workspaces in the order of their ids, which is the order in which their chains are locked. */
export async function workspacesOfStudio(tx: TenantTx, studioId: string) {
  return tx.select().from(workspaces).where(eq(workspaces.studioId, studioId)).orderBy(asc(workspaces.id));
}

export async function insertStaff(
  tx: TenantTx,
  row: { id: string; studioId: string; userId: string; role: StudioRole },
): Promise<void> {
  await tx.insert(studioMembers).values(row);
}

export async function listStaff(tx: TenantTx, studioId: string) {
  return tx
    .select({
      id: users.id,
      name: users.name,
      email: users.email,
      role: studioMembers.role,
      since: studioMembers.createdAt,
    })
    .from(studioMembers)
    .innerJoin(users, eq(users.id, studioMembers.userId))
    .where(eq(studioMembers.studioId, studioId))
    .orderBy(asc(users.name), asc(users.id));
}

/** Locks the staff row for the rest of the transaction. */
export async function lockStaff(tx: TenantTx, studioId: string, personId: string) {
  const [row] = await tx
    .select({ id: studioMembers.id, role: studioMembers.role })
    .from(studioMembers)
    .where(and(eq(studioMembers.studioId, studioId), eq(studioMembers.userId, personId)))
    .for('update');
  return row ?? null;
}

export async function findStaffByEmail(tx: TenantTx, studioId: string, email: string) {
  const [row] = await tx
    .select({ role: studioMembers.role })
    .from(studioMembers)
    .innerJoin(users, eq(users.id, studioMembers.userId))
    .where(and(eq(studioMembers.studioId, studioId), eq(sql`lower(${users.email})`, email)));
  return row ?? null;
}

export async function updateStaffRole(
  tx: TenantTx,
  studioId: string,
  personId: string,
  role: StudioRole,
): Promise<void> {
  await tx
    .update(studioMembers)
    .set({ role })
    .where(and(eq(studioMembers.studioId, studioId), eq(studioMembers.userId, personId)));
}

export async function deleteStaff(tx: TenantTx, studioId: string, personId: string): Promise<void> {
  await tx
    .delete(studioMembers)
    .where(and(eq(studioMembers.studioId, studioId), eq(studioMembers.userId, personId)));
}

export async function insertStaffInvitation(
  tx: TenantTx,
  row: typeof studioInvitations.$inferInsert,
): Promise<void> {
  await tx.insert(studioInvitations).values(row);
}

/** Pending invitations of a studio, those that ran out included, newest last. */
export async function listStaffInvitations(tx: TenantTx, studioId: string) {
  return tx
    .select({
      id: studioInvitations.id,
      email: studioInvitations.email,
      role: studioInvitations.role,
      expiresAt: studioInvitations.expiresAt,
      invitedBy: users.name,
    })
    .from(studioInvitations)
    .leftJoin(users, eq(users.id, studioInvitations.inviterId))
    .where(and(eq(studioInvitations.studioId, studioId), eq(studioInvitations.status, 'pending')))
    .orderBy(asc(studioInvitations.createdAt), asc(studioInvitations.id));
}

export async function lockStaffInvitation(tx: TenantTx, studioId: string, id: string) {
  const [row] = await tx
    .select()
    .from(studioInvitations)
    .where(and(eq(studioInvitations.studioId, studioId), eq(studioInvitations.id, id)))
    .for('update');
  return row ?? null;
}

export async function lockPendingStaffInvitation(tx: TenantTx, studioId: string, email: string) {
  const [row] = await tx
    .select()
    .from(studioInvitations)
    .where(
      and(
        eq(studioInvitations.studioId, studioId),
        eq(studioInvitations.status, 'pending'),
        eq(sql`lower(${studioInvitations.email})`, email),
      ),
    )
    .for('update');
  return row ?? null;
}

export async function settleStaffInvitation(
  tx: TenantTx,
  studioId: string,
  id: string,
  status: 'accepted' | 'canceled',
): Promise<void> {
  await tx
    .update(studioInvitations)
    .set({ status })
    .where(and(eq(studioInvitations.studioId, studioId), eq(studioInvitations.id, id)));
}
