import { createHash, randomBytes, timingSafeEqual } from 'node:crypto';

const pattern = /^([0-9a-f]{8}(?:-[0-9a-f]{4}){3}-[0-9a-f]{12})\.([A-Za-z0-9_-]{43})$/;
const hashOf = (secret: string) => createHash('sha256').update(secret).digest('hex');

/**
 * Token of the mailed link: the invitation's id and 32 random bytes that are stored as a hash only. Whoever
 * lists or made the invitation knows its id but not the token, so only the mailbox can use it.
 */
export function newInvitationToken(id: string): { token: string; tokenHash: string } {
  const secret = randomBytes(32).toString('base64url');
  return { token: `${id}.${secret}`, tokenHash: hashOf(secret) };
}

/** Reads a token; null where it cannot be one. */
export function parseInvitationToken(
  token: string,
): { id: string; opens: (tokenHash: string) => boolean } | null {
  const match = pattern.exec(token);
  if (!match) return null;
  const given = Buffer.from(hashOf(match[2]), 'hex');
  return {
    id: match[1],
    opens: (tokenHash) => {
      const stored = Buffer.from(tokenHash, 'hex');
      return stored.length === given.length && timingSafeEqual(stored, given);
    },
  };
}
