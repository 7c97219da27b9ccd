import { and, eq, gt, sql } from 'drizzle-orm';
import { meshes, uploads } from '@/db/schema/templates';
import type { TenantTx } from '@/db/tenant';
import { notFound } from '@/lib/errors/app-error';
import type { MeshRow } from './revision-data';

export type UploadRow = typeof uploads.$inferSelect;

const named = (workspaceId: string, uploadId: string) =>
  and(eq(uploads.workspaceId, workspaceId), eq(uploads.id, uploadId));

export async function insertUpload(tx: TenantTx, row: typeof uploads.$inferInsert): Promise<UploadRow> {
  const [made] = await tx.insert(uploads).values(row).returning();
  return made;
}

export async function findUpload(tx: TenantTx, workspaceId: string, uploadId: string): Promise<UploadRow> {
  const [row] = await tx.select().from(uploads).where(named(workspaceId, uploadId));
  if (!row) throw notFound('upload');
  return row;
}

export async function lockUpload(tx: TenantTx, workspaceId: string, uploadId: string): Promise<UploadRow> {
  const [row] = await tx.select().from(uploads).where(named(workspaceId, uploadId)).for('update');
  if (!row) throw notFound('upload');
  return row;
}

export async function changeUpload(
  tx: TenantTx,
  upload: UploadRow,
  change: Partial<Pick<UploadRow, 'parts' | 'state' | 'refusal' | 'meshId' | 'unit'>>,
): Promise<UploadRow> {
  const [row] = await tx
    .update(uploads)
    .set({ ...change, version: sql`${uploads.version} + 1` })
    .where(named(upload.workspaceId, upload.id))
    .returning();
  return row;
}

/** Files that a person began within a day and has not sent to their end; older ones are taken for given up. */
export async function countUnfinished(tx: TenantTx, workspaceId: string, personId: string): Promise<number> {
  const rows = await tx
    .select({ id: uploads.id })
    .from(uploads)
    .where(
      and(
        eq(uploads.workspaceId, workspaceId),
        eq(uploads.createdBy, personId),
        eq(uploads.state, 'sending'),
        gt(uploads.createdAt, sql`now() - interval '1 day'`),
      ),
    )
    .limit(51);
  return rows.length;
}

export async function meshOfUpload(tx: TenantTx, upload: UploadRow): Promise<MeshRow | null> {
  if (!upload.meshId) return null;
  const [row] = await tx
    .select()
    .from(meshes)
    .where(and(eq(meshes.workspaceId, upload.workspaceId), eq(meshes.id, upload.meshId)));
  return row ?? null;
}
