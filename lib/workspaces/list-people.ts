import { withTenant } from '@/db/tenant';
import { requirePermission, type WorkspaceContext } from '@/lib/auth/context';
import { listPendingInvitations } from './invitations-data';
import { listMembers } from './people-data';
import { permits, sideOf } from './roles';
import type { PeopleView } from './schemas';

/** Everybody in a workspace, for its page and for mentions; open invitations for those who may invite. */
export async function listPeople(ctx: WorkspaceContext): Promise<PeopleView> {
  requirePermission(ctx, 'people.read');
  const mayInvite = permits(ctx.role, 'people.invite');
  const { members, pending } = await withTenant(ctx, async (tx) => ({
    members: await listMembers(tx, ctx.workspace.id),
    pending: mayInvite ? await listPendingInvitations(tx, ctx.workspace.id) : [],
  }));
  const now = new Date();
  return {
    people: members.map(({ since, ...member }) => ({
      ...member,
      side: sideOf(member.role),
      since: since.toISOString(),
    })),
    invitations: pending.map((invitation) => ({
      ...invitation,
      invitedBy: invitation.invitedBy ?? 'Someone who has left',
      state: invitation.expiresAt > now ? ('pending' as const) : ('expired' as const),
      expiresAt: invitation.expiresAt.toISOString(),
    })),
    mayInvite,
  };
}
