import { makeScope, type Scope } from '@/db/scope';
import { notFound } from '@/lib/errors/app-error';
import type { ClientRole, StudioRole } from '@/lib/workspaces/roles';
import { findInvitation } from './auth-data';
import type { Person, Studio, Workspace } from './context';
import { parseInvitationToken } from './invitation-token';

type Common = {
  readonly id: string;
  readonly email: string;
  readonly status: 'pending' | 'accepted' | 'rejected' | 'canceled';
  readonly expiresAt: Date;
  readonly inviterId: string;
  readonly studio: Studio;
};
/** An invitation that the caller holds the mailed token of. */
export type HeldInvitation =
  | (Common & { readonly kind: 'workspace'; readonly role: ClientRole; readonly workspace: Workspace })
  | (Common & { readonly kind: 'studio'; readonly role: StudioRole; readonly workspace: null });

/** Reads the invitation that a mailed token opens; a wrong token and no invitation answer alike. */
export async function holdInvitation(token: string): Promise<HeldInvitation> {
  const parsed = parseInvitationToken(token);
  const found = parsed ? await findInvitation(parsed.id) : null;
  if (!parsed || !found || !parsed.opens(found.invitation.tokenHash)) throw notFound('invitation');
  const { id, email, status, expiresAt, inviterId } = found.invitation;
  const common = { id, email, status, expiresAt, inviterId, studio: found.studio };
  return found.kind === 'workspace'
    ? { ...common, kind: 'workspace', role: found.invitation.role, workspace: found.workspace }
    : { ...common, kind: 'studio', role: found.invitation.role, workspace: null };
}

declare const checked: unique symbol;

/** The right to write one membership, for the person whose proven address an invitation names. */
export type InvitationContext = {
  readonly [checked]: true;
  readonly person: Person;
  readonly held: HeldInvitation;
  readonly scope: Scope;
};

/** Null when the person's address is not the invited one. */
export function enterByInvitation(person: Person, held: HeldInvitation): InvitationContext | null {
  if (person.email.toLowerCase() !== held.email.toLowerCase()) return null;
  const scope =
    held.kind === 'workspace'
      ? makeScope({ kind: 'job', workspaceId: held.workspace.id })
      : makeScope({ kind: 'studio-job', studioId: held.studio.id });
  return { person, held, scope } as InvitationContext;
}
