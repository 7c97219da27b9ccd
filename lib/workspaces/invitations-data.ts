import { and, asc, eq, sql } from 'drizzle-orm';
import { users } from '@/db/schema/identity';
import { invitations } from '@/db/schema/workspaces';
import type { TenantTx } from '@/db/tenant';

export type NewInvitation = typeof invitations.$inferInsert;

export async function insertInvitation(tx: TenantTx, row: NewInvitation): Promise<void> {
  await tx.insert(invitations).values(row);
}

/** Pending invitations of a workspace, those that ran out included, newest last. */
export async function listPendingInvitations(tx: TenantTx, workspaceId: string) {
  return tx
    .select({
      id: invitations.id,
      email: invitations.email,
      role: invitations.role,
      expiresAt: invitations.expiresAt,
      invitedBy: users.name,
    })
    .from(invitations)
    .leftJoin(users, eq(users.id, invitations.inviterId))
    .where(and(eq(invitations.workspaceId, workspaceId), eq(invitations.status, 'pending')))
    .orderBy(asc(invitations.createdAt), asc(invitations.id));
}

export async function lockInvitation(tx: TenantTx, workspaceId: string, id: string) {
  const [row] = await tx
    .select()
    .from(invitations)
    .where(and(eq(invitations.workspaceId, workspaceId), eq(invitations.id, id)))
    .for('update');
  return row ?? null;
}

/** The pending invitation of an address, locked; at most one can stand. */
export async function lockPendingInvitation(tx: TenantTx, workspaceId: string, email: string) {
  const [row] = await tx
    .select()
    .from(invitations)
    .where(
      and(
        eq(invitations.workspaceId, workspaceId),
        eq(invitations.status, 'pending'),
        eq(sql`lower(${invitations.email})`, email),
      ),
    )
    .for('update');
  return row ?? null;
}

export async function settleInvitation(
  tx: TenantTx,
  workspaceId: string,
  id: string,
  status: 'accepted' | 'canceled',
): Promise<void> {
  await tx
    .update(invitations)
    .set({ status })
    .where(and(eq(invitations.workspaceId, workspaceId), eq(invitations.id, id)));
}
