import { uuidv7 } from 'uuidv7';
import { withTenant } from '@/db/tenant';
import { appendEntry } from '@/lib/audit/append-entry';
import { requirePermission, type WorkspaceContext } from '@/lib/auth/context';
import { newInvitationToken } from '@/lib/auth/invitation-token';
import { conflict } from '@/lib/errors/app-error';
import { parseInput } from '@/lib/http/read-input';
import { queueLive } from '@/lib/jobs/queue-live';
import { queueMail } from '@/lib/jobs/queue-mail';
import { invitationMail, invitationLifeMs } from './invitation-mail';
import { insertInvitation, lockPendingInvitation, settleInvitation } from './invitations-data';
import { findMemberByEmail } from './people-data';
import { isStudioRole } from './roles';
import { InviteClientInput, type PendingInvitationView } from './schemas';

/** A lead invites a client by mail; the link lives seven days. Staff join at the studio, never here. */
export async function inviteToWorkspace(
  ctx: WorkspaceContext,
  input: unknown,
): Promise<PendingInvitationView> {
  requirePermission(ctx, 'people.invite');
  const { email, role } = parseInput(InviteClientInput, input);
  const id = uuidv7();
  const { token, tokenHash } = newInvitationToken(id);
  const expiresAt = new Date(Date.now() + invitationLifeMs);
  await withTenant(ctx, async (tx) => {
    const member = await findMemberByEmail(tx, ctx.workspace.id, email);
    if (member && isStudioRole(member.role))
      throw conflict(
        'studio-staff',
        `${email} works at ${ctx.studio.name} as ${member.role}; staff cannot sign for the client.`,
      );
    if (member)
      throw conflict(
        'already-member',
        `${email} is already here as ${member.role}. Change the role instead.`,
      );
    const standing = await lockPendingInvitation(tx, ctx.workspace.id, email);
    if (standing && standing.expiresAt > new Date())
      throw conflict(
        'already-invited',
        `${email} has an open invitation. Cancel it first if you want to send another.`,
      );
    if (standing) await settleInvitation(tx, ctx.workspace.id, standing.id, 'canceled');
    await insertInvitation(tx, {
      id,
      workspaceId: ctx.workspace.id,
      email,
      role,
      tokenHash,
      expiresAt,
      inviterId: ctx.person.id,
    });
    await queueMail(tx, { workspaceId: ctx.workspace.id }, [
      invitationMail({ ctx, id, token, email, role, expiresAt, workspaceName: ctx.workspace.name }),
    ]);
    await queueLive(tx, ctx, { name: 'people.changed', data: { id: ctx.workspace.id } });
    await appendEntry(tx, ctx, {
      action: 'person.invited',
      subjectKind: 'invitation',
      subjectId: id,
      detail: { email, role, expiresAt: expiresAt.toISOString() },
    });
  });
  const invitedBy = ctx.person.name;
  return { id, email, role, state: 'pending', expiresAt: expiresAt.toISOString(), invitedBy };
}
