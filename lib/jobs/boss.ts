import PgBoss from 'pg-boss';
import { databaseEnv } from '@/lib/env/env';
import { log } from '@/lib/log/log';

let starting: Promise<PgBoss> | undefined;

/**
 * The queue, on the application's own database role; its tables and queues were made by the migration.
 * Workers also clear out what is settled (`supervise`).
 */
export function boss({ supervise = false } = {}): Promise<PgBoss> {
  starting ??= (async () => {
    const made = new PgBoss({
      connectionString: databaseEnv().DATABASE_URL,
      schema: 'pgboss',
      migrate: false,
      supervise,
      maintenanceIntervalSeconds: 60,
      archiveCompletedAfterSeconds: 3_600,
      deleteAfterDays: 3,
      schedule: false,
      max: 3,
      application_name: 'firstpull-queue',
    });
    // The driver's errors carry their whole client along; the message is enough.
    made.on('error', (error) => log().warn({ reason: error.message }, 'queue'));
    await made.start();
    return made;
  })();
  starting.catch(() => (starting = undefined));
  return starting;
}

export async function stopBoss(): Promise<void> {
  const running = await starting?.catch(() => undefined);
  starting = undefined;
  await running?.stop({ graceful: true, close: true, timeout: 5_000 });
}
