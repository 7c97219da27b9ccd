/** What of the identity service answers under /api/auth; a test holds this against the service's own list. */
export const openPaths = [
  '/sign-up/email',
  '/sign-in/email',
  '/sign-out',
  '/get-session',
  '/verify-email',
  '/send-verification-email',
  '/request-password-reset',
  '/reset-password',
  '/reset-password/:token',
  '/change-password',
  '/list-sessions',
  '/revoke-session',
  '/revoke-sessions',
  '/revoke-other-sessions',
  '/two-factor/enable',
  '/two-factor/disable',
  '/two-factor/generate-backup-codes',
  '/two-factor/verify-totp',
  '/two-factor/verify-backup-code',
  '/organization/list',
  '/ok',
] as const;

const openPatterns = openPaths.map((path) => new RegExp(`^${path.replace(/:[a-z]+/g, '[^/]+')}$`));

/** Whether a path below /api/auth is one that we answer; trailing and doubled slashes are not. */
export const isOpenPath = (path: string) => openPatterns.some((pattern) => pattern.test(path));

/**
 * Everything else is closed. Writing to workspaces, members and invitations is for our verbs, which do it in
 * one transaction with the audit entry and the mail; changing oneself is PATCH /api/v1/me.
 */
export const closedPaths = [
  '/sign-in/social',
  '/callback/:id',
  '/verify-password',
  '/change-email',
  '/update-session',
  '/update-user',
  '/delete-user',
  '/delete-user/callback',
  '/link-social',
  '/list-accounts',
  '/unlink-account',
  '/refresh-token',
  '/get-access-token',
  '/account-info',
  '/error',
  // The secret is shown while it is set up, never again; no codes go by mail or text.
  '/two-factor/get-totp-uri',
  '/two-factor/send-otp',
  '/two-factor/verify-otp',
  '/organization/create',
  '/organization/update',
  '/organization/delete',
  '/organization/set-active',
  '/organization/get-organization',
  '/organization/get-full-organization',
  '/organization/leave',
  '/organization/invite-member',
  '/organization/accept-invitation',
  '/organization/reject-invitation',
  '/organization/cancel-invitation',
  '/organization/get-invitation',
  '/organization/list-invitations',
  '/organization/list-user-invitations',
  '/organization/get-active-member',
  '/organization/get-active-member-role',
  '/organization/has-permission',
  '/organization/check-slug',
  '/organization/remove-member',
  '/organization/update-member-role',
  '/organization/list-members',
];
