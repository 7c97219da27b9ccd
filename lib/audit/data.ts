import { and, asc, eq, gt, sql } from 'drizzle-orm';
import { auditEntries, auditHeads } from '@/db/schema/trail';
import type { TenantTx } from '@/db/tenant';
import { genesis } from './chain';

export type AuditRow = typeof auditEntries.$inferSelect;

/** Locks the head of the workspace's chain (making it at first use) and returns it with the database's time. */
export async function lockHead(
  tx: TenantTx,
  workspaceId: string,
): Promise<{ seq: number; hash: string; now: Date }> {
  await tx.insert(auditHeads).values({ workspaceId, seq: 0, hash: genesis }).onConflictDoNothing();
  const [head] = await tx
    .select({
      seq: auditHeads.seq,
      hash: auditHeads.hash,
      now: sql<string>`date_trunc('milliseconds', clock_timestamp())::text`,
    })
    .from(auditHeads)
    .where(eq(auditHeads.workspaceId, workspaceId))
    .for('update');
  if (!head) throw new Error('the audit head is not visible to this transaction');
  return { seq: head.seq, hash: head.hash, now: new Date(head.now) };
}

export async function insertEntry(tx: TenantTx, row: typeof auditEntries.$inferInsert): Promise<void> {
  await tx.insert(auditEntries).values(row);
  await tx
    .update(auditHeads)
    .set({ seq: row.seq, hash: row.hash })
    .where(eq(auditHeads.workspaceId, row.workspaceId));
}

export async function readHead(tx: TenantTx, workspaceId: string) {
  const [head] = await tx.select().from(auditHeads).where(eq(auditHeads.workspaceId, workspaceId));
  return head ?? null;
}

export async function entriesAfter(
  tx: TenantTx,
  workspaceId: string,
  seq: number,
  limit: number,
): Promise<AuditRow[]> {
  return tx
    .select()
    .from(auditEntries)
    .where(and(eq(auditEntries.workspaceId, workspaceId), gt(auditEntries.seq, seq)))
    .orderBy(asc(auditEntries.seq))
    .limit(limit);
}
