import { createHash } from 'node:crypto';
import type { GenericEndpointContext } from '@better-auth/core';
import { getIP } from '@better-auth/core/utils/ip';
import { authEnv } from '@/lib/env/env';
import { forgetTries, giveTryBack, spendTry, type Budget } from './attempts-data';
import { findOwner } from './auth-data';
import { deviceCookie, deviceLifeS, deviceOf, rememberDevice } from './known-device';

/**
 * Wrong passwords for one address. From devices that never signed in: 20 in any quarter of an hour and 56 in an hour,
 * whatever networks they come from (NIST SP 800-63B-4 asks for 100 at most), and of these no more than 5, then one
 * each 3 minutes, from one network. A device that the account knows has a count of its own.
 */
export const strangersBudget: Budget = { burst: 8, everyMs: 75_000 };
export const networkBudget: Budget = { burst: 5, everyMs: 180_000 };
export const deviceBudget: Budget = { burst: 5, everyMs: 180_000 };

type Spent = { own: string | null; shared: string | null };
/** What a request has spent, from its first hook to its last. */
const spent = new WeakMap<object, Spent>();

const digest = (text: string) => createHash('sha256').update(text).digest('base64url');
const cookieOf = (ctx: GenericEndpointContext) =>
  ctx.context.createAuthCookie(deviceCookie, { maxAge: deviceLifeS });

/** Where the caller comes from, told only by a proxy that we trust. IPv6 addresses count by their /64. */
function networkOf(ctx: GenericEndpointContext): string | null {
  const source = ctx.request ?? ctx.headers;
  return authEnv().TRUSTED_PROXY && source ? getIP(source, ctx.context.options) : null;
}

/**
 * Counts one try to sign in, alike for known and unknown addresses.
 * @returns seconds to wait before the next one is looked at; 0 to go on
 */
export async function spendSignInTry(ctx: GenericEndpointContext, email: string): Promise<number> {
  const address = email.trim().toLowerCase();
  const owner = await findOwner(address);
  const device = owner ? deviceOf(ctx.getCookie(cookieOf(ctx).name), owner) : null;
  if (owner && device) {
    const own = `sign-in:device:${digest(`${owner.id} ${device}`)}`;
    const wait = await spendTry(own, deviceBudget);
    if (wait === 0) spent.set(ctx.context, { own, shared: null });
    return wait;
  }
  const network = networkOf(ctx);
  const own = network ? `sign-in:network:${digest(`${address} ${network}`)}` : null;
  const waitHere = own ? await spendTry(own, networkBudget) : 0;
  if (waitHere > 0) return waitHere;
  const shared = `sign-in:address:${digest(address)}`;
  const wait = await spendTry(shared, strangersBudget);
  if (wait === 0) spent.set(ctx.context, { own, shared });
  else if (own) await giveTryBack(own, networkBudget);
  return wait;
}

/** The password was right: the try was no guess, and what was tried before from there is forgotten. */
export async function settleSignInTry(ctx: GenericEndpointContext): Promise<void> {
  const { own, shared } = spent.get(ctx.context) ?? {};
  if (own) await forgetTries(own);
  if (shared) await giveTryBack(shared, strangersBudget);
}

/** Lets the browser keep that this account has signed in on it, or proved its mailbox on it. */
export async function knowDevice(ctx: GenericEndpointContext, email: string): Promise<void> {
  const owner = await findOwner(email);
  if (!owner) return;
  const { name, attributes } = cookieOf(ctx);
  ctx.setCookie(name, rememberDevice(ctx.getCookie(name), owner), attributes);
}
