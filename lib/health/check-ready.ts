import { sql } from 'drizzle-orm';
import { appDatabase, authDatabase } from '@/db/client';
import { env } from '@/lib/env/env';

export type Readiness = { ready: boolean; checks: Record<string, 'ok' | 'failing'> };

/**
 * Whether this process can answer requests: its environment is whole and both of its database roles connect.
 * Store, mail and realtime are not asked: without them most pages still work.
 */
export async function checkReady(): Promise<Readiness> {
  const ask = async (check: () => Promise<unknown> | unknown) => {
    try {
      await check();
      return 'ok' as const;
    } catch {
      return 'failing' as const;
    }
  };
  const [environment, database, identity] = await Promise.all([
    ask(() => env()),
    ask(() => appDatabase().execute(sql`select 1`)),
    ask(() => authDatabase().execute(sql`select 1`)),
  ]);
  const checks = { environment, database, identity };
  return { ready: Object.values(checks).every((state) => state === 'ok'), checks };
}
