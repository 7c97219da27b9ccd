import { and, eq, sql } from 'drizzle-orm';
import { users } from '@/db/schema/identity';
import { drafts } from '@/db/schema/templates';
import type { TenantTx } from '@/db/tenant';

export type DraftRow = typeof drafts.$inferSelect;

/** The draft of a template; with `lock` its row is held until commit. */
export async function findDraft(
  tx: TenantTx,
  workspaceId: string,
  templateId: string,
  options: { lock?: boolean } = {},
): Promise<DraftRow | null> {
  const query = tx
    .select()
    .from(drafts)
    .where(and(eq(drafts.workspaceId, workspaceId), eq(drafts.templateId, templateId)));
  const [row] = await (options.lock ? query.for('update') : query);
  return row ?? null;
}

export async function insertDraft(tx: TenantTx, row: typeof drafts.$inferInsert): Promise<DraftRow> {
  const [made] = await tx.insert(drafts).values(row).returning();
  return made;
}

export async function changeDraft(
  tx: TenantTx,
  draft: DraftRow,
  change: Pick<DraftRow, 'uploadId' | 'recipe' | 'note' | 'changedBy'>,
): Promise<DraftRow> {
  const [row] = await tx
    .update(drafts)
    .set({ ...change, changedAt: sql`clock_timestamp()`, version: sql`${drafts.version} + 1` })
    .where(and(eq(drafts.workspaceId, draft.workspaceId), eq(drafts.id, draft.id)))
    .returning();
  return row;
}

/** Who saved a draft last, or began it. */
export async function lastEditor(tx: TenantTx, draft: DraftRow): Promise<{ id: string; name: string }> {
  const personId = draft.changedBy ?? draft.authorId;
  const [row] = await tx.select({ name: users.name }).from(users).where(eq(users.id, personId));
  return { id: personId, name: row?.name ?? 'somebody who has left' };
}

export async function deleteDraft(tx: TenantTx, draft: DraftRow): Promise<void> {
  await tx.delete(drafts).where(and(eq(drafts.workspaceId, draft.workspaceId), eq(drafts.id, draft.id)));
}
