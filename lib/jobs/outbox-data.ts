import { outbox } from '@/db/schema/trail';
import type { TenantTx } from '@/db/tenant';

export type OutboxRow = typeof outbox.$inferInsert;

export async function insertOutbox(tx: TenantTx, rows: OutboxRow[]): Promise<void> {
  // A second row for the same occasion is dropped here: what was queued once is sent once.
  if (rows.length) await tx.insert(outbox).values(rows).onConflictDoNothing();
}
