import { and, eq, lt, sql } from 'drizzle-orm';
import { idempotencyKeys } from '@/db/schema/trail';
import type { TenantTx } from '@/db/tenant';

type Key = { workspaceId: string; userId: string; route: string; key: string };

const named = (k: Key) =>
  and(
    eq(idempotencyKeys.workspaceId, k.workspaceId),
    eq(idempotencyKeys.userId, k.userId),
    eq(idempotencyKeys.route, k.route),
    eq(idempotencyKeys.key, k.key),
  );

/** Claims a key for this request; null when claimed, else what is known of the request that has it. */
export async function claimKey(tx: TenantTx, k: Key, requestHash: string) {
  const made = await tx
    .insert(idempotencyKeys)
    .values({ ...k, requestHash })
    .onConflictDoNothing()
    .returning();
  if (made.length) return null;
  // A request that died at work leaves its claim; after a minute another may take it over.
  const stale = and(
    named(k),
    eq(idempotencyKeys.status, 0),
    lt(idempotencyKeys.createdAt, sql`now() - interval '1 minute'`),
  );
  const taken = await tx
    .update(idempotencyKeys)
    .set({ requestHash, createdAt: sql`now()` })
    .where(stale)
    .returning();
  if (taken.length) return null;
  const [known] = await tx.select().from(idempotencyKeys).where(named(k));
  return known ?? null;
}

export async function keepAnswer(tx: TenantTx, k: Key, status: number, response: unknown): Promise<void> {
  await tx.update(idempotencyKeys).set({ status, response }).where(named(k));
}

export async function dropKey(tx: TenantTx, k: Key): Promise<void> {
  await tx.delete(idempotencyKeys).where(and(named(k), eq(idempotencyKeys.status, 0)));
}
