import { describe, expect, it } from 'vitest';
import { askAuth, explainAuth } from '@/app/_components/explain-auth';
import { newPasswordRules } from '@/app/_components/new-password-rules';
import { passwordLimits } from '@/app/_components/password-field';
import { NewPassword, passwordMax, passwordMin } from '@/lib/auth/password-rules';

describe('explainAuth', () => {
  it('does not tell a wrong address from a wrong password', () => {
    const sentence = explainAuth({ status: 401, code: 'INVALID_EMAIL_OR_PASSWORD' });
    expect(sentence).toContain('e-mail or the password');
  });

  it.each([
    [{ status: 403, code: 'EMAIL_NOT_VERIFIED' }, 'Open the link'],
    [{ status: 429 }, 'Wait a minute'],
    [{ status: 401 }, 'Sign in again'],
    [{ status: 500, message: 'connect ECONNREFUSED 10.0.0.7:5432' }, 'try again'],
  ])('says what to do: %j', (refusal, words) => {
    expect(explainAuth(refusal)).toContain(words);
  });

  it('keeps inner words of a failed server to itself', () => {
    expect(explainAuth({ status: 502, message: 'connect ECONNREFUSED 10.0.0.7:5432' })).not.toContain(
      'ECONNREFUSED',
    );
  });
});

describe('askAuth', () => {
  it('hands on data', async () => {
    expect(await askAuth(async () => ({ data: { ok: true }, error: null }))).toEqual({
      data: { ok: true },
      problem: null,
      refusal: null,
    });
  });

  it('turns a lost connection into a sentence', async () => {
    const answer = await askAuth(() => Promise.reject(new TypeError('Failed to fetch')));
    expect(answer.problem).toContain('did not answer');
    expect(answer.data).toBeNull();
  });

  it('turns a refusal into a sentence and keeps its code', async () => {
    const answer = await askAuth(async () => ({ data: null, error: { status: 400, code: 'INVALID_TOKEN' } }));
    expect(answer).toMatchObject({
      refusal: { code: 'INVALID_TOKEN' },
      problem: expect.stringContaining('new one'),
    });
  });
});

describe('rules of a new password', () => {
  it('are those of the server', () => {
    expect(passwordLimits).toEqual({ min: passwordMin, max: passwordMax });
  });

  it.each([
    ['', 0, false],
    ['x', passwordMin - 1, false],
    ['x', passwordMin, true],
    ['日', passwordMin - 1, false],
    ['🦆', passwordMin, true],
    // Two code points that NFC joins are one character.
    ['e\u0301', passwordMin - 1, false],
    ['e\u0301', passwordMin, true],
    ['🦆', passwordMax, true],
    ['🦆', passwordMax + 1, false],
  ])('count characters of any script alike in the browser and on the server: %j × %i', (one, times, fits) => {
    const password = one.repeat(times);
    expect(newPasswordRules.validate(password) === true).toBe(fits);
    expect(NewPassword.safeParse(password).success).toBe(fits);
  });
});
