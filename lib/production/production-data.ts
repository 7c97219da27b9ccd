import { and, eq } from 'drizzle-orm';
import { derivatives } from '@/db/schema/checks';
import { packs, releases } from '@/db/schema/gates';
import { studios, workspaces } from '@/db/schema/workspaces';
import type { TenantTx } from '@/db/tenant';

export type ReleaseRow = typeof releases.$inferSelect;
export type PackRow = typeof packs.$inferSelect;

export async function insertRelease(
  tx: TenantTx,
  row: typeof releases.$inferInsert & { id: string },
): Promise<ReleaseRow> {
  const [made] = await tx.insert(releases).values(row).returning();
  return made;
}

export async function findRelease(
  tx: TenantTx,
  workspaceId: string,
  releaseId: string,
): Promise<ReleaseRow | null> {
  const [row] = await tx
    .select()
    .from(releases)
    .where(and(eq(releases.workspaceId, workspaceId), eq(releases.id, releaseId)));
  return row ?? null;
}

export async function releaseOfRevision(
  tx: TenantTx,
  workspaceId: string,
  revisionId: string,
): Promise<ReleaseRow | null> {
  const [row] = await tx
    .select()
    .from(releases)
    .where(and(eq(releases.workspaceId, workspaceId), eq(releases.revisionId, revisionId)));
  return row ?? null;
}

/** The pack of a release; null until a worker has built it. */
export async function packOfRelease(
  tx: TenantTx,
  workspaceId: string,
  releaseId: string,
): Promise<PackRow | null> {
  const [row] = await tx
    .select()
    .from(packs)
    .where(and(eq(packs.workspaceId, workspaceId), eq(packs.releaseId, releaseId)));
  return row ?? null;
}

/** Keeps a pack; null when the release has one already, which then stands. */
export async function keepPack(tx: TenantTx, row: typeof packs.$inferInsert): Promise<PackRow | null> {
  const [made] = await tx.insert(packs).values(row).onConflictDoNothing().returning();
  return made ?? null;
}

/** Where the drawn picture of a mesh lies in the store; null where there is none. */
export async function pictureOf(
  tx: TenantTx,
  workspaceId: string,
  meshId: string,
): Promise<{ storeKey: string; bytes: number; sha256: string } | null> {
  const [row] = await tx
    .select({ storeKey: derivatives.storeKey, bytes: derivatives.bytes, sha256: derivatives.sha256 })
    .from(derivatives)
    .where(
      and(
        eq(derivatives.workspaceId, workspaceId),
        eq(derivatives.meshId, meshId),
        eq(derivatives.kind, 'picture'),
      ),
    );
  return row ?? null;
}

/** Names and zone that a pack is written with. */
export async function workspaceOf(
  tx: TenantTx,
  workspaceId: string,
): Promise<{ name: string; timeZone: string; studioName: string }> {
  const [row] = await tx
    .select({ name: workspaces.name, timeZone: workspaces.timeZone, studioName: studios.name })
    .from(workspaces)
    .innerJoin(studios, eq(studios.id, workspaces.studioId))
    .where(eq(workspaces.id, workspaceId));
  if (!row) throw new Error('the workspace is not visible to this transaction');
  return row;
}
