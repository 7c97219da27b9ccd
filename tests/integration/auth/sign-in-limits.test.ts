import { beforeAll, describe, expect, it } from 'vitest';
import { POST } from '@/app/api/auth/[...all]/route';
import { spendTry } from '@/lib/auth/attempts-data';
import { deviceBudget, networkBudget, strangersBudget } from '@/lib/auth/sign-in-tries';
import { callRoute, cookieOf } from '@/tests/support/call-route';
import { freshDatabase, type FreshDatabase } from '@/tests/support/database';
import { makePerson, testPassword } from '@/tests/support/make-house';
import { setEnvironment } from '@/tests/support/test-environment';

/** Behind a proxy that is trusted: networks are told apart by what it adds to X-Forwarded-For. */
const proxy = '192.0.2.1';
let database: FreshDatabase;
beforeAll(async () => {
  database = await freshDatabase();
  setEnvironment({ TRUSTED_PROXY: proxy });
});

type From = { network?: string; cookie?: string };
const post = (path: string, body: unknown, { network, cookie }: From = {}) =>
  callRoute(POST, {
    path: `/api/auth${path}`,
    body,
    cookie,
    headers: network ? { 'x-forwarded-for': `10.9.8.7, ${network}, ${proxy}` } : {},
  });
const guess = (email: string, from: From) =>
  post('/sign-in/email', { email, password: 'wrong wrong wrong' }, from);
const right = (email: string, from: From) => post('/sign-in/email', { email, password: testPassword }, from);
/** As if that much time had gone by for every count. */
const later = (ms: number) => database.query('update rate_limits set last_request = last_request - $1', [ms]);
const onlyDevice = (cookie: string) => cookie.split('; ').find((one) => one.includes('known_device'))!;

describe('guesses at one account', () => {
  it('from two hundred networks: few are looked at, and the owner still gets in on a known device', async () => {
    const { person } = await makePerson(database, 'Target');
    const cookie = onlyDevice(cookieOf(await right(person.email, { network: '198.51.100.1' })));
    const answers: Response[] = [];
    for (let i = 0; i < 200; i++) {
      const email = i % 2 ? person.email : ` ${person.email.toUpperCase()}`.trim();
      answers.push(await guess(email, { network: `203.0.113.${i}` }));
    }
    const looked = answers.filter((answer) => answer.status === 401).length;
    expect(looked).toBeGreaterThanOrEqual(strangersBudget.burst);
    expect(looked).toBeLessThanOrEqual(20);
    expect(answers.length - looked).toBe(answers.filter((answer) => answer.status === 429).length);
    const wait = Number(answers.at(-1)!.headers.get('retry-after'));
    expect(wait).toBeGreaterThan(0);
    expect(wait).toBeLessThanOrEqual(strangersBudget.everyMs / 1000);

    const stranger = await right(person.email, { network: '198.51.100.99' });
    expect(stranger.status).toBe(429);
    const owner = await right(person.email, { network: '198.51.100.1', cookie });
    expect(owner.status).toBe(200);
    // It is a delay, not a lock: where there is room again, anybody is looked at.
    await later(strangersBudget.everyMs);
    expect((await right(person.email, { network: '198.51.100.99' })).status).toBe(200);
  });

  it('are at most 20 in a quarter of an hour and 100 in an hour, however patient and parallel they are', async () => {
    const perQuarter: number[] = [];
    for (let minute = 0; minute < 60; minute++) {
      const tries = await Promise.all(
        Array.from({ length: 10 }, () => spendTry('sign-in:address:patient', strangersBudget)),
      );
      const quarter = Math.floor(minute / 15);
      perQuarter[quarter] = (perQuarter[quarter] ?? 0) + tries.filter((wait) => wait === 0).length;
      await later(60_000);
    }
    expect(Math.max(...perQuarter)).toBeLessThanOrEqual(20);
    const sum = perQuarter.reduce((a, b) => a + b);
    expect(sum).toBeLessThanOrEqual(100);
    expect(sum).toBeGreaterThanOrEqual(50);
  });

  it('from one network do not keep other networks out', async () => {
    const { person } = await makePerson(database, 'Neighbour');
    const statuses: number[] = [];
    for (let i = 0; i < 12; i++)
      statuses.push((await guess(person.email, { network: '203.0.113.200' })).status);
    expect(statuses.filter((status) => status === 401)).toHaveLength(networkBudget.burst);
    expect((await right(person.email, { network: '203.0.113.200' })).status).toBe(429);
    expect((await right(person.email, { network: '203.0.113.201' })).status).toBe(200);
    // IPv6 counts by the /64 that one caller has.
    const six = await makePerson(database, 'Six');
    for (let i = 0; i < networkBudget.burst; i++)
      await guess(six.person.email, { network: `2001:db8:1:1::${i + 1}` });
    expect((await right(six.person.email, { network: '2001:db8:1:1::ffff' })).status).toBe(429);
    expect((await right(six.person.email, { network: '2001:db8:1:2::1' })).status).toBe(200);
  });

  it('on a known device have a count of their own, for that account alone', async () => {
    const { person } = await makePerson(database, 'Borrowed');
    const victim = await makePerson(database, 'Victim');
    const cookie = onlyDevice(cookieOf(await right(person.email, { network: '198.51.100.7' })));
    const statuses: number[] = [];
    for (let i = 0; i < 10; i++)
      statuses.push((await guess(person.email, { network: `198.51.101.${i}`, cookie })).status);
    expect(statuses.filter((status) => status === 401)).toHaveLength(deviceBudget.burst);
    expect((await right(person.email, { network: '198.51.100.8' })).status).toBe(200);
    // Somebody else's cookie is a stranger's.
    for (let i = 0; i < strangersBudget.burst; i++)
      await guess(victim.person.email, { network: `198.51.102.${i}` });
    const asStranger = await guess(victim.person.email, { network: '198.51.103.1', cookie });
    expect(asStranger.status).toBe(429);
  });

  it('count alike for an address that nobody has', async () => {
    const answers: Response[] = [];
    for (let i = 0; i <= strangersBudget.burst; i++)
      answers.push(await guess('nobody.at.all@example.test', { network: `203.0.114.${i}` }));
    const statuses = answers.map((answer) => answer.status);
    expect(statuses).toEqual([...Array<number>(strangersBudget.burst).fill(401), 429]);
    const { rows } = await database.query<{ keys: string }>(
      `select string_agg(key, ' ') as keys from rate_limits`,
    );
    expect(rows[0].keys).not.toMatch(/@|nobody/);
  });
});

describe('right passwords', () => {
  it('are no guesses: they use nothing up', async () => {
    const { person } = await makePerson(database, 'Often');
    for (let i = 0; i <= strangersBudget.burst; i++)
      expect((await right(person.email, { network: `198.51.104.${i}` })).status).toBe(200);
  });

  it('of strangers who guess are not forgotten because the owner came in', async () => {
    const { person } = await makePerson(database, 'Between');
    for (let i = 0; i < strangersBudget.burst - 1; i++)
      await guess(person.email, { network: `198.51.105.${i}` });
    expect((await right(person.email, { network: '198.51.106.1' })).status).toBe(200);
    expect((await guess(person.email, { network: '198.51.105.100' })).status).toBe(401);
    expect((await guess(person.email, { network: '198.51.105.101' })).status).toBe(429);
  });
});

describe('a new password by mail', () => {
  it('lets the owner in on that device while strangers guess, and makes other devices unknown', async () => {
    const { person } = await makePerson(database, 'Besieged');
    const before = onlyDevice(cookieOf(await right(person.email, { network: '198.51.100.20' })));
    for (let i = 0; i < strangersBudget.burst; i++) await guess(person.email, { network: `198.51.107.${i}` });
    await database.query(
      `insert into verifications (id, identifier, value, expires_at)
       values (gen_random_uuid(), 'reset-password:mailed', $1, now() + interval '1 hour')`,
      [person.id],
    );
    const newPassword = 'thirteen grey gulls on a pier';
    const set = await post('/reset-password', { newPassword, token: 'mailed' }, { network: '198.51.100.21' });
    expect(set.status).toBe(200);
    const signIn = (cookie: string) =>
      post(
        '/sign-in/email',
        { email: person.email, password: newPassword },
        { network: '198.51.100.22', cookie },
      );
    expect((await signIn(before)).status).toBe(429);
    expect((await signIn(cookieOf(set))).status).toBe(200);
  });
});
