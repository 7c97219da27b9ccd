import { jobs } from '@/db/schema/checks';
import type { TenantTx } from '@/db/tenant';

export type JobRow = typeof jobs.$inferSelect;
export type JobKind = JobRow['kind'];

export async function insertJob(tx: TenantTx, row: typeof jobs.$inferInsert): Promise<string> {
  const [made] = await tx.insert(jobs).values(row).returning({ id: jobs.id });
  return made.id;
}

/** Runs pg-boss's own statements inside the caller's transaction. */
export function bossExecutor(tx: TenantTx) {
  return {
    async executeSql(text: string, values: unknown[] = []) {
      // pg-boss speaks $1, $2 …; drizzle's raw client of this transaction takes the same text.
      const session = (
        tx as unknown as {
          session: { client: { query(t: string, v: unknown[]): Promise<{ rows: unknown[] }> } };
        }
      ).session;
      const { rows } = await session.client.query(text, values);
      return { rows: rows as never[], rowCount: rows.length };
    },
  };
}
