import { beforeAll, describe, expect, it } from 'vitest';
import { deviceOf, rememberDevice, type Owner } from '@/lib/auth/known-device';
import { setEnvironment } from '@/tests/support/test-environment';

const owner = (n: number): Owner => ({ id: `person-${n}`, passwordHash: `hash-${n}` });
const day = 86_400_000;
const now = 20_000 * day;

beforeAll(() => {
  setEnvironment({
    APP_URL: 'http://127.0.0.1:3000',
    AUTH_DATABASE_URL: 'postgres://firstpull_auth:x@127.0.0.1:1/none',
    BETTER_AUTH_SECRET: 'a secret of more than thirty-two characters',
  });
});

describe('the cookie of a known device', () => {
  it('is known to the account that signed in, keeps its name, and says nothing of whose it is', () => {
    const cookie = rememberDevice(null, owner(1), now);
    const name = deviceOf(cookie, owner(1), now);
    expect(name).toMatch(/^[A-Za-z0-9_-]{22}$/);
    expect(cookie).not.toContain('person');
    expect(deviceOf(rememberDevice(cookie, owner(1), now + day), owner(1), now + day)).toBe(name);
    expect(rememberDevice(cookie, owner(1), now + day).split('~')).toHaveLength(1);
  });

  it('is no other account’s, and none any more once the password is another', () => {
    const cookie = rememberDevice(undefined, owner(1), now);
    expect(deviceOf(cookie, owner(2), now)).toBeNull();
    expect(deviceOf(cookie, { ...owner(1), passwordHash: 'new' }, now)).toBeNull();
  });

  it('lasts 180 days from the last sign-in, and is not from the future', () => {
    const cookie = rememberDevice(undefined, owner(1), now);
    expect(deviceOf(cookie, owner(1), now + 180 * day)).not.toBeNull();
    expect(deviceOf(cookie, owner(1), now + 181 * day)).toBeNull();
    expect(deviceOf(cookie, owner(1), now - day)).toBeNull();
  });

  it('holds the last four accounts of a shared computer', () => {
    let cookie: string | null = null;
    for (let n = 1; n <= 6; n++) cookie = rememberDevice(cookie, owner(n), now);
    const known = [1, 2, 3, 4, 5, 6].filter((n) => deviceOf(cookie, owner(n), now));
    expect(known).toEqual([3, 4, 5, 6]);
    expect(cookie!.length).toBeLessThan(400);
  });

  const flip = (letter: string) => (letter === 'A' ? 'E' : 'A');
  it.each([
    ['nothing', () => ''],
    ['another name', (cookie: string) => flip(cookie[0]) + cookie.slice(1)],
    ['a later day', (cookie: string) => cookie.replace('.20000.', '.20001.')],
    ['another hash', (cookie: string) => cookie.slice(0, -1) + flip(cookie.at(-1)!)],
    ['a hash cut short', (cookie: string) => cookie.slice(0, -1)],
    ['much before it', (cookie: string) => `${'~'.repeat(10_000)}${cookie}`],
  ])('is not known with %s', (_what, change) => {
    const cookie = rememberDevice(undefined, owner(1), now);
    expect(deviceOf(cookie, owner(1), now + day)).not.toBeNull();
    expect(deviceOf(change(cookie), owner(1), now + day)).toBeNull();
  });
});
