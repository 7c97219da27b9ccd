import type { GenericEndpointContext } from '@better-auth/core';
import { APIError, getSessionFromCtx } from 'better-auth/api';
import { z } from 'zod';
import { endSessionSockets } from '@/lib/workspaces/end-person-sockets';
import { queueIdentityMail } from './auth-data';
import { isPassword } from './is-password';
import { hashRecoveryCode } from './recovery-codes';
import { endOtherSessions, readSecondFactor, takeCode } from './second-factor-data';
import { tryCode } from './try-code';
import { waitWords } from './wait-words';

const Password = z.strictObject({ password: z.string().max(256) });
/** Whoever has a session and the password of another may not do away with the factor that they lack. */
const Both = Password.extend({ code: z.string().max(60).optional() });
const Code = z.strictObject({
  code: z
    .string()
    .max(20)
    .transform((code) => code.replace(/\s/g, ''))
    .pipe(z.string().regex(/^\d{6}$/, 'The code has six digits.')),
});
const RecoveryCode = z.strictObject({ code: z.string().min(1).max(60) });

/** What each endpoint takes, and nothing else: no device is trusted without a code, no other kind of factor is set up. */
const inputs: Record<string, z.ZodType<{ password?: string; code?: string }>> = {
  '/two-factor/enable': Password,
  '/two-factor/disable': Both,
  '/two-factor/generate-backup-codes': Both,
  '/two-factor/verify-totp': Code,
  '/two-factor/verify-backup-code': RecoveryCode,
};

type Asked = { user: { id: string; name: string; email: string } };
/** Who set up a second factor in a request, from its first hook to its last. */
const settingUp = new WeakMap<object, Asked>();

/** The person whose password was right a moment ago, as the service's own cookie says; null for nobody. */
async function challenged(ctx: GenericEndpointContext): Promise<string | null> {
  const { name } = ctx.context.createAuthCookie('two_factor');
  const identifier = await ctx.getSignedCookie(name, ctx.context.secret);
  const challenge = identifier ? await ctx.context.internalAdapter.findVerificationValue(identifier) : null;
  return challenge && challenge.expiresAt > new Date() ? challenge.value : null;
}

/**
 * Before the service looks at a second factor: inputs as ours are, recovery codes as their hashes, and each code of
 * an authenticator marked as used. A wrong one goes on to the service, which counts it.
 */
export async function beforeSecondFactor(ctx: GenericEndpointContext) {
  const shape = inputs[ctx.path];
  if (!shape) return;
  const given = shape.safeParse(ctx.body);
  if (!given.success)
    throw new APIError('BAD_REQUEST', { code: 'INVALID_INPUT', message: given.error.issues[0].message });
  const { password, code = '' } = given.data;
  const session = await getSessionFromCtx(ctx);
  if (!ctx.path.startsWith('/two-factor/verify-')) {
    if (shape === Both && session) await proveFactor(session.user.id, password ?? '', given.data.code);
    return { context: { body: { password } } };
  }
  // Who is signed in has nothing to prove here, except the code that ends setting up.
  if (session && (session.user.twoFactorEnabled || ctx.path !== '/two-factor/verify-totp'))
    throw new APIError('BAD_REQUEST', { code: 'SIGNED_IN_ALREADY', message: 'You are signed in already.' });
  if (ctx.path === '/two-factor/verify-backup-code')
    return { context: { body: { code: hashRecoveryCode(code) } } };
  if (session) settingUp.set(ctx.context, session);
  const personId = session?.user.id ?? (await challenged(ctx));
  if (personId && (await takeCode(personId, code)) === 'used') throw refuse.used();
  return { context: { body: { code } } };
}

const refuse = {
  used: () =>
    new APIError('UNAUTHORIZED', {
      code: 'CODE_USED',
      message: 'This code was used already. Wait for the next one.',
    }),
  wrong: () =>
    new APIError('UNAUTHORIZED', {
      code: 'WRONG_CODE',
      message: 'This is neither the code that your authenticator shows now nor one of your recovery codes.',
    }),
  missing: () =>
    new APIError('BAD_REQUEST', {
      code: 'CODE_NEEDED',
      message: 'Your second factor is on: give a code of your authenticator, or a recovery code.',
    }),
};

/**
 * Where a second factor is on, it ends and its recovery codes change only with a code of it, or a recovery code. A wrong
 * password goes on to the service, which refuses it, before any code is marked as used.
 */
async function proveFactor(id: string, password: string, code?: string): Promise<void> {
  if (!(await readSecondFactor(id)).on) return;
  if (!(await isPassword(id, password))) return;
  if (!code?.trim()) throw refuse.missing();
  const tried = await tryCode(id, code.replace(/\s/g, ''), true);
  if (typeof tried === 'object')
    throw new APIError(
      'TOO_MANY_REQUESTS',
      {
        code: 'TOO_MANY_ATTEMPTS',
        message: `Too many wrong codes. Wait ${waitWords(tried.waitS)} and try again.`,
      },
      { 'retry-after': String(tried.waitS) },
    );
  if (tried !== 'taken') throw refuse[tried]();
}

/** After the service has done it: sessions of before end with a new second factor, and the person is told. */
export async function afterSecondFactor(ctx: GenericEndpointContext) {
  if (!(ctx.path in inputs)) return;
  const setUp = settingUp.get(ctx.context);
  const user = setUp?.user ?? ctx.context.newSession?.user ?? ctx.context.session?.user;
  if (!user) return;
  const tell = (what: 'on' | 'off' | 'new-codes' | 'code-spent', codesLeft = 0) =>
    queueIdentityMail({
      template: 'second-factor',
      to: { email: user.email, name: user.name },
      what,
      codesLeft,
    });
  if (setUp && ctx.context.newSession) {
    const ended = await endOtherSessions(user.id, ctx.context.newSession.session.token);
    for (const id of ended) void endSessionSockets(id);
    await tell('on');
  }
  if (ctx.path === '/two-factor/disable') await tell('off');
  if (ctx.path === '/two-factor/generate-backup-codes') await tell('new-codes');
  if (ctx.path === '/two-factor/verify-backup-code')
    await tell('code-spent', (await readSecondFactor(user.id)).codesLeft);
}
