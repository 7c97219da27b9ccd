import { uuidv7 } from 'uuidv7';
import { withTenant } from '@/db/tenant';
import { appendEntry } from '@/lib/audit/append-entry';
import { workspaceContext } from '@/lib/auth/context';
import type { HeldInvitation, InvitationContext } from '@/lib/auth/enter-by-invitation';
import { conflict, notFound } from '@/lib/errors/app-error';
import { queueLive } from '@/lib/jobs/queue-live';
import { refuseClosed } from './invitation-state';
import { lockInvitation, settleInvitation } from './invitations-data';
import { insertMember, lockMember } from './people-data';
import { permits } from './roles';

/** Writes the membership of an accepted client invitation; the row lock lets one of two clicks through. */
export async function joinWorkspace(
  ctx: InvitationContext,
  held: HeldInvitation & { kind: 'workspace' },
): Promise<void> {
  const { workspace, studio } = held;
  await withTenant(ctx, async (tx) => {
    const invitation = await lockInvitation(tx, workspace.id, held.id);
    if (!invitation) throw notFound('invitation');
    refuseClosed(invitation);
    const inviter = await lockMember(tx, workspace.id, invitation.inviterId);
    if (!inviter || !permits(inviter.role, 'people.invite'))
      throw conflict(
        'inviter-left',
        'Who invited you may no longer invite. Ask the studio for a new invitation.',
      );
    if (await lockMember(tx, workspace.id, ctx.person.id))
      throw conflict('already-member', `You already belong to ${workspace.name}.`);
    const member = { id: uuidv7(), workspaceId: workspace.id, userId: ctx.person.id, role: invitation.role };
    await insertMember(tx, member);
    await settleInvitation(tx, workspace.id, invitation.id, 'accepted');
    const inside = workspaceContext({ person: ctx.person, workspace, studio, role: invitation.role });
    await queueLive(tx, inside, { name: 'people.changed', data: { id: workspace.id } });
    await appendEntry(tx, inside, {
      action: 'person.joined',
      subjectKind: 'person',
      subjectId: ctx.person.id,
      detail: { name: ctx.person.name, role: invitation.role, invitationId: invitation.id },
    });
  });
}
