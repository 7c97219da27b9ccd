import { withTenant } from '@/db/tenant';
import { appendEntry } from '@/lib/audit/append-entry';
import { requirePermission, type WorkspaceContext } from '@/lib/auth/context';
import { conflict, notFound } from '@/lib/errors/app-error';
import { queueLive } from '@/lib/jobs/queue-live';
import { lockInvitation, settleInvitation } from './invitations-data';

/** Takes an open invitation back; its link stops working at once. */
export async function cancelInvitation(ctx: WorkspaceContext, invitationId: string): Promise<void> {
  requirePermission(ctx, 'people.invite');
  await withTenant(ctx, async (tx) => {
    const invitation = await lockInvitation(tx, ctx.workspace.id, invitationId);
    if (!invitation) throw notFound('invitation');
    if (invitation.status !== 'pending')
      throw conflict('invitation-closed', 'This invitation was already accepted or cancelled.');
    await settleInvitation(tx, ctx.workspace.id, invitationId, 'canceled');
    await queueLive(tx, ctx, { name: 'people.changed', data: { id: ctx.workspace.id } });
    await appendEntry(tx, ctx, {
      action: 'invitation.cancelled',
      subjectKind: 'invitation',
      subjectId: invitationId,
      detail: { email: invitation.email, role: invitation.role },
    });
  });
}
