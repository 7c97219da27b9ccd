import { betterAuth } from 'better-auth';
import { drizzleAdapter } from 'better-auth/adapters/drizzle';
import { nextCookies } from 'better-auth/next-js';
import { organization } from 'better-auth/plugins';
import { uuidv7 } from 'uuidv7';
import { authDatabase } from '@/db/client';
import { accounts, rateLimits, sessions, users, verifications } from '@/db/schema/identity';
import { invitations, members, workspaces } from '@/db/schema/workspaces';
import { authEnv } from '@/lib/env/env';
import { accessControl, accessRoles } from '@/lib/workspaces/roles';
import { queueIdentityMail } from './auth-data';

/**
 * Endpoints of the organization plugin that write are closed: our verbs write the same tables in one
 * transaction with the audit entry and the mail, which the plugin's own endpoints cannot do.
 */
const closedPaths = [
  '/organization/create',
  '/organization/update',
  '/organization/delete',
  '/organization/leave',
  '/organization/invite-member',
  '/organization/accept-invitation',
  '/organization/reject-invitation',
  '/organization/cancel-invitation',
  '/organization/remove-member',
  '/organization/update-member-role',
  '/organization/get-invitation',
  '/organization/list-invitations',
  '/organization/list-user-invitations',
  '/organization/check-slug',
  '/organization/get-full-organization',
  '/organization/list-members',
  '/delete-user',
  '/change-email',
];

/** Columns that our verbs write; the library knows of them and neither takes nor gives them. */
const ours = { type: 'string', required: true, input: false, returned: false } as const;

function build() {
  const env = authEnv();
  return betterAuth({
    appName: 'Firstpull',
    baseURL: env.APP_URL,
    basePath: '/api/auth',
    secret: env.BETTER_AUTH_SECRET,
    trustedOrigins: [env.APP_URL],
    disabledPaths: closedPaths,
    telemetry: { enabled: false },
    database: drizzleAdapter(authDatabase(), {
      provider: 'pg',
      transaction: true,
      schema: {
        users,
        sessions,
        accounts,
        verifications,
        rate_limits: rateLimits,
        workspaces,
        members,
        invitations,
      },
    }),
    user: {
      modelName: 'users',
      additionalFields: {
        units: { type: 'string', defaultValue: 'mm', input: true },
        timeZone: { type: 'string', defaultValue: 'Europe/Lisbon', input: true },
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
      minPasswordLength: 12,
      maxPasswordLength: 128,
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
      max: 200,
      customRules: {
        '/sign-in/email': { window: 60, max: 20 },
        '/request-password-reset': { window: 300, max: 10 },
        '/send-verification-email': { window: 300, max: 10 },
      },
    },
    advanced: {
      cookiePrefix: 'firstpull',
      useSecureCookies: env.APP_URL.startsWith('https://'),
      // Our verbs fill columns of workspaces and invitations that the plugin does not know; it never writes them.
      database: { generateId: () => uuidv7(), validateSchema: false },
      ipAddress: env.TRUSTED_PROXY
        ? { ipAddressHeaders: ['x-forwarded-for'], trustedProxies: [env.TRUSTED_PROXY] }
        : {},
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
      nextCookies(),
    ],
  });
}

let made: ReturnType<typeof build> | undefined;

/** The identity service. Built at first use, so that a build of the app needs no environment. */
export const auth = () => (made ??= build());
