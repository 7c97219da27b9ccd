import { and, asc, eq } from 'drizzle-orm';
import { users } from '@/db/schema/identity';
import { members, studios, workspaces } from '@/db/schema/workspaces';
import type { TenantTx } from '@/db/tenant';
import { studioRoles, type Role } from '@/lib/workspaces/roles';

export type WorkspacePerson = {
  id: string;
  name: string;
  email: string;
  timeZone: string;
  role: Role;
  side: 'studio' | 'client';
};

/** Everybody who may enter the workspace, by name. */
export async function workspacePeople(tx: TenantTx, workspaceId: string): Promise<WorkspacePerson[]> {
  const rows = await tx
    .select({
      id: users.id,
      name: users.name,
      email: users.email,
      timeZone: users.timeZone,
      role: members.role,
    })
    .from(members)
    .innerJoin(users, eq(users.id, members.userId))
    .where(eq(members.workspaceId, workspaceId))
    .orderBy(asc(users.name), asc(users.id));
  return rows.map((row) => ({
    ...row,
    side: (studioRoles as readonly string[]).includes(row.role) ? 'studio' : 'client',
  }));
}

/**
 * The role that a person has at this moment, with the row held until commit: whoever signs cannot be
 * removed or demoted between the check and the signature.
 */
export async function holdRole(tx: TenantTx, workspaceId: string, personId: string): Promise<Role | null> {
  const [row] = await tx
    .select({ role: members.role })
    .from(members)
    .where(and(eq(members.workspaceId, workspaceId), eq(members.userId, personId)))
    .for('share');
  return row?.role ?? null;
}

export type WorkspaceNames = { id: string; name: string; slug: string; code: string; studioName: string };

export async function workspaceNames(tx: TenantTx, workspaceId: string): Promise<WorkspaceNames> {
  const [row] = await tx
    .select({
      id: workspaces.id,
      name: workspaces.name,
      slug: workspaces.slug,
      code: workspaces.code,
      studioName: studios.name,
    })
    .from(workspaces)
    .innerJoin(studios, eq(studios.id, workspaces.studioId))
    .where(eq(workspaces.id, workspaceId));
  if (!row) throw new Error('the workspace is not visible to this transaction');
  return row;
}
