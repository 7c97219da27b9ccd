import type { Person, Studio } from '@/lib/auth/context';
import type { MailRequest } from '@/lib/mail/messages';
import type { Role } from './roles';

export const invitationLifeMs = 7 * 24 * 3600_000;

/** The mail that carries the one copy of an invitation's token. */
export function invitationMail(given: {
  ctx: { person: Person; studio: Studio };
  id: string;
  token: string;
  email: string;
  role: Role;
  expiresAt: Date;
  workspaceName: string | null;
}): { request: MailRequest; dedupeKey: string } {
  return {
    dedupeKey: `invitation:${given.id}`,
    request: {
      template: 'invitation',
      to: { email: given.email, name: given.email },
      inviterName: given.ctx.person.name,
      studioName: given.ctx.studio.name,
      workspaceName: given.workspaceName,
      role: given.role,
      path: `/join/${given.token}`,
      expiresAt: given.expiresAt.toISOString(),
    },
  };
}
