import { withTenant } from '@/db/tenant';
import { requireStudioRole, type StudioContext } from '@/lib/auth/context';
import { conflict, notFound } from '@/lib/errors/app-error';
import { insertStudioEntry, lockStaffInvitation, settleStaffInvitation } from './studio-data';

/** Takes an open invitation of staff back; its link stops working at once. */
export async function cancelStaffInvitation(ctx: StudioContext, invitationId: string): Promise<void> {
  requireStudioRole(ctx, 'lead');
  await withTenant(ctx, async (tx) => {
    const invitation = await lockStaffInvitation(tx, ctx.studio.id, invitationId);
    if (!invitation) throw notFound('invitation');
    if (invitation.status !== 'pending')
      throw conflict('invitation-closed', 'This invitation was already accepted or cancelled.');
    await settleStaffInvitation(tx, ctx.studio.id, invitationId, 'canceled');
    const { email, role } = invitation;
    await insertStudioEntry(tx, ctx, 'invitation.cancelled', { invitationId, email, role });
  });
}
