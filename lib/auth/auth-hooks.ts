import { APIError, createAuthMiddleware, getSessionFromCtx, isAPIError } from 'better-auth/api';
import { z } from 'zod';
import { shortText } from '@/lib/workspaces/schemas';
import {
  confirmAttempts,
  countConfirmAttempt,
  countSignInAttempt,
  forgetConfirmAttempts,
  forgetSignInAttempts,
} from './attempts-data';
import { afterSecondFactor, beforeSecondFactor } from './second-factor-hooks';

/** Wrong passwords that an address may take in a quarter of an hour. */
export const signInAttempts = 20;

/** Nothing else is taken: a field too many is refused before the service looks whether the address is known. */
const SignUp = z.strictObject({
  name: shortText('your name', 80),
  email: z.email().max(254),
  password: z.string(),
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

const tooMany = (message: string, retryAfterS: number) =>
  new APIError(
    'TOO_MANY_REQUESTS',
    { code: 'TOO_MANY_ATTEMPTS', message },
    { 'retry-after': String(retryAfterS) },
  );

/** Before the service answers: names as ours are, and a limit for each address besides those for each caller. */
export const before = createAuthMiddleware(async (ctx) => {
  if (ctx.path === '/sign-up/email') {
    const given = SignUp.safeParse(ctx.body);
    if (!given.success)
      throw new APIError('BAD_REQUEST', { code: 'INVALID_INPUT', message: given.error.issues[0].message });
    return { context: { body: given.data } };
  }
  if (ctx.path === '/sign-in/email') {
    const given = Address.safeParse(ctx.body);
    if (!given.success) return;
    const { count, retryAfterS } = await countSignInAttempt(given.data.email);
    if (count > signInAttempts)
      throw tooMany(
        'Too many attempts for this address. Wait a quarter of an hour, or reset the password.',
        retryAfterS,
      );
  }
  if (askingPassword.includes(ctx.path)) {
    const session = await getSessionFromCtx(ctx);
    if (!session) return;
    const { count, retryAfterS } = await countConfirmAttempt(session.user.id);
    if (count > confirmAttempts)
      throw tooMany('Too many wrong passwords. Wait a quarter of an hour and try again.', retryAfterS);
    asked.set(ctx.context, session.user.id);
  }
  return beforeSecondFactor(ctx);
});

export const after = createAuthMiddleware(async (ctx) => {
  const signedIn = ctx.context.newSession;
  if (ctx.path === '/sign-in/email' && signedIn) await forgetSignInAttempts(signedIn.user.email);
  const personId = asked.get(ctx.context);
  if (personId && !isAPIError(ctx.context.returned)) await forgetConfirmAttempts(personId);
  await afterSecondFactor(ctx, ctx.context.returned);
});
