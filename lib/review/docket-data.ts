import { and, asc, count, desc, eq, inArray, sql } from 'drizzle-orm';
import { waivers } from '@/db/schema/checks';
import { notes, placements, threads } from '@/db/schema/docket';
import { revisions } from '@/db/schema/templates';
import type { TenantTx } from '@/db/tenant';
import { notFound } from '@/lib/errors/app-error';

export type ThreadRow = typeof threads.$inferSelect;
export type PlacementRow = typeof placements.$inferSelect;
export type NoteRow = typeof notes.$inferSelect;
export type WaiverRow = typeof waivers.$inferSelect;
export type PlacedThread = { thread: ThreadRow; placement: PlacementRow; openedOn: string };

/** The threads that stand on a revision, oldest first, with the letter of the one that they were opened on. */
export async function threadsOn(
  tx: TenantTx,
  workspaceId: string,
  revisionId: string,
): Promise<PlacedThread[]> {
  return tx
    .select({ thread: threads, placement: placements, openedOn: revisions.letter })
    .from(placements)
    .innerJoin(
      threads,
      and(eq(threads.workspaceId, placements.workspaceId), eq(threads.id, placements.threadId)),
    )
    .innerJoin(
      revisions,
      and(eq(revisions.workspaceId, threads.workspaceId), eq(revisions.id, threads.revisionId)),
    )
    .where(and(eq(placements.workspaceId, workspaceId), eq(placements.revisionId, revisionId)))
    .orderBy(asc(threads.createdAt), asc(threads.id));
}

export async function notesOf(tx: TenantTx, workspaceId: string, threadIds: string[]): Promise<NoteRow[]> {
  if (!threadIds.length) return [];
  return tx
    .select()
    .from(notes)
    .where(and(eq(notes.workspaceId, workspaceId), inArray(notes.threadId, threadIds)))
    .orderBy(asc(notes.createdAt), asc(notes.id));
}

export async function waiversOf(tx: TenantTx, workspaceId: string, revisionId: string): Promise<WaiverRow[]> {
  return tx
    .select()
    .from(waivers)
    .where(and(eq(waivers.workspaceId, workspaceId), eq(waivers.revisionId, revisionId)));
}

export async function insertWaiver(tx: TenantTx, row: typeof waivers.$inferInsert): Promise<void> {
  await tx.insert(waivers).values(row);
}

/** Threads that keep the next people's gate of a revision shut. */
export async function openMustSettle(
  tx: TenantTx,
  workspaceId: string,
  revisionId: string,
): Promise<ThreadRow[]> {
  const rows = await tx
    .select({ thread: threads })
    .from(placements)
    .innerJoin(
      threads,
      and(eq(threads.workspaceId, placements.workspaceId), eq(threads.id, placements.threadId)),
    )
    .where(
      and(
        eq(placements.workspaceId, workspaceId),
        eq(placements.revisionId, revisionId),
        eq(threads.state, 'open'),
        eq(threads.mustSettle, true),
        eq(threads.afterApproval, false),
      ),
    )
    .orderBy(asc(threads.createdAt));
  return rows.map((row) => row.thread);
}

/** Text of the first note of each of these threads, to name them in a sentence. */
export async function firstNotes(tx: TenantTx, workspaceId: string, threadIds: string[]) {
  if (!threadIds.length) return [];
  return tx
    .selectDistinctOn([notes.threadId], {
      threadId: notes.threadId,
      text: notes.text,
      authorName: notes.authorName,
    })
    .from(notes)
    .where(and(eq(notes.workspaceId, workspaceId), inArray(notes.threadId, threadIds)))
    .orderBy(notes.threadId, asc(notes.createdAt), asc(notes.id));
}

export async function findThread(tx: TenantTx, workspaceId: string, threadId: string): Promise<ThreadRow> {
  const [row] = await tx
    .select()
    .from(threads)
    .where(and(eq(threads.workspaceId, workspaceId), eq(threads.id, threadId)));
  if (!row) throw notFound('thread');
  return row;
}

export async function threadOfFinding(tx: TenantTx, workspaceId: string, findingId: string) {
  const [row] = await tx
    .select()
    .from(threads)
    .where(and(eq(threads.workspaceId, workspaceId), eq(threads.findingId, findingId)));
  return row ?? null;
}

/** The newest revision that a thread stands on: where it is being talked about. */
export async function newestPlacement(
  tx: TenantTx,
  workspaceId: string,
  threadId: string,
): Promise<PlacementRow> {
  const [row] = await tx
    .select({ placement: placements })
    .from(placements)
    .innerJoin(
      revisions,
      and(eq(revisions.workspaceId, placements.workspaceId), eq(revisions.id, placements.revisionId)),
    )
    .where(and(eq(placements.workspaceId, workspaceId), eq(placements.threadId, threadId)))
    .orderBy(desc(revisions.ordinal))
    .limit(1);
  if (!row) throw notFound('thread');
  return row.placement;
}

export async function insertThread(tx: TenantTx, row: typeof threads.$inferInsert): Promise<ThreadRow> {
  const [made] = await tx.insert(threads).values(row).returning();
  return made;
}

export async function insertPlacements(
  tx: TenantTx,
  rows: (typeof placements.$inferInsert)[],
): Promise<void> {
  if (rows.length) await tx.insert(placements).values(rows);
}

export async function insertNote(tx: TenantTx, row: typeof notes.$inferInsert): Promise<NoteRow> {
  const [made] = await tx.insert(notes).values(row).returning();
  return made;
}

/** The note that this person has sent under this key before; a repeated send is the same note. */
export async function noteByClientKey(
  tx: TenantTx,
  workspaceId: string,
  authorId: string,
  clientKey: string,
): Promise<NoteRow | null> {
  const [row] = await tx
    .select()
    .from(notes)
    .where(
      and(eq(notes.workspaceId, workspaceId), eq(notes.authorId, authorId), eq(notes.clientKey, clientKey)),
    );
  return row ?? null;
}

export async function changeThread(
  tx: TenantTx,
  thread: ThreadRow,
  change: { state: 'open' | 'settled'; by: { id: string; name: string } | null },
): Promise<ThreadRow> {
  const [row] = await tx
    .update(threads)
    .set({
      state: change.state,
      settledBy: change.by?.id ?? null,
      settledByName: change.by?.name ?? null,
      settledAt: change.by ? (sql`clock_timestamp()` as unknown as Date) : null,
      version: sql`${threads.version} + 1`,
    })
    .where(and(eq(threads.workspaceId, thread.workspaceId), eq(threads.id, thread.id)))
    .returning();
  return row;
}

export async function countNotes(tx: TenantTx, workspaceId: string, threadId: string): Promise<number> {
  const [row] = await tx
    .select({ n: count() })
    .from(notes)
    .where(and(eq(notes.workspaceId, workspaceId), eq(notes.threadId, threadId)));
  return row.n;
}
