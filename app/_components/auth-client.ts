'use client';

import { createAuthClient } from 'better-auth/react';

/** Talks to `/api/auth` of the same origin. Workspaces and roles are read through `/api/v1`, never from here. */
export const authClient = createAuthClient({
  basePath: '/api/auth',
  // Where to go next is decided here by `safePath`, never by an answer.
  disableDefaultFetchPlugins: true,
});
