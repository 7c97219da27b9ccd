import { noContent, studioRoute } from '@/lib/http/route';
import { cancelStaffInvitation } from '@/lib/studio/cancel-staff-invitation';
import { InvitationParams } from '@/lib/workspaces/schemas';

export const DELETE = studioRoute({ params: InvitationParams }, async ({ ctx, params }) => {
  await cancelStaffInvitation(ctx, params.invitation);
  return noContent();
});
