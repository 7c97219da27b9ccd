import { z } from 'zod';
import { readLiveEvent, type LivePayload } from '@/realtime/events';
import { publish } from '@/realtime/publish';
import { log } from '@/lib/log/log';
import { backoffS } from './backoff';
import { markSent, markUnsendable, putOff, takeDue, type OutboxItem } from './outbox-relay-data';

/** What `queueLive` stores in the outbox. */
const stored = z.object({ channel: z.string(), name: z.string(), data: z.unknown() });

const batch = 100;
/** Pages fetch anew when they connect again; an event of before is of no use to them. */
const staleMs = 5 * 60_000;

/** Publishes due live events. Answers whether there may be more. */
export async function deliverLive(): Promise<boolean> {
  const items = await takeDue('live', batch, 30);
  const fresh: { item: OutboxItem; payload: LivePayload }[] = [];
  for (const item of items) {
    const payload = readPayload(item.payload);
    if (!payload) await markUnsendable([item.id], 'not a live event');
    else if (Date.now() - item.createdAt.getTime() > staleMs)
      await markUnsendable([item.id], 'stale: the realtime server was away');
    else fresh.push({ item, payload });
  }
  // The realtime server takes ten a call; a failure costs only those of its own call.
  for (let i = 0; i < fresh.length; i += 10) {
    const part = fresh.slice(i, i + 10);
    const ids = part.map(({ item }) => item.id);
    try {
      await publish(part.map(({ payload }) => payload));
      await markSent(ids);
    } catch (error) {
      const attempt = Math.max(...part.map(({ item }) => item.attempts));
      log().warn({ err: error, events: ids.length }, 'live events not published');
      await putOff(ids, backoffS(attempt, { firstS: 0.5, mostS: 20 }));
    }
  }
  return items.length === batch;
}

function readPayload(payload: unknown): LivePayload | null {
  const outer = stored.safeParse(payload);
  const event = outer.success ? readLiveEvent(outer.data.name, outer.data.data) : null;
  return event && outer.success ? { ...event, channel: outer.data.channel } : null;
}
