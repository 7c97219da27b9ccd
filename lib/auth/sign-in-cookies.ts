import { auth } from './auth';

/** Signs a person in and returns the `Set-Cookie` values that carry the session. */
export async function signInCookies(
  credentials: { email: string; password: string },
  headers: Headers,
): Promise<string[]> {
  const { headers: answer } = await auth().api.signInEmail({
    body: credentials,
    headers,
    returnHeaders: true,
  });
  return answer.getSetCookie();
}
