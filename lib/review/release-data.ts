import { and, eq } from 'drizzle-orm';
import { packs, releases } from '@/db/schema/gates';
import type { TenantTx } from '@/db/tenant';

/** The release of a revision, with its pack once that is built. */
export async function releaseOf(tx: TenantTx, workspaceId: string, revisionId: string) {
  const [row] = await tx
    .select({ release: releases, pack: packs })
    .from(releases)
    .leftJoin(packs, and(eq(packs.workspaceId, releases.workspaceId), eq(packs.releaseId, releases.id)))
    .where(and(eq(releases.workspaceId, workspaceId), eq(releases.revisionId, revisionId)));
  return row ?? null;
}
