import { json, studioRoute } from '@/lib/http/route';
import { inviteToStudio } from '@/lib/studio/invite-to-studio';
import { InviteStaffInput } from '@/lib/workspaces/schemas';

export const POST = studioRoute({ body: InviteStaffInput }, async ({ ctx, body }) =>
  json(await inviteToStudio(ctx, body), 201),
);
