import { withTenant } from '@/db/tenant';
import type { StudioContext } from '@/lib/auth/context';
import type { PeopleView } from '@/lib/workspaces/schemas';
import * as data from './studio-data';

/** Everybody who works at the studio; open invitations for its leads. */
export async function listStaff(ctx: StudioContext): Promise<PeopleView> {
  const mayInvite = ctx.role === 'lead';
  const { staff, pending } = await withTenant(ctx, async (tx) => ({
    staff: await data.listStaff(tx, ctx.studio.id),
    pending: mayInvite ? await data.listStaffInvitations(tx, ctx.studio.id) : [],
  }));
  const now = new Date();
  return {
    people: staff.map(({ since, ...person }) => ({
      ...person,
      side: 'studio' as const,
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
