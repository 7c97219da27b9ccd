import { hashPassword } from 'better-auth/crypto';
import { eq, sql } from 'drizzle-orm';
import { uuidv7 } from 'uuidv7';
import { authDatabase } from '@/db/client';
import { accounts, sessions, users } from '@/db/schema/identity';
import { conflict, invalid } from '@/lib/errors/app-error';
import type { Person } from './context';
import { weakness } from './weak-password';

const withEmail = (email: string) => eq(sql`lower(${users.email})`, email.toLowerCase());

export async function findAccount(email: string): Promise<{ id: string; emailVerified: boolean } | null> {
  const [row] = await authDatabase()
    .select({ id: users.id, emailVerified: users.emailVerified })
    .from(users)
    .where(withEmail(email));
  return row ?? null;
}

/**
 * Makes an account for an address that a mailed link has just proven. A sign-up that never proved the
 * address is taken over with a new password and no sessions: whoever typed it may be somebody else.
 * @throws invalid where the password is weak; conflict `has-account` where a proven account stands there already
 */
export async function claimAddress(input: {
  email: string;
  name: string;
  password: string;
  /** Of the browser; universal time where none is told. */
  timeZone?: string;
}): Promise<Person> {
  const sentence = await weakness(input.password, input);
  if (sentence) throw invalid(sentence, [{ pointer: '/password', detail: sentence }]);
  const password = await hashPassword(input.password);
  return authDatabase().transaction(async (tx) => {
    const timeZone = input.timeZone ?? 'UTC';
    const fields = { name: input.name, timeZone, emailVerified: true, updatedAt: new Date() };
    await tx
      .insert(users)
      .values({ id: uuidv7(), email: input.email.toLowerCase(), ...fields, emailVerified: false })
      .onConflictDoNothing();
    const [user] = await tx.select().from(users).where(withEmail(input.email)).for('update');
    if (!user || user.emailVerified)
      throw conflict(
        'has-account',
        'This address has an account. Sign in with it, then open the link again.',
      );
    await tx.update(users).set(fields).where(eq(users.id, user.id));
    await tx.delete(sessions).where(eq(sessions.userId, user.id));
    await tx.delete(accounts).where(eq(accounts.userId, user.id));
    await tx
      .insert(accounts)
      .values({ id: uuidv7(), accountId: user.id, providerId: 'credential', userId: user.id, password });
    return {
      id: user.id,
      name: input.name,
      email: user.email,
      units: user.units === 'in' ? 'in' : 'mm',
      timeZone,
    };
  });
}
