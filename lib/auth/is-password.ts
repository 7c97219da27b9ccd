import { verifyPassword } from 'better-auth/crypto';
import { and, eq } from 'drizzle-orm';
import { authDatabase } from '@/db/client';
import { accounts } from '@/db/schema/identity';

/** Whether this is a person's password; never where they have none. It counts nothing: the caller does. */
export async function isPassword(personId: string, password: string): Promise<boolean> {
  const [account] = await authDatabase()
    .select({ password: accounts.password })
    .from(accounts)
    .where(and(eq(accounts.userId, personId), eq(accounts.providerId, 'credential')));
  return account?.password ? verifyPassword({ hash: account.password, password }) : false;
}
