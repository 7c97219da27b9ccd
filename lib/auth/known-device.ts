import { createHmac, randomBytes, timingSafeEqual } from 'node:crypto';
import { authEnv } from '@/lib/env/env';

/**
 * A browser that once signed in keeps a cookie that says so, for up to four accounts: random name, day, and a keyed
 * hash that binds both to the account and its present password. It opens nothing; it only gives sign-in its own
 * count of tries, so that strangers who guess do not use up the owner's.
 */
export const deviceCookie = 'known_device';
export const deviceLifeS = 180 * 24 * 60 * 60;
const accounts = 4;
const entryPattern = /^([A-Za-z0-9_-]{22})\.(\d{1,6})\.([A-Za-z0-9_-]{43})$/;

/** Whose device it is: the account and the hash of its password. */
export type Owner = { id: string; passwordHash: string };

const today = (now: number) => Math.floor(now / 86_400_000);

function mac(owner: Owner, name: string, day: string): string {
  const key = createHmac('sha256', authEnv().BETTER_AUTH_SECRET).update('firstpull known device').digest();
  return createHmac('sha256', key)
    .update([owner.id, owner.passwordHash, name, day].join('\0'))
    .digest('base64url');
}

/** The device's random name, where the cookie says that this account has signed in on it; null otherwise. */
export function deviceOf(cookie: string | null | undefined, owner: Owner, now = Date.now()): string | null {
  for (const entry of (cookie ?? '').split('~').slice(0, accounts)) {
    const [, name, day, given] = entryPattern.exec(entry) ?? [];
    if (!name || today(now) - Number(day) > deviceLifeS / 86_400 || Number(day) > today(now)) continue;
    if (timingSafeEqual(Buffer.from(mac(owner, name, day)), Buffer.from(given))) return name;
  }
  return null;
}

/** The cookie once this account has signed in: as it was for other accounts, anew for this one. */
export function rememberDevice(cookie: string | null | undefined, owner: Owner, now = Date.now()): string {
  const name = deviceOf(cookie, owner, now) ?? randomBytes(16).toString('base64url');
  const day = String(today(now));
  const others = (cookie ?? '')
    .split('~')
    .filter((entry) => entryPattern.test(entry) && !entry.startsWith(`${name}.`));
  return [[name, day, mac(owner, name, day)].join('.'), ...others].slice(0, accounts).join('~');
}
