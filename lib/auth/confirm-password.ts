import { verifyPassword } from 'better-auth/crypto';
import { and, eq } from 'drizzle-orm';
import { authDatabase } from '@/db/client';
import { accounts } from '@/db/schema/identity';
import { AppError, forbidden } from '@/lib/errors/app-error';
import { confirmAttempts, countConfirmAttempt, forgetConfirmAttempts } from './attempts-data';
import type { Person } from './context';

/**
 * Asks a signed-in person for their password again, as signing does. Each attempt is counted before it is
 * looked at; after five in fifteen minutes the rest of that time is closed (`limit_exceeded`, with
 * retryAfterS), changing the password included. A right one starts anew; a wrong one is `wrong-password`.
 */
export async function confirmPassword(person: Person, password: string): Promise<'password'> {
  const { count, retryAfterS } = await countConfirmAttempt(person.id);
  if (count > confirmAttempts)
    throw new AppError(
      'limit_exceeded',
      'Too many wrong passwords. Wait a quarter of an hour and try again.',
      { retryAfterS },
    );
  const [account] = await authDatabase()
    .select({ password: accounts.password })
    .from(accounts)
    .where(and(eq(accounts.userId, person.id), eq(accounts.providerId, 'credential')));
  const right = account?.password ? await verifyPassword({ hash: account.password, password }) : false;
  if (!right) throw forbidden('That is not your password. Nothing was signed.', 'wrong-password');
  await forgetConfirmAttempts(person.id);
  return 'password';
}
