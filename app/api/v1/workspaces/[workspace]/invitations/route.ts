import { json, workspaceRoute } from '@/lib/http/route';
import { inviteToWorkspace } from '@/lib/workspaces/invite-to-workspace';
import { InviteClientInput } from '@/lib/workspaces/schemas';

export const POST = workspaceRoute({ body: InviteClientInput }, async ({ ctx, body }) =>
  json(await inviteToWorkspace(ctx, body), 201),
);
