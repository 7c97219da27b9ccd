import { uuidv7 } from 'uuidv7';
import { withTenant } from '@/db/tenant';
import { requireStudioRole, type StudioContext } from '@/lib/auth/context';
import { newInvitationToken } from '@/lib/auth/invitation-token';
import { conflict } from '@/lib/errors/app-error';
import { parseInput } from '@/lib/http/read-input';
import { queueMail } from '@/lib/jobs/queue-mail';
import { invitationLifeMs, invitationMail } from '@/lib/workspaces/invitation-mail';
import { findStudioClientByEmail } from '@/lib/workspaces/people-data';
import { InviteStaffInput, type PendingInvitationView } from '@/lib/workspaces/schemas';
import {
  findStaffByEmail,
  insertStaffInvitation,
  insertStudioEntry,
  lockPendingStaffInvitation,
  settleStaffInvitation,
} from './studio-data';

/** A lead invites staff by mail; the link lives seven days. Clients are invited in their workspace. */
export async function inviteToStudio(ctx: StudioContext, input: unknown): Promise<PendingInvitationView> {
  requireStudioRole(ctx, 'lead');
  const { email, role } = parseInput(InviteStaffInput, input);
  const id = uuidv7();
  const { token, tokenHash } = newInvitationToken(id);
  const expiresAt = new Date(Date.now() + invitationLifeMs);
  await withTenant(ctx, async (tx) => {
    const staff = await findStaffByEmail(tx, ctx.studio.id, email);
    if (staff)
      throw conflict(
        'already-member',
        `${email} already works here as ${staff.role}. Change the role instead.`,
      );
    const client = await findStudioClientByEmail(tx, ctx.studio.id, email);
    if (client)
      throw conflict(
        'client-of-studio',
        `${email} is a client in ${client.workspaceName}; clients cannot be staff of the studio too.`,
      );
    const standing = await lockPendingStaffInvitation(tx, ctx.studio.id, email);
    if (standing && standing.expiresAt > new Date())
      throw conflict(
        'already-invited',
        `${email} has an open invitation. Cancel it first if you want to send another.`,
      );
    if (standing) await settleStaffInvitation(tx, ctx.studio.id, standing.id, 'canceled');
    const inviterId = ctx.person.id;
    await insertStaffInvitation(tx, {
      id,
      studioId: ctx.studio.id,
      email,
      role,
      tokenHash,
      expiresAt,
      inviterId,
    });
    await queueMail(tx, { studioId: ctx.studio.id }, [
      invitationMail({ ctx, id, token, email, role, expiresAt, workspaceName: null }),
    ]);
    await insertStudioEntry(tx, ctx, 'person.invited', { invitationId: id, email, role });
  });
  const invitedBy = ctx.person.name;
  return { id, email, role, state: 'pending', expiresAt: expiresAt.toISOString(), invitedBy };
}
