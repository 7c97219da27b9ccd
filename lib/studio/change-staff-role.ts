import { withTenant } from '@/db/tenant';
import { requireStudioRole, type StudioContext } from '@/lib/auth/context';
import { notFound } from '@/lib/errors/app-error';
import { parseInput } from '@/lib/http/read-input';
import { sweepGatesOf } from '@/lib/jobs/sweep-gates';
import { findPersonName } from '@/lib/workspaces/people-data';
import { StaffRoleInput } from '@/lib/workspaces/schemas';
import { insertStudioEntry, lockStaff, updateStaffRole, workspacesOfStudio } from './studio-data';
import { tellWorkspaces } from './tell-workspaces';

/**
 * A lead gives staff another role, in every workspace at once. The database keeps the last lead: demoting
 * them is refused with `last-lead`.
 */
export async function changeStaffRole(ctx: StudioContext, personId: string, input: unknown): Promise<void> {
  requireStudioRole(ctx, 'lead');
  const { role } = parseInput(StaffRoleInput, input);
  const places = await withTenant(ctx, async (tx) => {
    const staff = await lockStaff(tx, ctx.studio.id, personId);
    if (!staff) throw notFound('person');
    if (staff.role === role) return [];
    const person = await findPersonName(tx, personId);
    const detail = { name: person?.name ?? '', from: staff.role, to: role };
    const workspaces = await workspacesOfStudio(tx, ctx.studio.id);
    await insertStudioEntry(tx, ctx, 'person.role-changed', { personId, ...detail });
    await updateStaffRole(tx, ctx.studio.id, personId, role);
    await tellWorkspaces(tx, ctx, workspaces, { action: 'person.role-changed', personId, detail });
    return workspaces;
  });
  for (const { id } of places) await sweepGatesOf(id);
}
