import { createServer } from 'node:http';
import type { AddressInfo } from 'node:net';
import { beforeAll, describe, expect, it } from 'vitest';
import { GET, POST } from '@/app/api/auth/[...all]/route';
import { GET as getMe } from '@/app/api/v1/me/route';
import { confirmBudget } from '@/lib/auth/attempts-data';
import { confirmPassword } from '@/lib/auth/confirm-password';
import type { AppError } from '@/lib/errors/app-error';
import { pusher } from '@/realtime/publish';
import { callRoute, cookieOf } from '@/tests/support/call-route';
import { freshDatabase, type FreshDatabase } from '@/tests/support/database';
import { makePerson, testPassword } from '@/tests/support/make-house';

let database: FreshDatabase;
beforeAll(async () => {
  database = await freshDatabase();
});

const post = (path: string, body: unknown, cookie?: string) =>
  callRoute(POST, { path: `/api/auth${path}`, body, cookie });
const get = (path: string, cookie?: string) => callRoute(GET, { path: `/api/auth${path}`, cookie });
const me = (cookie: string) => callRoute(getMe, { cookie });

/** Mails to an address, oldest first, as they wait in the outbox. */
async function mailsTo(email: string) {
  const { rows } = await database.query<{ payload: { template: string; url: string } }>(
    `select payload from outbox where payload->'to'->>'email' = $1 order by created_at`,
    [email],
  );
  return rows.map((row) => row.payload);
}
const pathOf = (url: string) => url.slice(url.indexOf('/api/auth') + '/api/auth'.length);

async function signUp(email: string) {
  await post('/sign-up/email', { email, name: 'Una Novak', password: testPassword });
  const [mail] = await mailsTo(email);
  return mail;
}

describe('signing up', () => {
  it('proves the address by the mailed link before anything opens', async () => {
    const mail = await signUp('una@example.test');
    expect(mail.template).toBe('verify-address');
    const early = await post('/sign-in/email', { email: 'una@example.test', password: testPassword });
    expect(early.status).toBe(403);
    const verified = await get(pathOf(mail.url));
    expect(verified.status).toBe(302);
    expect(await (await me(cookieOf(verified))).json()).toMatchObject({
      person: { email: 'una@example.test', name: 'Una Novak', units: 'mm' },
      studios: [],
      workspaces: [],
    });
  });

  it('leads on to opening a studio once the address is proven', async () => {
    const email = 'on@example.test';
    const callbackURL = '/verify?next=/studio/new';
    const answer = await post('/sign-up/email', { email, name: 'On', password: testPassword, callbackURL });
    expect(answer.status).toBe(200);
    const verified = await get(pathOf((await mailsTo(email))[0].url));
    expect(verified.headers.get('location')).toBe(callbackURL);
    const foreign = await post('/sign-up/email', {
      email: 'off@example.test',
      name: 'Off',
      password: testPassword,
      callbackURL: 'https://evil.example',
    });
    expect(foreign.status).toBe(403);
  });

  it.each([
    ['Asia/Tokyo', 'Asia/Tokyo'],
    ['Mars/Olympus', 'UTC'],
    ["'; drop table users; --", 'UTC'],
    [9, 'UTC'],
    [undefined, 'UTC'],
  ])('keeps the zone of the browser where there is such a one: %j', async (timeZone, kept) => {
    const email = `zone.${String(timeZone).length}.${kept.length}@example.test`;
    const answer = await post('/sign-up/email', { email, name: 'Zoe', password: testPassword, timeZone });
    expect(answer.status).toBe(200);
    const { rows } = await database.query('select time_zone from users where email = $1', [email]);
    expect(rows).toEqual([{ time_zone: kept }]);
  });

  it('answers alike for a known and an unknown address', async () => {
    const known = await makePerson(database, 'Known');
    const body = { name: 'Somebody', password: testPassword };
    const answers = [
      await post('/sign-up/email', { ...body, email: known.person.email }),
      await post('/sign-up/email', { ...body, email: 'unknown@example.test' }),
    ];
    expect(answers.map((answer) => answer.status)).toEqual([200, 200]);
    const [a, b] = (await Promise.all(answers.map((answer) => answer.json()))) as { user: object }[];
    expect(Object.keys(a.user).sort()).toEqual(Object.keys(b.user).sort());
    expect(await mailsTo(known.person.email)).toEqual([]);
  });

  it.each([
    ['a password of fourteen characters', { password: 'grey gulls, 14' }],
    ['a common password', { password: 'password12345678' }],
    ['a password made of name, address and service', { password: 'Una-refused-Firstpull-7' }],
    ['a password of 129 characters', { password: 'x'.repeat(129) }],
    ['an empty name', { name: ' ' }],
    ['a name of two lines', { name: 'a\nb' }],
    ['a field that is not asked for', { emailVerified: true }],
    ['a picture', { image: 'https://example.test/x.png' }],
    ['a role', { role: 'lead' }],
  ])('refuses %s', async (_what, change) => {
    const email = 'refused@example.test';
    const answer = await post('/sign-up/email', { email, name: 'Una', password: testPassword, ...change });
    expect(answer.status).toBe(400);
    const { rows } = await database.query('select 1 from users where email = $1', [email]);
    expect(rows).toEqual([]);
  });

  it('keeps spaces and letters of every script in a password', async () => {
    const password = '  Überraschung 日本 ' + 'x'.repeat(60);
    const email = 'wide@example.test';
    await post('/sign-up/email', { email, name: 'Wide', password });
    await get(pathOf((await mailsTo(email))[0].url));
    expect((await post('/sign-in/email', { email, password })).status).toBe(200);
    const cut = await post('/sign-in/email', { email, password: password.trim() });
    expect(cut.status).toBe(401);
    const differentEnd = await post('/sign-in/email', { email, password: password.slice(0, -1) + 'y' });
    expect(differentEnd.status).toBe(401);
  });
});

describe('signing in', () => {
  it('takes a password however its letters were composed', async () => {
    const email = 'composed@example.test';
    const password = 'café crème à la façade';
    await post('/sign-up/email', { email, name: 'Composed', password: password.normalize('NFD') });
    await get(pathOf((await mailsTo(email))[0].url));
    expect((await post('/sign-in/email', { email, password: password.normalize('NFC') })).status).toBe(200);
    expect((await post('/sign-in/email', { email, password: 'cafe creme a la facade' })).status).toBe(401);
  });

  it('answers alike for a wrong password and an unknown address', async () => {
    const { person } = await makePerson(database, 'Wrong');
    const wrong = await post('/sign-in/email', { email: person.email, password: 'not the password at all' });
    const nobody = await post('/sign-in/email', {
      email: 'nobody@example.test',
      password: 'not the password at all',
    });
    expect([wrong.status, nobody.status]).toEqual([401, 401]);
    expect(await wrong.json()).toEqual(await nobody.json());
  });

  it('sets two cookies that scripts cannot read: the session, and that the device is known', async () => {
    const { person } = await makePerson(database, 'Cookie');
    const answer = await post('/sign-in/email', { email: person.email, password: testPassword });
    const cookies = answer.headers.getSetCookie();
    expect(cookies.map((cookie) => cookie.split('=')[0]).sort()).toEqual([
      'firstpull.known_device',
      'firstpull.session_token',
    ]);
    for (const cookie of cookies) {
      expect(cookie).toMatch(/HttpOnly/);
      expect(cookie).toMatch(/SameSite=Lax/i);
      expect(cookie).toMatch(/Path=\//);
      expect(cookie).not.toMatch(/Domain=/i);
      expect(cookie.length).toBeLessThan(4096);
    }
  });

  it('stores no address of the caller from a header that nobody vouches for', async () => {
    const { person } = await makePerson(database, 'Header');
    await callRoute(POST, {
      path: '/api/auth/sign-in/email',
      body: { email: person.email, password: testPassword },
      headers: { 'x-forwarded-for': '203.0.113.9' },
    });
    const { rows } = await database.query<{ n: number }>(
      `select count(*)::int as n from sessions where ip_address like '203.0.113%'`,
    );
    expect(rows[0].n).toBe(0);
  });
});

describe('a new password', () => {
  it('comes by mail, works once, and ends every session', async () => {
    const { person, cookie } = await makePerson(database, 'Reset');
    const asked = await post('/request-password-reset', { email: person.email, redirectTo: '/reset' });
    const unknown = await post('/request-password-reset', {
      email: 'no.one@example.test',
      redirectTo: '/reset',
    });
    expect(await asked.json()).toEqual(await unknown.json());
    expect(await mailsTo('no.one@example.test')).toEqual([]);
    const [mail] = await mailsTo(person.email);
    const back = await get(pathOf(mail.url));
    const token = new URL(back.headers.get('location')!, process.env.APP_URL).searchParams.get('token');
    const newPassword = 'twelve grey gulls over a pier';
    const weak = await post('/reset-password', { newPassword: 'letmeinletmeinplease', token });
    expect([weak.status, ((await weak.json()) as { code: string }).code]).toEqual([400, 'WEAK_PASSWORD']);
    // A refusal does not use the link up.
    expect((await post('/reset-password', { newPassword, token })).status).toBe(200);
    expect((await post('/reset-password', { newPassword, token })).status).toBe(400);
    expect((await me(cookie)).status).toBe(401);
    expect((await post('/sign-in/email', { email: person.email, password: testPassword })).status).toBe(401);
    expect((await post('/sign-in/email', { email: person.email, password: newPassword })).status).toBe(200);
  });

  it('is asked for with an address of ours to come back to, or not at all', async () => {
    const { person } = await makePerson(database, 'Redirect');
    for (const redirectTo of [
      'https://evil.example',
      '//evil.example',
      '/\\evil.example',
      'javascript:alert(1)',
    ]) {
      const answer = await post('/request-password-reset', { email: person.email, redirectTo });
      expect({ redirectTo, status: answer.status }).toEqual({ redirectTo, status: 403 });
    }
    expect(await mailsTo(person.email)).toEqual([]);
  });

  it('can be set by who knows the old one, and ends the other sessions when asked to', async () => {
    const { person, cookie } = await makePerson(database, 'Change');
    const other = cookieOf(await post('/sign-in/email', { email: person.email, password: testPassword }));
    const body = { newPassword: 'thirteen grey gulls on a pier', revokeOtherSessions: true };
    const wrong = await post('/change-password', { ...body, currentPassword: 'not my password' }, cookie);
    expect(wrong.status).toBe(400);
    for (const newPassword of ['grey gulls, 14', 'qwertyuiopasdfgh', `${person.name} ${person.email}`]) {
      const weak = await post('/change-password', { newPassword, currentPassword: testPassword }, cookie);
      expect([weak.status, ((await weak.json()) as { code: string }).code]).toEqual([400, 'WEAK_PASSWORD']);
    }
    const right = await post('/change-password', { ...body, currentPassword: testPassword }, cookie);
    expect(right.status).toBe(200);
    expect((await me(other)).status).toBe(401);
    expect((await me(cookieOf(right))).status).toBe(200);
  });
});

describe('the password of who is signed in', () => {
  const guess = (cookie: string, currentPassword: string) =>
    post('/change-password', { currentPassword, newPassword: 'fourteen grey gulls at sea' }, cookie);

  it('is looked at five times at most, however many ask at once', async () => {
    const { person } = await makePerson(database, 'Parallel');
    const tries = await Promise.allSettled(
      Array.from({ length: 40 }, () => confirmPassword(person, 'not my password')),
    );
    const reasons = tries.map((one) => (one.status === 'rejected' ? (one.reason as AppError) : null));
    expect(reasons.filter((error) => error?.reason === 'wrong-password')).toHaveLength(confirmBudget.burst);
    const closed = reasons.filter((error) => error?.code === 'limit_exceeded');
    expect(closed).toHaveLength(40 - confirmBudget.burst);
    expect(closed.every((error) => error!.retryAfterS! > 0)).toBe(true);
    await expect(confirmPassword(person, testPassword)).rejects.toMatchObject({ code: 'limit_exceeded' });
  });

  it('has one count for signing and for changing it', async () => {
    const { person, cookie } = await makePerson(database, 'Oracle');
    const answers = await Promise.all(Array.from({ length: 12 }, () => guess(cookie, 'not my password')));
    const statuses = answers.map((answer) => answer.status).sort();
    expect(statuses).toEqual([...Array<number>(5).fill(400), ...Array<number>(7).fill(429)]);
    const closed = await guess(cookie, testPassword);
    expect(closed.status).toBe(429);
    expect(Number(closed.headers.get('retry-after'))).toBeGreaterThan(0);
    await expect(confirmPassword(person, testPassword)).rejects.toMatchObject({ code: 'limit_exceeded' });
  });

  it('starts the count anew when it was right', async () => {
    const { person, cookie } = await makePerson(database, 'Anew');
    const wrong = () => expect(confirmPassword(person, 'wrong')).rejects.toMatchObject({ code: 'forbidden' });
    for (let i = 1; i < confirmBudget.burst; i++) await wrong();
    expect(await confirmPassword(person, testPassword)).toBe('password');
    for (let i = 1; i < confirmBudget.burst; i++) await wrong();
    expect((await guess(cookie, testPassword)).status).toBe(200);
    await wrong();
  });
});

describe('open sockets', () => {
  /** Stands where the realtime server is, and says which sessions' sockets it was told to end. */
  async function realtime() {
    const told: string[] = [];
    let heard = () => {};
    const server = createServer((request, response) => {
      told.push(/users\/([^/]+)\/terminate_connections/.exec(request.url ?? '')?.[1] ?? request.url!);
      response.setHeader('content-type', 'application/json').end('{}');
      heard();
    });
    await new Promise<void>((listening) => server.listen(0, '127.0.0.1', listening));
    const client = pusher() as unknown as { config: { host: string; port: string } };
    const before = { ...client.config };
    Object.assign(client.config, { host: '127.0.0.1', port: String((server.address() as AddressInfo).port) });
    return {
      told,
      next: () => new Promise<void>((resolve) => void (heard = resolve)),
      close: () => {
        Object.assign(client.config, { host: before.host, port: before.port });
        server.close();
      },
    };
  }

  type Listed = { id: string; token: string };
  it.each([
    ['/sign-out', ['own'], () => ({})],
    ['/revoke-session', ['other'], (token: string) => ({ token })],
    ['/revoke-sessions', ['other', 'own'], () => ({})],
    ['/revoke-other-sessions', ['other'], () => ({})],
  ] as const)('end with their own session: %s ends those of %j', async (path, which, body) => {
    const { person, cookie } = await makePerson(database, 'Socket');
    await post('/sign-in/email', { email: person.email, password: testPassword });
    const list = (await (await get('/list-sessions', cookie)).json()) as Listed[];
    const own = list.find(({ token }) => cookie.includes(encodeURIComponent(token)))!;
    const other = list.find(({ id }) => id !== own.id)!;
    const server = await realtime();
    try {
      expect((await post(path, body(other.token), cookie)).status).toBe(200);
      const ids = { own: own.id, other: other.id };
      while (new Set(server.told).size < which.length) await server.next();
      expect([...new Set(server.told)].sort()).toEqual(which.map((one) => ids[one]).sort());
    } finally {
      server.close();
    }
  });
});

describe('sessions', () => {
  it('are listed for their owner and end one by one', async () => {
    const { person, cookie } = await makePerson(database, 'Sessions');
    const second = cookieOf(await post('/sign-in/email', { email: person.email, password: testPassword }));
    const list = (await (await get('/list-sessions', cookie)).json()) as { token: string; userId: string }[];
    expect(list).toHaveLength(2);
    expect(list.every((session) => session.userId === person.id)).toBe(true);
    const token = list.find((session) => second.includes(session.token))!.token;
    expect((await post('/revoke-session', { token }, cookie)).status).toBe(200);
    expect((await me(second)).status).toBe(401);
    expect((await me(cookie)).status).toBe(200);
  });

  it('of somebody else do not end', async () => {
    const one = await makePerson(database, 'One');
    const two = await makePerson(database, 'Two');
    const [session] = (await (await get('/list-sessions', two.cookie)).json()) as { token: string }[];
    await post('/revoke-session', { token: session.token }, one.cookie);
    expect((await me(two.cookie)).status).toBe(200);
  });

  it('are dead after signing out, for who kept the cookie too', async () => {
    const { cookie } = await makePerson(database, 'Out');
    expect((await post('/sign-out', {}, cookie)).status).toBe(200);
    expect((await me(cookie)).status).toBe(401);
  });

  it('end with the account', async () => {
    const { person, cookie } = await makePerson(database, 'Gone');
    const signedIn = await post('/sign-in/email', { email: person.email, password: testPassword });
    await database.query('delete from users where id = $1', [person.id]);
    expect([(await me(cookie)).status, (await me(cookieOf(signedIn))).status]).toEqual([401, 401]);
    const again = await post('/sign-in/email', { email: person.email, password: testPassword });
    expect(again.status).toBe(401);
  });

  it('end when they run out, and when their owner is no longer proven', async () => {
    const { person, cookie } = await makePerson(database, 'Late');
    await database.query(`update sessions set expires_at = now() - interval '1 second' where user_id = $1`, [
      person.id,
    ]);
    expect((await me(cookie)).status).toBe(401);
    const again = cookieOf(await post('/sign-in/email', { email: person.email, password: testPassword }));
    await database.query('update users set email_verified = false where id = $1', [person.id]);
    expect((await me(again)).status).toBe(401);
  });
});
