import { uuidv7 } from 'uuidv7';
import { enterScope, withTenant } from '@/db/tenant';
import { studioContext } from '@/lib/auth/context';
import type { HeldInvitation, InvitationContext } from '@/lib/auth/enter-by-invitation';
import { conflict, notFound } from '@/lib/errors/app-error';
import { refuseClosed } from '@/lib/workspaces/invitation-state';
import {
  insertStaff,
  insertStudioEntry,
  lockStaff,
  lockStaffInvitation,
  settleStaffInvitation,
  workspacesOfStudio,
} from './studio-data';
import { tellWorkspaces } from './tell-workspaces';

/** Writes the staff row of an accepted invitation; the row lock lets one of two clicks through. */
export async function joinStudio(
  ctx: InvitationContext,
  held: HeldInvitation & { kind: 'studio' },
): Promise<void> {
  const { studio } = held;
  await withTenant(ctx, async (tx) => {
    const invitation = await lockStaffInvitation(tx, studio.id, held.id);
    if (!invitation) throw notFound('invitation');
    refuseClosed(invitation);
    const inviter = await lockStaff(tx, studio.id, invitation.inviterId);
    if (inviter?.role !== 'lead')
      throw conflict(
        'inviter-left',
        'Who invited you may no longer invite. Ask the studio for a new invitation.',
      );
    if (await lockStaff(tx, studio.id, ctx.person.id))
      throw conflict('already-member', `You already work at ${studio.name}.`);
    const { role } = invitation;
    await insertStaff(tx, { id: uuidv7(), studioId: studio.id, userId: ctx.person.id, role });
    await settleStaffInvitation(tx, studio.id, invitation.id, 'accepted');
    const personId = ctx.person.id;
    const detail = { name: ctx.person.name, role, invitationId: invitation.id };
    await insertStudioEntry(tx, { person: ctx.person, studio }, 'person.joined', { personId, ...detail });
    // From here on they are staff, and see the studio's workspaces as staff do.
    const inside = studioContext({ person: ctx.person, studio, role });
    await enterScope(tx, inside.scope);
    const workspaces = await workspacesOfStudio(tx, studio.id);
    await tellWorkspaces(tx, inside, workspaces, { action: 'person.joined', personId, detail });
  });
}
