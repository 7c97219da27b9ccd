import { z } from 'zod/mini';
import type { InvitationView } from '@/lib/workspaces/schemas';

export type Invitation = InvitationView;

/** Answer of `GET /api/v1/invitations/{token}`; the small build of zod, since this page is often the first one seen. */
export const invitationSchema: z.ZodMiniType<Invitation> = z.object({
  workspaceName: z.nullable(z.string()),
  studioName: z.string(),
  role: z.enum(['designer', 'lead', 'producer', 'reviewer', 'approver']),
  email: z.string(),
  expiresAt: z.string(),
  state: z.enum(['pending', 'accepted', 'expired', 'cancelled']),
  hasAccount: z.boolean(),
});

/** Answer of `POST /api/v1/invitations/{token}/accept`. */
export const acceptedSchema = z.object({ redirectTo: z.string() });

const what: Record<Invitation['role'], string> = {
  designer: 'post revisions, read the findings and answer notes',
  lead: 'open workspaces, invite people, set the gate plan and sign for the studio',
  producer: 'release what is approved, and record prints and pulls',
  reviewer: 'look at the model, comment, and see what changed',
  approver: 'look, comment, and sign or return a revision for the client',
};

/** What a role lets a person do, as the rest of `you may …`. */
export function roleInWords(role: Invitation['role']): string {
  return what[role];
}

/** Why an invitation cannot be taken up, or null while it is open. */
export function closedBecause(invitation: Invitation, now: number): string | null {
  if (invitation.state === 'accepted') return 'It has been taken up already.';
  if (invitation.state === 'cancelled') return 'The studio has taken it back.';
  if (invitation.state === 'expired' || Date.parse(invitation.expiresAt) <= now) return 'It has run out.';
  return null;
}
