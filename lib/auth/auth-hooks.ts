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
const Changed = z.object({ user: z.object({ id: z.string() }) });

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
  if (ctx.path === '/change-password') {
    // It asks for the same password as signing does, so it shares that count.
    const session = await getSessionFromCtx(ctx);
    if (!session) return;
    const { count, retryAfterS } = await countConfirmAttempt(session.user.id);
    if (count > confirmAttempts)
      throw tooMany('Too many wrong passwords. Wait a quarter of an hour and try again.', retryAfterS);
  }
});

export const after = createAuthMiddleware(async (ctx) => {
  const signedIn = ctx.context.newSession;
  if (ctx.path === '/sign-in/email' && signedIn) await forgetSignInAttempts(signedIn.user.email);
  if (ctx.path === '/change-password' && !isAPIError(ctx.context.returned)) {
    const changed = Changed.safeParse(ctx.context.returned);
    if (changed.success) await forgetConfirmAttempts(changed.data.user.id);
  }
});
