import { and, asc, eq, inArray, sql } from 'drizzle-orm';
import { users } from '@/db/schema/identity';
import { members, workspaces } from '@/db/schema/workspaces';
import type { TenantTx } from '@/db/tenant';
import type { ClientRole } from './roles';

const person = { id: users.id, name: users.name, email: users.email };

/** Members of a workspace with their names, by name. */
export async function listMembers(tx: TenantTx, workspaceId: string) {
  return tx
    .select({ ...person, role: members.role, since: members.createdAt })
    .from(members)
    .innerJoin(users, eq(users.id, members.userId))
    .where(eq(members.workspaceId, workspaceId))
    .orderBy(asc(users.name), asc(users.id));
}

/** Locks the membership for the rest of the transaction. */
export async function lockMember(tx: TenantTx, workspaceId: string, personId: string) {
  const [row] = await tx
    .select({ id: members.id, role: members.role, personId: members.userId })
    .from(members)
    .where(and(eq(members.workspaceId, workspaceId), eq(members.userId, personId)))
    .for('update');
  return row ?? null;
}

export async function findPersonName(tx: TenantTx, personId: string) {
  const [row] = await tx.select(person).from(users).where(eq(users.id, personId));
  return row ?? null;
}

export async function findMemberByEmail(tx: TenantTx, workspaceId: string, email: string) {
  const [row] = await tx
    .select({ id: users.id, role: members.role })
    .from(members)
    .innerJoin(users, eq(users.id, members.userId))
    .where(and(eq(members.workspaceId, workspaceId), eq(sql`lower(${users.email})`, email)));
  return row ?? null;
}

/** A client membership of this address in any workspace of the studio. */
export async function findStudioClientByEmail(tx: TenantTx, studioId: string, email: string) {
  const [row] = await tx
    .select({ workspaceName: workspaces.name })
    .from(members)
    .innerJoin(workspaces, eq(workspaces.id, members.workspaceId))
    .innerJoin(users, eq(users.id, members.userId))
    .where(
      and(
        eq(workspaces.studioId, studioId),
        eq(sql`lower(${users.email})`, email),
        inArray(members.role, ['reviewer', 'approver']),
      ),
    )
    .limit(1);
  return row ?? null;
}

export async function insertMember(
  tx: TenantTx,
  row: { id: string; workspaceId: string; userId: string; role: ClientRole },
): Promise<void> {
  await tx.insert(members).values(row);
}

export async function updateMemberRole(
  tx: TenantTx,
  workspaceId: string,
  personId: string,
  role: ClientRole,
): Promise<void> {
  await tx
    .update(members)
    .set({ role })
    .where(and(eq(members.workspaceId, workspaceId), eq(members.userId, personId)));
}

export async function deleteMember(tx: TenantTx, workspaceId: string, personId: string): Promise<void> {
  await tx.delete(members).where(and(eq(members.workspaceId, workspaceId), eq(members.userId, personId)));
}
