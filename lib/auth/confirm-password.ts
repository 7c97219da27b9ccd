import { AppError, forbidden } from '@/lib/errors/app-error';
import { confirmBudget, confirmKey, forgetTries, spendTry } from './attempts-data';
import type { Person } from './context';
import { isPassword } from './is-password';
import { readSecondFactor } from './second-factor-data';
import { tryCode } from './try-code';
import { waitWords } from './wait-words';

/**
 * Asks a signed-in person for their password again, as signing does, and for a code of their authenticator where
 * they have a second factor. Both come in the request that names the digest and the gate, are never stored, and
 * the code is marked as used: the proof serves that one act. Each attempt is counted before it is looked at; after
 * five wrong ones the next must wait (`limit_exceeded`, with retryAfterS). Refusals: `wrong-password`,
 * `code-needed`, `wrong-code`.
 */
export async function confirmPassword(
  person: Person,
  password: string,
  code?: string,
): Promise<'password' | 'password+totp'> {
  const retryAfterS = await spendTry(confirmKey(person.id), confirmBudget);
  if (retryAfterS > 0)
    throw new AppError(
      'limit_exceeded',
      `Too many wrong passwords. Wait ${waitWords(retryAfterS)} and try again.`,
      { retryAfterS },
    );
  if (!(await isPassword(person.id, password)))
    throw forbidden('That is not your password. Nothing was signed.', 'wrong-password');
  const { on } = await readSecondFactor(person.id);
  if (on) await confirmCode(person, code);
  await forgetTries(confirmKey(person.id));
  return on ? 'password+totp' : 'password';
}

async function confirmCode(person: Person, code: string | undefined): Promise<void> {
  if (code === undefined)
    throw forbidden(
      'Your second factor is on: give the code that your authenticator shows. Nothing was signed.',
      'code-needed',
    );
  const tried = await tryCode(person.id, code);
  if (typeof tried === 'object')
    throw new AppError(
      'limit_exceeded',
      `Too many wrong codes. Wait ${waitWords(tried.waitS)} and try again.`,
      { retryAfterS: tried.waitS },
    );
  if (tried === 'used')
    throw forbidden('This code was used already. Wait for the next one. Nothing was signed.', 'wrong-code');
  if (tried === 'wrong')
    throw forbidden(
      'That is not the code that your authenticator shows now. Nothing was signed.',
      'wrong-code',
    );
}
