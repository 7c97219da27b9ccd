import { createHash } from 'node:crypto';
import { eq, sql } from 'drizzle-orm';
import { uuidv7 } from 'uuidv7';
import { authDatabase } from '@/db/client';
import { rateLimits } from '@/db/schema/identity';

const windowMs = 15 * 60_000;
const keyOf = (email: string) =>
  `sign-in:${createHash('sha256').update(email.trim().toLowerCase()).digest('hex')}`;

type Counted = { count: number; retryAfterS: number };

/** One statement, so that requests made at once are each counted before any of them is answered. */
async function countAttempt(key: string): Promise<Counted> {
  const now = Date.now();
  const expired = sql`${rateLimits.lastRequest} < ${now - windowMs}`;
  const [row] = await authDatabase()
    .insert(rateLimits)
    .values({ id: uuidv7(), key, count: 1, lastRequest: now })
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

async function forgetAttempts(key: string): Promise<void> {
  await authDatabase().delete(rateLimits).where(eq(rateLimits.key, key));
}

/**
 * Counts one sign-in attempt for an address, for every web process alike. Returns how many were made since
 * the window opened and how long it stays open.
 */
export const countSignInAttempt = (email: string): Promise<Counted> => countAttempt(keyOf(email));

/** A right password starts the count anew. */
export const forgetSignInAttempts = (email: string): Promise<void> => forgetAttempts(keyOf(email));

/** Wrong passwords that a signed-in person may give in a quarter of an hour, wherever they are asked for it. */
export const confirmAttempts = 5;

/** Counts one attempt of a signed-in person to prove their password: to sign, or to change it. */
export const countConfirmAttempt = (personId: string): Promise<Counted> =>
  countAttempt(`confirm:${personId}`);

export const forgetConfirmAttempts = (personId: string): Promise<void> =>
  forgetAttempts(`confirm:${personId}`);
