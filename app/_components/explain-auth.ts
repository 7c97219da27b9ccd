/** The part of better-auth's error that is shown to a person. */
export interface AuthRefusal {
  status?: number;
  code?: string;
  message?: string;
}

const sentences: Record<string, string> = {
  INVALID_EMAIL_OR_PASSWORD: 'The e-mail or the password is not right. Check both, or set a new password.',
  INVALID_PASSWORD: 'This is not your current password. Check it, or set a new one from the sign-in page.',
  INVALID_EMAIL: 'This is not an e-mail address. Write it like name@firm.example.',
  EMAIL_NOT_VERIFIED:
    'Your address is not confirmed yet. Open the link in the mail that was just sent to it.',
  INVALID_TOKEN: 'This link has been used or has run out. Ask for a new one.',
  TOKEN_EXPIRED: 'This link has run out. Ask for a new one.',
  PASSWORD_TOO_SHORT: 'The password is too short. Use 15 characters or more.',
  PASSWORD_TOO_LONG: 'The password is too long. Use 128 characters or fewer.',
  INVALID_CODE: 'This is not the code that your authenticator shows now. Is its clock right?',
  CODE_USED: 'This code was used already. Wait for the next one.',
  INVALID_BACKUP_CODE: 'This is none of your recovery codes, or it was used already.',
  INVALID_TWO_FACTOR_COOKIE:
    'This took too long, or too many tries. Go back to the password and start again.',
  TOO_MANY_ATTEMPTS_REQUEST_NEW_CODE: 'Too many wrong codes. Go back to the password and start again.',
  ACCOUNT_TEMPORARILY_LOCKED:
    'Ten wrong codes in a row: no code is taken for a quarter of an hour. If it was not you, somebody knows your password; set a new one.',
  SESSION_NOT_FRESH: 'You signed in more than a day ago. Sign out and in again to do this.',
  SESSION_EXPIRED: 'Your session has ended. Sign in again.',
};

/** Refusals of ours, whose message says what to do. */
const ownWords = ['TOO_MANY_ATTEMPTS', 'WEAK_PASSWORD', 'WRONG_CODE', 'CODE_NEEDED'];

/** One sentence for a refusal of the sign-in service: what happened and what to do. */
export function explainAuth(refusal: AuthRefusal): string {
  const known = refusal.code ? sentences[refusal.code] : undefined;
  if (known) return known;
  if (refusal.message && ownWords.includes(refusal.code ?? '')) return refusal.message;
  if (refusal.status === 429) return 'Too many tries in a short time. Wait a minute, then try again.';
  if (refusal.status === 401) return 'Your session has ended. Sign in again.';
  if (refusal.status !== undefined && refusal.status >= 500)
    return 'The server could not do this now. Nothing was changed; try again in a moment.';
  return refusal.message ? refusal.message : 'The request was refused. Check what you wrote and try again.';
}

/** Runs a call of the sign-in client; a lost connection becomes a refusal instead of an exception. */
export async function askAuth<T>(
  call: () => Promise<{ data: T; error: AuthRefusal | null }>,
): Promise<{ data: T | null; problem: string | null; refusal: AuthRefusal | null }> {
  try {
    const { data, error } = await call();
    return error
      ? { data: null, problem: explainAuth(error), refusal: error }
      : { data, problem: null, refusal: null };
  } catch {
    return {
      data: null,
      problem: 'The server did not answer. Check the connection and try again.',
      refusal: { status: 0 },
    };
  }
}
