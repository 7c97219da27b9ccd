import { and, desc, eq, inArray, lt, notInArray } from 'drizzle-orm';
import { auditEntries } from '@/db/schema/trail';
import type { TenantTx } from '@/db/tenant';
import type { DocketSummary } from './content';

export type EntryRow = typeof auditEntries.$inferSelect;

/** Every keystroke of a draft is on the chain; a reader of the activity is told when it is opened and posted. */
const quiet = ['draft.saved'];

export async function entriesBefore(
  tx: TenantTx,
  workspaceId: string,
  before: number | null,
  limit: number,
): Promise<EntryRow[]> {
  return tx
    .select()
    .from(auditEntries)
    .where(
      and(
        eq(auditEntries.workspaceId, workspaceId),
        before === null ? undefined : lt(auditEntries.seq, before),
        notInArray(auditEntries.action, quiet),
      ),
    )
    .orderBy(desc(auditEntries.seq))
    .limit(limit);
}

/** The docket that each signature of a revision stood on, as the audit chain has it: signature id → summary. */
export async function signedDockets(tx: TenantTx, workspaceId: string, revisionId: string) {
  const rows = await tx
    .select({ detail: auditEntries.detail })
    .from(auditEntries)
    .where(
      and(
        eq(auditEntries.workspaceId, workspaceId),
        eq(auditEntries.subjectId, revisionId),
        inArray(auditEntries.action, ['gate.signed', 'gate.returned']),
      ),
    );
  return new Map(
    rows.map(({ detail }) => [detail.signatureId as string, detail.docket as DocketSummary | undefined]),
  );
}
