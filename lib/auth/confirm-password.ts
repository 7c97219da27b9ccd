import { verifyPassword } from 'better-auth/crypto';
import { and, eq, sql } from 'drizzle-orm';
import { uuidv7 } from 'uuidv7';
import { authDatabase } from '@/db/client';
import { accounts, rateLimits } from '@/db/schema/identity';
import { AppError, forbidden } from '@/lib/errors/app-error';
import type { Person } from './context';

const attempts = 5;
const windowMs = 15 * 60_000;

/**
 * Asks a signed-in person for their password again, as signing does. Five wrong ones in fifteen minutes
 * close it for the rest of that time; the count stands in PostgreSQL, for every process alike.
 */
export async function confirmPassword(person: Person, password: string): Promise<'password'> {
  const key = `confirm:${person.id}`;
  const database = authDatabase();
  const now = Date.now();
  const [limit] = await database.select().from(rateLimits).where(eq(rateLimits.key, key));
  const fresh = limit && now - limit.lastRequest < windowMs;
  if (fresh && limit.count >= attempts) {
    const retryAfterS = Math.ceil((limit.lastRequest + windowMs - now) / 1000);
    throw new AppError(
      'limit_exceeded',
      'Too many wrong passwords. Wait a quarter of an hour and try again.',
      { retryAfterS },
    );
  }
  const [account] = await database
    .select({ password: accounts.password })
    .from(accounts)
    .where(and(eq(accounts.userId, person.id), eq(accounts.providerId, 'credential')));
  const right = account?.password ? await verifyPassword({ hash: account.password, password }) : false;
  if (right) {
    await database.delete(rateLimits).where(eq(rateLimits.key, key));
    return 'password';
  }
  await database
    .insert(rateLimits)
    .values({ id: uuidv7(), key, count: 1, lastRequest: now })
    .onConflictDoUpdate({
      target: rateLimits.key,
      set: {
        count: sql`case when ${rateLimits.lastRequest} < ${now - windowMs} then 1 else ${rateLimits.count} + 1 end`,
        lastRequest: now,
      },
    });
  throw forbidden('That is not your password. Nothing was signed.', 'wrong-password');
}
