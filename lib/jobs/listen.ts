import { Client } from 'pg';
import { relayEnv } from '@/lib/env/env';
import { log } from '@/lib/log/log';

/**
 * Calls `wake` when a committed transaction left work behind (`jobs` or `outbox`). Connects again by itself;
 * what was missed meanwhile is found by polling.
 */
export function listenForWork(wake: (table: string) => void): { stop(): Promise<void> } {
  let client: Client | undefined;
  let again: NodeJS.Timeout | undefined;
  let stopped = false;

  const retry = () => {
    client?.removeAllListeners();
    client?.on('error', () => undefined);
    client?.end().catch(() => undefined);
    client = undefined;
    if (!stopped) again = setTimeout(connect, 1_000);
  };
  const connect = () => {
    const made = new Client({
      connectionString: relayEnv().RELAY_DATABASE_URL,
      application_name: 'firstpull-listen',
      keepAlive: true,
      connectionTimeoutMillis: 5_000,
    });
    client = made;
    made.on('notification', ({ payload }) => wake(payload ?? ''));
    made.once('error', retry);
    made.once('end', retry);
    made
      .connect()
      .then(() => made.query('listen firstpull_work'))
      .then(
        () => (wake('jobs'), wake('outbox')),
        (error) => {
          log().warn({ err: error }, 'not listening for work; polling until the database answers');
          if (client === made) retry();
        },
      );
  };
  connect();
  return {
    async stop() {
      stopped = true;
      clearTimeout(again);
      await client?.end().catch(() => undefined);
    },
  };
}
