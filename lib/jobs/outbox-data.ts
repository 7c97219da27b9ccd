import { outbox } from '@/db/schema/trail';
import type { TenantTx } from '@/db/tenant';

export type OutboxRow = typeof outbox.$inferInsert;

export async function insertOutbox(tx: TenantTx, rows: OutboxRow[]): Promise<void> {
  if (rows.length) await tx.insert(outbox).values(rows);
}
