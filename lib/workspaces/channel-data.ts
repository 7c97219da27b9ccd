import { and, eq } from 'drizzle-orm';
import { revisions } from '@/db/schema/templates';
import type { TenantTx } from '@/db/tenant';

export async function revisionExists(tx: TenantTx, workspaceId: string, revisionId: string) {
  const rows = await tx
    .select({ id: revisions.id })
    .from(revisions)
    .where(and(eq(revisions.workspaceId, workspaceId), eq(revisions.id, revisionId)));
  return rows.length > 0;
}
