import { and, desc, eq, inArray, lt } from 'drizzle-orm';
import { templates } from '@/db/schema/templates';
import { auditEntries } from '@/db/schema/trail';
import type { TenantTx } from '@/db/tenant';
import type { Content } from './content';

export type EntryRow = typeof auditEntries.$inferSelect;

export type EntryFilter = { before: number | null; actions: string[] | null; actorId: string | null };

/** Entries of the workspace's chain, newest first. */
export async function entriesBefore(
  tx: TenantTx,
  workspaceId: string,
  { before, actions, actorId }: EntryFilter,
  limit: number,
): Promise<EntryRow[]> {
  return tx
    .select()
    .from(auditEntries)
    .where(
      and(
        eq(auditEntries.workspaceId, workspaceId),
        before === null ? undefined : lt(auditEntries.seq, before),
        actions === null ? undefined : inArray(auditEntries.action, actions),
        actorId === null ? undefined : eq(auditEntries.actorId, actorId),
      ),
    )
    .orderBy(desc(auditEntries.seq))
    .limit(limit);
}

/** What may still change between two signatures, as each of them stood on it: signature id → docket and template. */
export async function signedParts(tx: TenantTx, workspaceId: string, revisionId: string) {
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
  return new Map(rows.map(({ detail }) => [detail.signatureId as string, partsOf(detail)]));
}

/** The parts of the content that an entry about a signature keeps. */
export const partsOf = ({ docket, named }: Record<string, unknown>): Partial<Content> => ({
  ...(docket ? { docket: docket as Content['docket'] } : {}),
  ...(named ? { template: named as Content['template'] } : {}),
});

/** Numbers of these templates, to name them in a sentence. */
export async function templateNumbers(tx: TenantTx, workspaceId: string, ids: string[]) {
  if (!ids.length) return new Map<string, string>();
  const rows = await tx
    .select({ id: templates.id, number: templates.number })
    .from(templates)
    .where(and(eq(templates.workspaceId, workspaceId), inArray(templates.id, ids)));
  return new Map(rows.map((row) => [row.id, row.number]));
}
