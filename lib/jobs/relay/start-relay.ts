import { log } from '@/lib/log/log';
import { deliverLive } from './deliver-live';
import { deliverMail } from './deliver-mail';
import { pruneSent, untilNextDue, type OutboxItem } from './outbox-relay-data';

const pollMs = 1_000;
const pruneMs = 3_600_000;

export type Relay = { wake(): void; stop(): Promise<void> };

/** Carries the outbox out of the database: live events and mails each on their own, so that neither waits for the other. */
export function startRelay(): Relay {
  const loops = [startLoop('live', deliverLive), startLoop('mail', deliverMail)];
  const prune = () => void pruneSent().catch((error) => log().warn({ err: error }, 'outbox not pruned'));
  const pruning = setInterval(prune, pruneMs);
  prune();
  return {
    wake: () => loops.forEach((loop) => loop.wake()),
    async stop() {
      clearInterval(pruning);
      await Promise.all(loops.map((loop) => loop.stop()));
    },
  };
}

function startLoop(kind: OutboxItem['kind'], deliver: () => Promise<boolean>): Relay {
  let stopped = false;
  let woken = false;
  let endPause: (() => void) | undefined;

  const pause = (ms: number) =>
    new Promise<void>((resolve) => {
      const timer = setTimeout(resolve, ms);
      endPause = () => (clearTimeout(timer), resolve());
    });

  const done = (async () => {
    while (!stopped) {
      woken = false;
      let waitMs = pollMs;
      try {
        if (await deliver()) continue;
        waitMs = await untilNextDue(kind, pollMs);
      } catch (error) {
        // The database is away: rows wait there, and so do we.
        log().warn({ err: error, kind }, 'outbox not read');
      }
      if (!woken && !stopped) await pause(waitMs);
    }
  })();

  const wake = () => {
    woken = true;
    endPause?.();
  };
  return {
    wake,
    async stop() {
      stopped = true;
      wake();
      await done;
    },
  };
}
