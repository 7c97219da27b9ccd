import { noContent, workspaceRoute } from '@/lib/http/route';
import { cancelInvitation } from '@/lib/workspaces/cancel-invitation';
import { InvitationParams } from '@/lib/workspaces/schemas';

export const DELETE = workspaceRoute({ params: InvitationParams }, async ({ ctx, params }) => {
  await cancelInvitation(ctx, params.invitation);
  return noContent();
});
