import { describe, expect, it } from 'vitest';
import { newInvitationToken, parseInvitationToken } from '@/lib/auth/invitation-token';

const id = '01a23182-fb41-7e71-9779-7364af2e607c';

describe('invitation token', () => {
  it('opens its own hash and no other', () => {
    const made = newInvitationToken(id);
    const other = newInvitationToken(id);
    const parsed = parseInvitationToken(made.token);
    expect(parsed?.id).toBe(id);
    expect(parsed?.opens(made.tokenHash)).toBe(true);
    expect(parsed?.opens(other.tokenHash)).toBe(false);
    expect(parsed?.opens('')).toBe(false);
  });

  it('never stores the secret that it mails', () => {
    const { token, tokenHash } = newInvitationToken(id);
    const secret = token.split('.')[1];
    expect(tokenHash).toMatch(/^[0-9a-f]{64}$/);
    expect(tokenHash).not.toContain(secret);
    expect(Buffer.from(secret, 'base64url')).toHaveLength(32);
  });

  it.each([
    ['nothing', ''],
    ['the id alone', id],
    ['a short secret', `${id}.abc`],
    ['a secret that is too long', `${id}.${'a'.repeat(44)}`],
    ['another alphabet', `${id}.${'+'.repeat(43)}`],
    ['a line break', `${id}.${'a'.repeat(43)}\n`],
    ['no id', `x.${'a'.repeat(43)}`],
  ])('reads nothing from %s', (_what, token) => {
    expect(parseInvitationToken(token)).toBeNull();
  });
});
