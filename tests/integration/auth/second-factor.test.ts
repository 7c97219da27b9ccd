import { afterAll, beforeAll, describe, expect, it, vi } from 'vitest';
import { POST } from '@/app/api/auth/[...all]/route';
import { GET as getMe } from '@/app/api/v1/me/route';
import { confirmBudget } from '@/lib/auth/attempts-data';
import { confirmPassword } from '@/lib/auth/confirm-password';
import { readSecondFactor } from '@/lib/auth/second-factor-data';
import { authenticator } from '@/tests/support/authenticator';
import { callRoute, cookieOf } from '@/tests/support/call-route';
import { freshDatabase, type FreshDatabase } from '@/tests/support/database';
import { makePerson, testPassword, type SignedIn } from '@/tests/support/make-house';

let database: FreshDatabase;
beforeAll(async () => {
  database = await freshDatabase();
  // The middle of a step, and it stays there: a code is not overtaken by the clock between making and giving it.
  vi.useFakeTimers({ toFake: ['Date'], now: Math.floor(Date.now() / 30_000) * 30_000 + 15_000 });
});
afterAll(() => vi.useRealTimers());

const post = (path: string, body: unknown, cookie?: string) =>
  callRoute(POST, { path: `/api/auth${path}`, body, cookie });
const me = async (cookie: string) => (await callRoute(getMe, { cookie })).status;
const codeOf = async (answer: Response) => ((await answer.json()) as { code?: string }).code;

type WithFactor = SignedIn & { codes: string[]; device: ReturnType<typeof authenticator> };

/** Somebody whose second factor is on, by the service's own endpoints. */
async function withFactor(name: string): Promise<WithFactor> {
  const made = await makePerson(database, name);
  const enabled = await post('/two-factor/enable', { password: testPassword }, made.cookie);
  const { totpURI, backupCodes } = (await enabled.json()) as { totpURI: string; backupCodes: string[] };
  const device = authenticator(totpURI);
  const on = await post('/two-factor/verify-totp', { code: await device.code(-1) }, made.cookie);
  expect(on.status).toBe(200);
  return { ...made, cookie: cookieOf(on), codes: backupCodes, device };
}

/** The right password of somebody with a second factor: the cookie of the question that follows. */
async function password(email: string): Promise<string> {
  const answer = await post('/sign-in/email', { email, password: testPassword });
  expect(await answer.json()).toMatchObject({ twoFactorRedirect: true, twoFactorMethods: ['totp'] });
  return cookieOf(answer);
}

async function mailsTo(email: string) {
  const { rows } = await database.query<{ payload: { template: string; what?: string; codesLeft?: number } }>(
    `select payload from outbox where payload->'to'->>'email' = $1 order by created_at`,
    [email],
  );
  return rows.map(({ payload: { template, what, codesLeft } }) => ({ template, what, codesLeft }));
}

describe('setting up a second factor', () => {
  it('asks the password, and is on only after a code has come back', async () => {
    const { person, cookie } = await makePerson(database, 'Setter');
    const wrong = await post('/two-factor/enable', { password: 'not my password at all' }, cookie);
    expect([wrong.status, await codeOf(wrong)]).toEqual([400, 'INVALID_PASSWORD']);
    const enabled = await post('/two-factor/enable', { password: testPassword }, cookie);
    const { totpURI, backupCodes } = (await enabled.json()) as { totpURI: string; backupCodes: string[] };
    expect(totpURI).toMatch(/^otpauth:\/\/totp\/Firstpull:setter/);
    expect(backupCodes).toHaveLength(10);
    for (const code of backupCodes)
      expect(code).toMatch(/^([0-9a-hjkmnp-tv-z]{4}-){3}[0-9a-hjkmnp-tv-z]{4}$/);
    expect((await readSecondFactor(person.id)).on).toBe(false);
    // Not on yet: the password alone still signs in.
    const before = await post('/sign-in/email', { email: person.email, password: testPassword });
    expect(await me(cookieOf(before))).toBe(200);

    const bad = await post('/two-factor/verify-totp', { code: '000000' }, cookie);
    expect([bad.status, await codeOf(bad)]).toEqual([401, 'INVALID_CODE']);
    const code = await authenticator(totpURI).code();
    expect((await post('/two-factor/verify-totp', { code }, cookie)).status).toBe(200);
    expect(await readSecondFactor(person.id)).toEqual({ on: true, codesLeft: 10 });
    expect(await mailsTo(person.email)).toEqual([{ template: 'second-factor', what: 'on', codesLeft: 0 }]);
  });

  it('ends the sessions that came without one, and gives this one a new cookie', async () => {
    const { person, cookie } = await makePerson(database, 'Elsewhere');
    const other = cookieOf(await post('/sign-in/email', { email: person.email, password: testPassword }));
    const enabled = await post('/two-factor/enable', { password: testPassword }, cookie);
    const device = authenticator(((await enabled.json()) as { totpURI: string }).totpURI);
    const on = await post('/two-factor/verify-totp', { code: await device.code() }, cookie);
    expect([await me(cookie), await me(other), await me(cookieOf(on))]).toEqual([401, 401, 200]);
  });

  it('keeps neither secret nor recovery codes in the open, and gives the secret once', async () => {
    const one = await withFactor('Closed');
    const { rows } = await database.query<{ text: string }>(
      'select t::text as text from two_factors t where user_id = $1',
      [one.person.id],
    );
    for (const code of one.codes) {
      expect(rows[0].text).not.toContain(code);
      expect(rows[0].text).not.toContain(code.replaceAll('-', ''));
    }
    const again = await post('/two-factor/enable', { password: testPassword }, one.cookie);
    expect([again.status, await codeOf(again)]).toEqual([400, 'TOTP_ALREADY_ENABLED']);
  });

  it.each([
    ['/two-factor/enable', { password: testPassword, method: 'otp' }],
    ['/two-factor/enable', { password: testPassword, issuer: 'Somebody else' }],
    ['/two-factor/verify-totp', { code: '123456', trustDevice: true }],
    ['/two-factor/verify-backup-code', { code: 'x', disableSession: true }],
    ['/two-factor/verify-totp', { code: '12345' }],
    ['/two-factor/verify-totp', { code: ['123456'] }],
    ['/two-factor/disable', {}],
  ])('%s takes nothing that is not asked for: %j', async (path, body) => {
    const { cookie } = await makePerson(database, 'Strict');
    const answer = await post(path, body, cookie);
    expect([answer.status, await codeOf(answer)]).toEqual([400, 'INVALID_INPUT']);
  });
});

describe('signing in with a second factor', () => {
  it('gives no session for the password alone', async () => {
    const one = await withFactor('Half');
    const cookie = await password(one.person.email);
    expect(cookie).not.toMatch(/session_token=[^;]/);
    expect(await me(cookie)).toBe(401);
    // Nor does it make the device a known one: the code does.
    expect(cookie).not.toMatch(/known_device/);
    const whole = await post('/two-factor/verify-totp', { code: await one.device.code() }, cookie);
    expect(cookieOf(whole)).toMatch(/known_device=[^;]/);
  });

  it('takes each code once', async () => {
    const one = await withFactor('Once');
    const code = await one.device.code();
    const first = await post('/two-factor/verify-totp', { code }, await password(one.person.email));
    expect(first.status).toBe(200);
    expect(await me(cookieOf(first))).toBe(200);
    const second = await post('/two-factor/verify-totp', { code }, await password(one.person.email));
    expect([second.status, await codeOf(second)]).toEqual([401, 'CODE_USED']);
    // Nor one of before: the code that ended setting up is older than the one just used.
    const older = await post(
      '/two-factor/verify-totp',
      { code: await one.device.code(-1) },
      await password(one.person.email),
    );
    expect(older.status).toBe(401);
  });

  it('takes it once too when fifty ask at the same time', async () => {
    const one = await withFactor('Fifty');
    const challenges = [await password(one.person.email), await password(one.person.email)];
    const code = await one.device.code();
    const answers = await Promise.all(
      Array.from({ length: 50 }, (_, i) => post('/two-factor/verify-totp', { code }, challenges[i % 2])),
    );
    expect(answers.filter((answer) => answer.status === 200)).toHaveLength(1);
    expect(answers.every((answer) => [200, 401].includes(answer.status))).toBe(true);
  });

  it('takes a code of one step away and none of two', async () => {
    const one = await withFactor('Clock');
    const challenge = await password(one.person.email);
    for (const steps of [-2, 2]) {
      await database.query('update two_factors set last_step = null where user_id = $1', [one.person.id]);
      const answer = await post('/two-factor/verify-totp', { code: await one.device.code(steps) }, challenge);
      expect([answer.status, await codeOf(answer)]).toEqual([401, 'INVALID_CODE']);
    }
    const next = await post('/two-factor/verify-totp', { code: await one.device.code(1) }, challenge);
    expect(next.status).toBe(200);
  });

  it('lets ten wrong codes be tried, over all sign-ins, then none for a while', async () => {
    const one = await withFactor('Guessed');
    const statuses: number[] = [];
    for (let round = 0; round < 3; round++) {
      const challenge = await password(one.person.email);
      for (let i = 0; i < 6; i++)
        statuses.push((await post('/two-factor/verify-totp', { code: '000000' }, challenge)).status);
    }
    expect(statuses.filter((status) => status === 401)).toHaveLength(10);
    expect(statuses.slice(-6)).toEqual(Array<number>(6).fill(429));
    const right = { code: await one.device.code(1) };
    const closed = await post('/two-factor/verify-totp', right, await password(one.person.email));
    expect([closed.status, await codeOf(closed)]).toEqual([429, 'ACCOUNT_TEMPORARILY_LOCKED']);
  });

  it('is not left out after a new password by mail', async () => {
    const one = await withFactor('Forgot');
    const { rows } = await database.query<{ id: string }>(
      `insert into verifications (id, identifier, value, expires_at)
       values (gen_random_uuid(), 'reset-password:token-of-the-mail', $1, now() + interval '1 hour') returning id`,
      [one.person.id],
    );
    expect(rows).toHaveLength(1);
    const newPassword = 'thirteen grey gulls on a pier';
    expect((await post('/reset-password', { newPassword, token: 'token-of-the-mail' })).status).toBe(200);
    const answer = await post('/sign-in/email', { email: one.person.email, password: newPassword });
    expect(await answer.json()).toMatchObject({ twoFactorRedirect: true });
    expect(await me(cookieOf(answer))).toBe(401);
  });
});

describe('recovery codes', () => {
  it('sign in once each, in any writing, and the person is told', async () => {
    const one = await withFactor('Recover');
    const [code, other] = one.codes;
    const written = ` ${code.toUpperCase().replaceAll('-', ' ')} `;
    const first = await post(
      '/two-factor/verify-backup-code',
      { code: written },
      await password(one.person.email),
    );
    expect([first.status, await me(cookieOf(first))]).toEqual([200, 200]);
    const second = await post('/two-factor/verify-backup-code', { code }, await password(one.person.email));
    expect([second.status, await codeOf(second)]).toEqual([401, 'INVALID_BACKUP_CODE']);
    expect(await readSecondFactor(one.person.id)).toEqual({ on: true, codesLeft: 9 });
    const third = await post(
      '/two-factor/verify-backup-code',
      { code: other },
      await password(one.person.email),
    );
    expect(third.status).toBe(200);
    expect(await mailsTo(one.person.email)).toEqual([
      { template: 'second-factor', what: 'on', codesLeft: 0 },
      { template: 'second-factor', what: 'code-spent', codesLeft: 9 },
      { template: 'second-factor', what: 'code-spent', codesLeft: 8 },
    ]);
  });

  it('sign in once when twenty ask at the same time', async () => {
    const one = await withFactor('Twenty');
    const challenges = await Promise.all(Array.from({ length: 4 }, () => password(one.person.email)));
    const answers = await Promise.all(
      Array.from({ length: 20 }, (_, i) =>
        post('/two-factor/verify-backup-code', { code: one.codes[0] }, challenges[i % 4]),
      ),
    );
    expect(answers.filter((answer) => answer.status === 200)).toHaveLength(1);
    expect((await readSecondFactor(one.person.id)).codesLeft).toBe(9);
  });

  it('are all replaced by who gives password and code; a stored hash is no code', async () => {
    const one = await withFactor('Renew');
    const { rows } = await database.query<{ codes: string }>(
      'select backup_codes as codes from two_factors where user_id = $1',
      [one.person.id],
    );
    const [hash] = JSON.parse(rows[0].codes) as string[];
    const stolen = await post(
      '/two-factor/verify-backup-code',
      { code: hash.slice(0, 60) },
      await password(one.person.email),
    );
    expect(stolen.status).toBe(401);
    const wrong = await post('/two-factor/generate-backup-codes', { password: 'x' }, one.cookie);
    expect(wrong.status).toBe(400);
    const passwordOnly = await post(
      '/two-factor/generate-backup-codes',
      { password: testPassword },
      one.cookie,
    );
    expect([passwordOnly.status, await codeOf(passwordOnly)]).toEqual([400, 'CODE_NEEDED']);
    const both = { password: testPassword, code: await one.device.code() };
    const renewed = await post('/two-factor/generate-backup-codes', both, one.cookie);
    const { backupCodes } = (await renewed.json()) as { backupCodes: string[] };
    expect(backupCodes.some((code) => one.codes.includes(code))).toBe(false);
    const old = await post(
      '/two-factor/verify-backup-code',
      { code: one.codes[0] },
      await password(one.person.email),
    );
    expect(old.status).toBe(401);
    const now = await post(
      '/two-factor/verify-backup-code',
      { code: backupCodes[0] },
      await password(one.person.email),
    );
    expect(now.status).toBe(200);
  });
});

describe('turning a second factor off', () => {
  it('asks the password and a code; then the password alone signs in again', async () => {
    const one = await withFactor('Off');
    const code = await one.device.code();
    const refused = async (body: Record<string, string>, cookie?: string) => {
      const answer = await post('/two-factor/disable', body, cookie);
      return [answer.status, await codeOf(answer)];
    };
    // A wrong password spends no code.
    expect(await refused({ password: 'x', code }, one.cookie)).toEqual([400, 'INVALID_PASSWORD']);
    expect((await refused({ password: testPassword, code }))[0]).toBe(401);
    // A session and the password in the hands of another do not do away with the factor that they lack.
    expect(await refused({ password: testPassword }, one.cookie)).toEqual([400, 'CODE_NEEDED']);
    expect(await refused({ password: testPassword, code: '000000' }, one.cookie)).toEqual([
      401,
      'WRONG_CODE',
    ]);
    expect(await refused({ password: testPassword, code: 'nor-this' }, one.cookie)).toEqual([
      401,
      'WRONG_CODE',
    ]);
    expect((await readSecondFactor(one.person.id)).on).toBe(true);
    const off = await post('/two-factor/disable', { password: testPassword, code }, one.cookie);
    expect(off.status).toBe(200);
    expect([await me(one.cookie), await me(cookieOf(off))]).toEqual([401, 200]);
    expect(await readSecondFactor(one.person.id)).toEqual({ on: false, codesLeft: 0 });
    const signedIn = await post('/sign-in/email', { email: one.person.email, password: testPassword });
    expect(await me(cookieOf(signedIn))).toBe(200);
    expect((await mailsTo(one.person.email)).at(-1)).toMatchObject({ what: 'off' });
  });

  it('takes a recovery code from who has lost the authenticator, and no code twice', async () => {
    const one = await withFactor('Lost');
    const code = await one.device.code();
    expect(await confirmPassword(one.person, testPassword, code)).toBe('password+totp');
    const used = await post('/two-factor/disable', { password: testPassword, code }, one.cookie);
    expect([used.status, await codeOf(used)]).toEqual([401, 'CODE_USED']);
    const written = one.codes[3].toUpperCase().replaceAll('-', ' ');
    const off = await post('/two-factor/disable', { password: testPassword, code: written }, one.cookie);
    expect(off.status).toBe(200);
    expect((await readSecondFactor(one.person.id)).on).toBe(false);
  });

  it('counts wrong codes together with signing, and the right password elsewhere does not forgive them', async () => {
    const one = await withFactor('Guesser');
    for (let i = 0; i < confirmBudget.burst; i++) {
      const body = { password: testPassword, code: '000000' };
      expect((await post('/two-factor/disable', body, one.cookie)).status).toBe(401);
      // The right password makes its own count whole, not that of the codes.
      const changed = { currentPassword: testPassword, newPassword: testPassword };
      expect((await post('/change-password', changed, one.cookie)).status).toBe(200);
    }
    const right = { password: testPassword, code: await one.device.code() };
    expect((await post('/two-factor/disable', right, one.cookie)).status).toBe(429);
    await expect(confirmPassword(one.person, testPassword, right.code)).rejects.toMatchObject({
      code: 'limit_exceeded',
      message: expect.stringContaining('wrong codes'),
    });
    expect((await readSecondFactor(one.person.id)).on).toBe(true);
  });

  it('counts wrong passwords together with signing', async () => {
    const one = await withFactor('Counted');
    const paths = ['/two-factor/disable', '/two-factor/generate-backup-codes', '/change-password'];
    const statuses: number[] = [];
    for (let i = 0; i <= confirmBudget.burst; i++) {
      const body =
        i % 3 === 2 ? { currentPassword: 'x', newPassword: testPassword } : { password: 'not my password' };
      statuses.push((await post(paths[i % 3], body, one.cookie)).status);
    }
    expect(statuses).toEqual([...Array<number>(confirmBudget.burst).fill(400), 429]);
    await expect(confirmPassword(one.person, testPassword)).rejects.toMatchObject({ code: 'limit_exceeded' });
  });
});

describe('proving oneself again', () => {
  it('needs password and code from who has both, each code once', async () => {
    const one = await withFactor('Signer');
    const refused = (code: string | undefined, reason: string) =>
      expect(confirmPassword(one.person, testPassword, code)).rejects.toMatchObject({
        code: 'forbidden',
        reason,
      });
    await refused(undefined, 'code-needed');
    await refused('000000', 'wrong-code');
    const code = await one.device.code();
    await expect(confirmPassword(one.person, 'wrong', code)).rejects.toMatchObject({
      reason: 'wrong-password',
    });
    expect(await confirmPassword(one.person, testPassword, code)).toBe('password+totp');
    await refused(code, 'wrong-code');
    // A code that signed does not sign in either.
    const answer = await post('/two-factor/verify-totp', { code }, await password(one.person.email));
    expect(answer.status).toBe(401);
  });

  it('takes one of twenty that come with the same code at once, and counts codes as it counts passwords', async () => {
    const one = await withFactor('Together');
    const code = await one.device.code();
    const tries = await Promise.allSettled(
      Array.from({ length: confirmBudget.burst }, () => confirmPassword(one.person, testPassword, code)),
    );
    expect(tries.filter((result) => result.status === 'fulfilled')).toHaveLength(1);
    const two = await withFactor('Wrong codes');
    for (let i = 0; i < confirmBudget.burst; i++)
      await expect(confirmPassword(two.person, testPassword, '000000')).rejects.toMatchObject({
        reason: 'wrong-code',
      });
    await expect(confirmPassword(two.person, testPassword, await two.device.code())).rejects.toMatchObject({
      code: 'limit_exceeded',
    });
  });

  it('asks no code of who has none', async () => {
    const { person } = await makePerson(database, 'Plain');
    expect(await confirmPassword(person, testPassword)).toBe('password');
  });
});
