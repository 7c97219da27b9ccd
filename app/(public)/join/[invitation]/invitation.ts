import { z } from 'zod/mini';

/** Answer of `GET /api/v1/invitations/{id}`. */
export const invitationSchema = z.object({
  workspaceName: z.nullable(z.string()),
  studioName: z.string(),
  role: z.string(),
  email: z.string(),
  expiresAt: z.string(),
  state: z.string(),
});
export type Invitation = z.infer<typeof invitationSchema>;

/** Answer of `POST /api/v1/invitations/{id}/accept`. */
export const acceptedSchema = z.object({ redirectTo: z.string() });

const what: Record<string, string> = {
  designer: 'post revisions, read the findings and answer notes',
  lead: 'open workspaces, invite people, set the gate plan and sign for the studio',
  producer: 'release what is approved, and record prints and pulls',
  reviewer: 'look at the model, comment, and see what changed',
  approver: 'look, comment, and sign or return a revision for the client',
};

/** What a role lets a person do, as the rest of `you may …`. */
export function roleInWords(role: string): string {
  return what[role] ?? 'take part';
}

/** Why an invitation cannot be taken up, or null while it is open. */
export function closedBecause(invitation: Invitation, now: number): string | null {
  if (invitation.state === 'accepted') return 'It has been taken up already. Sign in to go on.';
  if (invitation.state === 'canceled' || invitation.state === 'cancelled')
    return 'The studio has taken it back.';
  if (invitation.state === 'rejected') return 'It was declined.';
  if (invitation.state === 'expired' || Date.parse(invitation.expiresAt) <= now) return 'It has run out.';
  return null;
}
