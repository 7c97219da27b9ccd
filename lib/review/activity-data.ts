import { and, desc, eq, inArray, lt } from 'drizzle-orm';
import { templates } from '@/db/schema/templates';
import { auditEntries } from '@/db/schema/trail';
import type { TenantTx } from '@/db/tenant';
import type { DocketSummary } from './content';

export type EntryRow = typeof auditEntries.$inferSelect;

/** Entries of the workspace's chain, newest first, older than `before`. */
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

/** Numbers of these templates, to name them in a sentence. */
export async function templateNumbers(tx: TenantTx, workspaceId: string, ids: string[]) {
  if (!ids.length) return new Map<string, string>();
  const rows = await tx
    .select({ id: templates.id, number: templates.number })
    .from(templates)
    .where(and(eq(templates.workspaceId, workspaceId), inArray(templates.id, ids)));
  return new Map(rows.map((row) => [row.id, row.number]));
}
