import { authClient } from './auth-client';

/** Ends the session, forgets what this browser kept for the person, and loads the sign-in page afresh. */
export async function signOut(): Promise<void> {
  const { error } = await authClient.signOut();
  if (error && error.status !== 401) throw new Error('The session could not be ended.');
  window.sessionStorage.clear();
  window.localStorage.clear();
  const databases = (await window.indexedDB.databases?.()) ?? [];
  for (const { name } of databases) if (name) window.indexedDB.deleteDatabase(name);
  window.location.replace('/sign-in');
}
