import { findAccount } from '@/lib/auth/claim-address';
import { holdInvitation } from '@/lib/auth/enter-by-invitation';
import { invitationState } from './invitation-state';
import type { InvitationView } from './schemas';

/** What the holder of a mailed link may know of it before accepting. */
export async function readInvitation(token: string): Promise<InvitationView> {
  const held = await holdInvitation(token);
  const account = await findAccount(held.email);
  return {
    workspaceName: held.workspace?.name ?? null,
    studioName: held.studio.name,
    role: held.role,
    email: held.email,
    expiresAt: held.expiresAt.toISOString(),
    state: invitationState(held),
    hasAccount: account?.emailVerified ?? false,
  };
}
