import { createHash } from 'node:crypto';
import { eq, sql } from 'drizzle-orm';
import { uuidv7 } from 'uuidv7';
import { authDatabase } from '@/db/client';
import { rateLimits } from '@/db/schema/identity';

const windowMs = 15 * 60_000;
const keyOf = (email: string) =>
  `sign-in:${createHash('sha256').update(email.trim().toLowerCase()).digest('hex')}`;

/**
 * Counts one sign-in attempt for an address, in one statement, for every web process alike. Returns how many
 * were made since the window opened and how long it stays open.
 */
export async function countSignInAttempt(email: string): Promise<{ count: number; retryAfterS: number }> {
  const now = Date.now();
  const expired = sql`${rateLimits.lastRequest} < ${now - windowMs}`;
  const [row] = await authDatabase()
    .insert(rateLimits)
    .values({ id: uuidv7(), key: keyOf(email), count: 1, lastRequest: now })
    .onConflictDoUpdate({
      target: rateLimits.key,
      set: {
        count: sql`case when ${expired} then 1 else ${rateLimits.count} + 1 end`,
        lastRequest: sql`case when ${expired} then ${now} else ${rateLimits.lastRequest} end`,
      },
    })
    .returning();
  return { count: row.count, retryAfterS: Math.max(1, Math.ceil((row.lastRequest + windowMs - now) / 1000)) };
}

/** A right password starts the count anew. */
export async function forgetSignInAttempts(email: string): Promise<void> {
  await authDatabase()
    .delete(rateLimits)
    .where(eq(rateLimits.key, keyOf(email)));
}
