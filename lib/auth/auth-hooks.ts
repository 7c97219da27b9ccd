import { APIError, createAuthMiddleware, getSessionFromCtx, isAPIError } from 'better-auth/api';
import { z } from 'zod';
import { shortText, zoneOrUtc } from '@/lib/workspaces/schemas';
import { confirmBudget, confirmKey, forgetTries, spendTry } from './attempts-data';
import { afterSecondFactor, beforeSecondFactor } from './second-factor-hooks';
import { knowDevice, settleSignInTry, spendSignInTry } from './sign-in-tries';
import { waitWords } from './wait-words';
import { refuseWeak } from './weak-password';

/** Nothing else is taken: a field too many is refused before the service looks whether the address is known. */
const SignUp = z.strictObject({
  name: shortText('your name', 80),
  email: z.email().max(254),
  password: z.string(),
  timeZone: zoneOrUtc,
  callbackURL: z.string().optional(),
  rememberMe: z.boolean().optional(),
});
const Address = z.object({ email: z.string().max(254) });
/** Endpoints that ask a signed-in person for their password; they share their count with signing. */
const askingPassword = [
  '/change-password',
  '/two-factor/enable',
  '/two-factor/disable',
  '/two-factor/generate-backup-codes',
];
/** Whose password a request has asked for, from its first hook to its last. */
const asked = new WeakMap<object, string>();
/** Whose mailbox a request has proven with the link in it. */
const proven = new WeakMap<object, string>();

const tooMany = (message: string, retryAfterS: number) =>
  new APIError(
    'TOO_MANY_REQUESTS',
    { code: 'TOO_MANY_ATTEMPTS', message },
    { 'retry-after': String(retryAfterS) },
  );

/** Before the service answers: names as ours are, and limits for each account besides those for each caller. */
export const before = createAuthMiddleware(async (ctx) => {
  if (ctx.path === '/sign-up/email') {
    const given = SignUp.safeParse(ctx.body);
    if (!given.success)
      throw new APIError('BAD_REQUEST', { code: 'INVALID_INPUT', message: given.error.issues[0].message });
    await refuseWeak(given.data.password, given.data);
    return { context: { body: given.data } };
  }
  if (ctx.path === '/sign-in/email') {
    const given = Address.safeParse(ctx.body);
    if (!given.success) return;
    const wait = await spendSignInTry(ctx, given.data.email);
    if (wait > 0)
      throw tooMany(
        `Too many tries for this address. Wait ${waitWords(wait)}, or set a new password from the sign-in page.`,
        wait,
      );
  }
  if (ctx.path === '/reset-password') {
    const token = z.object({ token: z.string() }).safeParse(ctx.body);
    const identifier = token.success ? `reset-password:${token.data.token}` : '';
    const found = identifier ? await ctx.context.internalAdapter.findVerificationValue(identifier) : null;
    const user = found ? await ctx.context.internalAdapter.findUserById(found.value) : null;
    if (user) {
      await refuseWeak(ctx.body?.newPassword, user);
      proven.set(ctx.context, user.email);
    }
  }
  if (askingPassword.includes(ctx.path)) {
    const session = await getSessionFromCtx(ctx);
    if (!session) return;
    if (ctx.path === '/change-password') await refuseWeak(ctx.body?.newPassword, session.user);
    const wait = await spendTry(confirmKey(session.user.id), confirmBudget);
    if (wait > 0) throw tooMany(`Too many wrong passwords. Wait ${waitWords(wait)} and try again.`, wait);
    asked.set(ctx.context, session.user.id);
  }
  return beforeSecondFactor(ctx);
});

export const after = createAuthMiddleware(async (ctx) => {
  const { newSession, returned } = ctx.context;
  // Leading on to a page is an error to the service, and the end of a proven address to us.
  const refused = isAPIError(returned) && returned.status !== 'FOUND';
  if (refused) return;
  if (ctx.path === '/sign-in/email') await settleSignInTry(ctx);
  const personId = asked.get(ctx.context);
  if (personId) await forgetTries(confirmKey(personId));
  await afterSecondFactor(ctx);
  // The right password alone makes no device known where a second factor is still asked for.
  const half = ctx.path === '/sign-in/email' && newSession?.user.twoFactorEnabled;
  const email = proven.get(ctx.context) ?? (half ? undefined : newSession?.user.email);
  if (email) await knowDevice(ctx, email);
});
