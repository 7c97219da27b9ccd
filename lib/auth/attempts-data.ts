import { eq, sql } from 'drizzle-orm';
import { uuidv7 } from 'uuidv7';
import { authDatabase } from '@/db/client';
import { rateLimits } from '@/db/schema/identity';

/** `burst` tries at once, then one each `everyMs`: what runs out is only delayed, never closed. */
export type Budget = { burst: number; everyMs: number };

/** How often a signed-in person may give a wrong password or code, wherever they are asked for it. */
export const confirmBudget: Budget = { burst: 5, everyMs: 3 * 60_000 };
export const confirmKey = (personId: string) => `confirm:${personId}`;
/** Codes have a count of their own: the right password elsewhere does not make it whole again. */
export const codeKey = (personId: string) => `code:${personId}`;

const now = sql`(extract(epoch from clock_timestamp()) * 1000)::bigint`;
/** When the budget will be whole again: `last_request` of our keys. */
const whole = sql`greatest(${rateLimits.lastRequest}, ${now})`;

/**
 * Counts one try before it is looked at; the row and the clock are PostgreSQL's, so every process and every restart
 * meets the same count, and tries made at once are each counted (generic cell rate algorithm, one statement).
 * @returns 0 when it may go on; otherwise the seconds until the next one may, and nothing was counted
 */
export async function spendTry(key: string, { burst, everyMs }: Budget): Promise<number> {
  const counted = await authDatabase()
    .insert(rateLimits)
    .values({ id: uuidv7(), key, count: 1, lastRequest: sql`${now} + ${everyMs}` })
    .onConflictDoUpdate({
      target: rateLimits.key,
      set: { count: sql`${rateLimits.count} + 1`, lastRequest: sql`${whole} + ${everyMs}` },
      setWhere: sql`${whole} + ${everyMs} - ${now} <= ${burst * everyMs}`,
    })
    .returning({ id: rateLimits.id });
  if (counted.length > 0) return 0;
  const [row] = await authDatabase()
    .select({ waitMs: sql<string>`${whole} + ${everyMs} - ${now} - ${burst * everyMs}` })
    .from(rateLimits)
    .where(eq(rateLimits.key, key));
  await forgetOldTries();
  return Math.max(1, Math.ceil(Number(row?.waitMs ?? 0) / 1000));
}

/** Takes back one counted try that was no guess. */
export async function giveTryBack(key: string, { everyMs }: Budget): Promise<void> {
  await authDatabase()
    .update(rateLimits)
    .set({ lastRequest: sql`${rateLimits.lastRequest} - ${everyMs}` })
    .where(eq(rateLimits.key, key));
}

/** The budget of a key is whole again at once. */
export async function forgetTries(key: string): Promise<void> {
  await authDatabase().delete(rateLimits).where(eq(rateLimits.key, key));
}

/** Rows whose budget has long been whole say nothing; those of the identity service it removes itself. */
async function forgetOldTries(): Promise<void> {
  await authDatabase()
    .delete(rateLimits)
    .where(
      sql`${rateLimits.key} ~ '^(confirm|code|sign-in):' and ${rateLimits.lastRequest} < ${now} - 86400000`,
    );
}
