import { noContent, workspaceRoute } from '@/lib/http/route';
import { changeMemberRole } from '@/lib/workspaces/change-member-role';
import { removeMember } from '@/lib/workspaces/remove-member';
import { ClientRoleInput, PersonParams } from '@/lib/workspaces/schemas';

export const PATCH = workspaceRoute(
  { params: PersonParams, body: ClientRoleInput },
  async ({ ctx, params, body }) => {
    await changeMemberRole(ctx, params.person, body);
    return noContent();
  },
);
export const DELETE = workspaceRoute({ params: PersonParams }, async ({ ctx, params }) => {
  await removeMember(ctx, params.person);
  return noContent();
});
