import { and, eq, isNull, lt, ne, or } from 'drizzle-orm';
import { symmetricDecrypt } from 'better-auth/crypto';
import { authDatabase } from '@/db/client';
import { sessions, twoFactors, users } from '@/db/schema/identity';
import { authEnv } from '@/lib/env/env';
import { hashRecoveryCode } from './recovery-codes';
import { stepOfCode } from './totp';

/** Whether a person's second factor is on, and how many recovery codes are left. */
export async function readSecondFactor(personId: string): Promise<{ on: boolean; codesLeft: number }> {
  const [row] = await authDatabase()
    .select({ codes: twoFactors.backupCodes })
    .from(twoFactors)
    .innerJoin(users, and(eq(users.id, twoFactors.userId), eq(users.twoFactorEnabled, true)))
    .where(and(eq(twoFactors.userId, personId), eq(twoFactors.verified, true)));
  return row
    ? { on: true, codesLeft: (JSON.parse(row.codes) as string[]).length }
    : { on: false, codesLeft: 0 };
}

/**
 * Takes a code of a person's authenticator once (RFC 6238 §5.2): one statement marks its step, so of many requests
 * with the same code one is `taken` and the others find it `used`. A code of an earlier step is `used` too.
 */
export async function takeCode(personId: string, code: string): Promise<'taken' | 'used' | 'wrong'> {
  const [row] = await authDatabase()
    .select({ id: twoFactors.id, secret: twoFactors.secret })
    .from(twoFactors)
    .where(eq(twoFactors.userId, personId));
  if (!row) return 'wrong';
  const secret = await symmetricDecrypt({ key: authEnv().BETTER_AUTH_SECRET, data: row.secret });
  const step = await stepOfCode(secret, code);
  if (step === null) return 'wrong';
  const marked = await authDatabase()
    .update(twoFactors)
    .set({ lastStep: step })
    .where(
      and(
        eq(twoFactors.id, row.id),
        eq(twoFactors.secret, row.secret),
        or(isNull(twoFactors.lastStep), lt(twoFactors.lastStep, step)),
      ),
    )
    .returning({ id: twoFactors.id });
  return marked.length > 0 ? 'taken' : 'used';
}

/** Whether this is one of a person's recovery codes; it is not spent. */
export async function isRecoveryCode(personId: string, code: string): Promise<boolean> {
  const [row] = await authDatabase()
    .select({ codes: twoFactors.backupCodes })
    .from(twoFactors)
    .where(eq(twoFactors.userId, personId));
  return row ? (JSON.parse(row.codes) as string[]).includes(hashRecoveryCode(code)) : false;
}

/** Ends every session of a person but one; returns the ids of those that ended. */
export async function endOtherSessions(personId: string, keptToken: string): Promise<string[]> {
  const ended = await authDatabase()
    .delete(sessions)
    .where(and(eq(sessions.userId, personId), ne(sessions.token, keptToken)))
    .returning({ id: sessions.id });
  return ended.map((session) => session.id);
}
