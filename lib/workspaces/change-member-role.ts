import { withTenant } from '@/db/tenant';
import { appendEntry } from '@/lib/audit/append-entry';
import { requirePermission, type WorkspaceContext } from '@/lib/auth/context';
import { conflict, notFound } from '@/lib/errors/app-error';
import { parseInput } from '@/lib/http/read-input';
import { queueLive } from '@/lib/jobs/queue-live';
import { sweepGatesOf } from '@/lib/jobs/sweep-gates';
import { findPersonName, lockMember, updateMemberRole } from './people-data';
import { isStudioRole } from './roles';
import { ClientRoleInput } from './schemas';

/** A lead makes a client a reviewer or an approver. Roles of staff belong to the studio. */
export async function changeMemberRole(
  ctx: WorkspaceContext,
  personId: string,
  input: unknown,
): Promise<void> {
  requirePermission(ctx, 'people.change');
  const { role } = parseInput(ClientRoleInput, input);
  await withTenant(ctx, async (tx) => {
    const member = await lockMember(tx, ctx.workspace.id, personId);
    if (!member) throw notFound('person');
    if (isStudioRole(member.role))
      throw conflict(
        'studio-staff',
        'This person belongs to the studio. Change the role on the studio’s page.',
      );
    if (member.role === role) return;
    const person = await findPersonName(tx, personId);
    await updateMemberRole(tx, ctx.workspace.id, personId, role);
    await queueLive(tx, ctx, { name: 'people.changed', data: { id: ctx.workspace.id } });
    await appendEntry(tx, ctx, {
      action: 'person.role-changed',
      subjectKind: 'person',
      subjectId: personId,
      detail: { name: person?.name ?? '', from: member.role, to: role },
    });
  });
  await sweepGatesOf(ctx.workspace.id);
}
