import { createHash } from 'node:crypto';
import type { MailRequest } from './messages';

const nameOf = (text: string) => createHash('sha256').update(text).digest('hex').slice(0, 40);

/** Stable for one occasion: a mail that is sent twice after a lost answer is one mail to the reader's program (RFC 5322 §3.6.4). */
export const messageId = (dedupeKey: string, host: string) => `<${nameOf(`mail ${dedupeKey}`)}@${host}>`;

/** Root of a revision's thread, the same for every mail about it; null for mails about no revision. */
export function threadRoot(request: MailRequest, host: string): string | null {
  if (!('letter' in request)) return null;
  const { workspaceId, number, letter } = request;
  return `<${nameOf(`revision ${workspaceId} ${number} ${letter}`)}@${host}>`;
}
