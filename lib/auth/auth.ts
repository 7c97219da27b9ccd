import { betterAuth } from 'better-auth';
import { isAPIError } from 'better-auth/api';
import { drizzleAdapter } from 'better-auth/adapters/drizzle';
import { nextCookies } from 'better-auth/next-js';
import { organization, twoFactor } from 'better-auth/plugins';
import { uuidv7 } from 'uuidv7';
import { authDatabase } from '@/db/client';
import { accounts, rateLimits, sessions, twoFactors, users, verifications } from '@/db/schema/identity';
import { invitations, members, workspaces } from '@/db/schema/workspaces';
import { authEnv } from '@/lib/env/env';
import { endSessionSockets } from '@/lib/workspaces/end-person-sockets';
import { accessControl, accessRoles } from '@/lib/workspaces/roles';
import { log } from '@/lib/log/log';
import { queueIdentityMail } from './auth-data';
import { after, before } from './auth-hooks';
import { closedPaths } from './endpoints';
import { newRecoveryCodes, recoveryCodeStorage } from './recovery-codes';
import { passwordMax, passwordMin } from './password-rules';

/** Columns that our verbs write; the library knows of them and neither takes nor gives them. */
const ours = { type: 'string', required: true, input: false, returned: false } as const;

function build() {
  const env = authEnv();
  const secure = env.APP_URL.startsWith('https://');
  return betterAuth({
    appName: 'Firstpull',
    baseURL: env.APP_URL,
    basePath: '/api/auth',
    secret: env.BETTER_AUTH_SECRET,
    trustedOrigins: [env.APP_URL],
    disabledPaths: closedPaths,
    telemetry: { enabled: false },
    onAPIError: {
      errorURL: '/sign-in',
      // Refusals are answers, and the service logs those of interest itself; what is left is ours to mend.
      onError: (error) => {
        if (!isAPIError(error)) log().error({ service: 'identity', err: error }, 'identity request failed');
      },
    },
    logger: {
      level: 'warn',
      log: (level, message) => log()[level === 'error' ? 'error' : 'warn']({ service: 'identity' }, message),
    },
    hooks: { before, after },
    // Sockets outlive a request: whichever way a session ends, those that it opened end with it. Nobody waits.
    databaseHooks: {
      session: { delete: { after: async ({ id }) => void endSessionSockets(id) } },
    },
    database: drizzleAdapter(authDatabase(), {
      provider: 'pg',
      transaction: true,
      schema: {
        users,
        sessions,
        accounts,
        verifications,
        two_factors: twoFactors,
        rate_limits: rateLimits,
        workspaces,
        members,
        invitations,
      },
    }),
    user: {
      modelName: 'users',
      additionalFields: {
        units: { type: 'string', defaultValue: 'mm', input: false },
        // At sign-up only, where auth-hooks.ts lets real zones through; the rest of the service is closed to it.
        timeZone: { type: 'string', defaultValue: 'UTC' },
      },
    },
    session: {
      modelName: 'sessions',
      expiresIn: 60 * 60 * 24 * 7,
      updateAge: 60 * 60 * 12,
      cookieCache: { enabled: false },
    },
    account: { modelName: 'accounts' },
    verification: { modelName: 'verifications' },
    emailAndPassword: {
      enabled: true,
      minPasswordLength: passwordMin,
      // In UTF-16 units, where ours counts characters: a character takes two at most, and two may be joined to one.
      maxPasswordLength: passwordMax * 4,
      requireEmailVerification: true,
      revokeSessionsOnPasswordReset: true,
      sendResetPassword: async ({ user, url }) =>
        queueIdentityMail({ template: 'reset-password', to: { email: user.email, name: user.name }, url }),
    },
    emailVerification: {
      sendOnSignUp: true,
      sendOnSignIn: true,
      autoSignInAfterVerification: true,
      sendVerificationEmail: async ({ user, url }) =>
        queueIdentityMail({ template: 'verify-address', to: { email: user.email, name: user.name }, url }),
    },
    rateLimit: {
      enabled: true,
      storage: 'database',
      modelName: 'rate_limits',
      window: 60,
      max: env.TRUSTED_PROXY ? 200 : 2000,
      // Callers are told apart behind a trusted proxy only; otherwise all share one count, which is wider. Each
      // address has its own limit besides (auth-hooks.ts).
      customRules: {
        '/sign-in/email': { window: 60, max: env.TRUSTED_PROXY ? 20 : 300 },
        '/sign-up/email': { window: 300, max: env.TRUSTED_PROXY ? 10 : 100 },
        '/change-password': { window: 60, max: env.TRUSTED_PROXY ? 10 : 100 },
        '/two-factor/*': { window: 60, max: env.TRUSTED_PROXY ? 20 : 300 },
        '/request-password-reset': { window: 300, max: env.TRUSTED_PROXY ? 10 : 100 },
        '/send-verification-email': { window: 300, max: env.TRUSTED_PROXY ? 10 : 100 },
        '/get-session': { window: 60, max: 6000 },
      },
    },
    advanced: {
      // Said outright: where NODE_ENV is "test" the library would leave both checks out.
      disableOriginCheck: false,
      disableCSRFCheck: false,
      // __Host-: sent to this host only, over https only. The library's own switch would say __Secure-.
      cookiePrefix: secure ? '__Host-firstpull' : 'firstpull',
      useSecureCookies: false,
      defaultCookieAttributes: { secure, sameSite: 'lax', httpOnly: true, path: '/' },
      database: { generateId: () => uuidv7() },
      // Without a proxy that we trust, anybody may write X-Forwarded-For: then no header tells the address.
      ipAddress: env.TRUSTED_PROXY
        ? { ipAddressHeaders: ['x-forwarded-for'], trustedProxies: [env.TRUSTED_PROXY] }
        : { ipAddressHeaders: [] },
    },
    plugins: [
      organization({
        ac: accessControl,
        roles: accessRoles,
        allowUserToCreateOrganization: false,
        creatorRole: 'lead',
        requireEmailVerificationOnInvitation: true,
        schema: {
          session: { fields: { activeOrganizationId: 'activeOrganizationId' } },
          organization: {
            modelName: 'workspaces',
            additionalFields: { studioId: ours, code: ours },
          },
          member: { modelName: 'members', fields: { organizationId: 'workspaceId' } },
          invitation: {
            modelName: 'invitations',
            fields: { organizationId: 'workspaceId' },
            additionalFields: { tokenHash: ours },
          },
        },
      }),
      // Codes are marked as used, and recovery codes hashed, in second-factor-hooks.ts.
      twoFactor({
        issuer: 'Firstpull',
        schema: { twoFactor: { modelName: 'two_factors' } },
        backupCodeOptions: {
          customBackupCodesGenerate: newRecoveryCodes,
          storeBackupCodes: recoveryCodeStorage,
        },
      }),
      nextCookies(),
    ],
  });
}

let made: ReturnType<typeof build> | undefined;

/** The identity service. Built at first use, so that a build of the app needs no environment. */
export const auth = () => (made ??= build());
