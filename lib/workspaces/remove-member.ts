import { withTenant } from '@/db/tenant';
import { appendEntry } from '@/lib/audit/append-entry';
import { requirePermission, type WorkspaceContext } from '@/lib/auth/context';
import { conflict, notFound } from '@/lib/errors/app-error';
import { queueLive, queueLiveToPeople } from '@/lib/jobs/queue-live';
import { sweepGatesOf } from '@/lib/jobs/sweep-gates';
import { endPersonSockets } from './end-person-sockets';
import { deleteMember, findPersonName, lockMember } from './people-data';
import { isStudioRole } from './roles';

/** Ends a client's membership: a lead for anyone, a client for themselves. What they signed stays. */
export async function removeMember(ctx: WorkspaceContext, personId: string): Promise<void> {
  if (personId !== ctx.person.id) requirePermission(ctx, 'people.change');
  await withTenant(ctx, async (tx) => {
    const member = await lockMember(tx, ctx.workspace.id, personId);
    if (!member) throw notFound('person');
    if (isStudioRole(member.role))
      throw conflict('studio-staff', 'This person belongs to the studio. Remove them on the studio’s page.');
    const person = await findPersonName(tx, personId);
    await queueLive(tx, ctx, { name: 'people.changed', data: { id: ctx.workspace.id } });
    await queueLiveToPeople(tx, ctx, [personId], { name: 'people.changed', data: { id: ctx.workspace.id } });
    await appendEntry(tx, ctx, {
      action: 'person.removed',
      subjectKind: 'person',
      subjectId: personId,
      detail: { name: person?.name ?? '', role: member.role, left: personId === ctx.person.id },
    });
    // Last: who leaves loses sight of the workspace with this row.
    await deleteMember(tx, ctx.workspace.id, personId);
  });
  await endPersonSockets(personId);
  await sweepGatesOf(ctx.workspace.id);
}
