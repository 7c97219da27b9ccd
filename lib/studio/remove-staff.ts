import { withTenant } from '@/db/tenant';
import { requireStudioRole, type StudioContext } from '@/lib/auth/context';
import { notFound } from '@/lib/errors/app-error';
import { sweepGatesOf } from '@/lib/jobs/sweep-gates';
import { endPersonSockets } from '@/lib/workspaces/end-person-sockets';
import { findPersonName } from '@/lib/workspaces/people-data';
import { deleteStaff, insertStudioEntry, lockStaff, workspacesOfStudio } from './studio-data';
import { tellWorkspaces } from './tell-workspaces';

/**
 * Ends a person's work at the studio, in every workspace at once: a lead for anyone, anyone for themselves.
 * The last lead stays (`last-lead`). What they signed or wrote stays.
 */
export async function removeStaff(ctx: StudioContext, personId: string): Promise<void> {
  if (personId !== ctx.person.id) requireStudioRole(ctx, 'lead');
  const places = await withTenant(ctx, async (tx) => {
    const staff = await lockStaff(tx, ctx.studio.id, personId);
    if (!staff) throw notFound('person');
    const person = await findPersonName(tx, personId);
    const left = personId === ctx.person.id;
    const detail = { name: person?.name ?? '', role: staff.role, left };
    // Before the row goes: who leaves loses sight of the studio with it.
    const workspaces = await workspacesOfStudio(tx, ctx.studio.id);
    await insertStudioEntry(tx, ctx, 'person.removed', { personId, ...detail });
    await deleteStaff(tx, ctx.studio.id, personId);
    await tellWorkspaces(tx, ctx, workspaces, { action: 'person.removed', personId, detail });
    return workspaces;
  });
  await endPersonSockets(personId);
  for (const { id } of places) await sweepGatesOf(id);
}
