import { and, eq, inArray, isNotNull, lt, sql } from 'drizzle-orm';
import { relayDatabase } from '@/db/client';
import { outbox } from '@/db/schema/trail';

export type OutboxItem = typeof outbox.$inferSelect;
type Kind = OutboxItem['kind'];

/**
 * Takes what is due, oldest first, and puts its next try `holdS` ahead: several relays never take the same
 * row, no row stays locked while something is sent, and what a killed relay took comes back by itself.
 */
export async function takeDue(kind: Kind, limit: number, holdS: number): Promise<OutboxItem[]> {
  const due = sql`select id from ${outbox}
    where kind = ${kind} and sent_at is null and failure is null and due_at <= clock_timestamp()
    order by due_at, id limit ${limit} for update skip locked`;
  const taken = await relayDatabase()
    .update(outbox)
    .set({
      attempts: sql`${outbox.attempts} + 1`,
      dueAt: sql`clock_timestamp() + make_interval(secs => ${holdS})`,
    })
    .where(sql`${outbox.id} in (${due})`)
    .returning();
  return taken.sort((a, b) => (a.id < b.id ? -1 : 1));
}

/** Marks rows as sent. Links that let a person in are not kept once they were mailed. */
export async function markSent(ids: string[]): Promise<void> {
  if (!ids.length) return;
  await relayDatabase()
    .update(outbox)
    .set({
      sentAt: sql`clock_timestamp()`,
      payload: sql`case when ${outbox.kind} = 'mail' then ${outbox.payload} - 'url' - 'path' else ${outbox.payload} end`,
    })
    .where(inArray(outbox.id, ids));
}

/** The next try, `afterS` from now. */
export async function putOff(ids: string[], afterS: number): Promise<void> {
  if (!ids.length) return;
  await relayDatabase()
    .update(outbox)
    .set({ dueAt: sql`clock_timestamp() + make_interval(secs => ${afterS})` })
    .where(inArray(outbox.id, ids));
}

/** Given up, with the reason; the row stays for whoever looks after the mail. */
export async function markUnsendable(ids: string[], failure: string): Promise<void> {
  if (!ids.length) return;
  await relayDatabase()
    .update(outbox)
    .set({ failure: failure.slice(0, 500) })
    .where(inArray(outbox.id, ids));
}

/** Milliseconds until the next row is due, from 50 (another relay may hold it) to `mostMs`. */
export async function untilNextDue(kind: Kind, mostMs: number): Promise<number> {
  const { rows } = await relayDatabase().execute<{ ms: number | null }>(
    sql`select extract(epoch from min(due_at) - clock_timestamp()) * 1000 as ms from ${outbox}
        where kind = ${kind} and sent_at is null and failure is null`,
  );
  const ms = rows[0]?.ms;
  return ms === null || ms === undefined ? mostMs : Math.min(mostMs, Math.max(50, Number(ms)));
}

/** Sent rows are only of use while a repeat could come; live events are stale within a day anyway. */
export async function pruneSent(): Promise<void> {
  const older = (kind: Kind, days: number) =>
    and(
      eq(outbox.kind, kind),
      isNotNull(outbox.sentAt),
      lt(outbox.sentAt, sql`now() - make_interval(days => ${days})`),
    );
  await relayDatabase().delete(outbox).where(older('mail', 7));
  await relayDatabase().delete(outbox).where(older('live', 1));
}
