import { codeKey, confirmBudget, forgetTries, spendTry } from './attempts-data';
import { isRecoveryCode, takeCode } from './second-factor-data';

/** Seconds to wait before a code is looked at again, or what became of this one. */
export type CodeTried = { waitS: number } | 'taken' | 'used' | 'wrong';

/**
 * Looks at a code that a signed-in person gives besides their password. Counted before it is looked at, alike
 * wherever codes are asked for; a right one makes the count whole again.
 * @param recovery a recovery code does as well; it is looked at, not spent
 */
export async function tryCode(personId: string, code: string, recovery = false): Promise<CodeTried> {
  const waitS = await spendTry(codeKey(personId), confirmBudget);
  if (waitS > 0) return { waitS };
  const isOther = recovery && !/^\d{6}$/.test(code);
  const tried = isOther
    ? (await isRecoveryCode(personId, code))
      ? 'taken'
      : 'wrong'
    : await takeCode(personId, code);
  if (tried === 'taken') await forgetTries(codeKey(personId));
  return tried;
}
