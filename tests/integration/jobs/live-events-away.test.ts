import { afterAll, beforeAll, describe, expect, it, vi } from 'vitest';
import { withTenant } from '@/db/tenant';
import { jobContext } from '@/lib/auth/context';
import { queueLive } from '@/lib/jobs/queue-live';
import { startRelay, type Relay } from '@/lib/jobs/relay/start-relay';
import { anyFreePort } from '@/docker/local/ports';
import { freshDatabase, type FreshDatabase } from '@/tests/support/database';
import { makeHouse, type House } from '@/tests/support/make-house';
import { setEnvironment } from '@/tests/support/test-environment';

let database: FreshDatabase;
let house: House;
let relay: Relay;

beforeAll(async () => {
  database = await freshDatabase();
  // Nobody listens there.
  setEnvironment({ PUSHER_PORT: String(await anyFreePort()) });
  house = await makeHouse(database);
  await database.query('delete from outbox');
  relay = startRelay();
});
afterAll(() => relay.stop());

type Row = { attempts: number; sent_at: Date | null; failure: string | null; waits: boolean };
const rows = async () =>
  (
    await database.query<Row>(
      'select attempts, sent_at, failure, due_at > now() as waits from outbox order by id',
    )
  ).rows;
const queueOne = () => {
  const ctx = jobContext(house.workspace.id);
  const event = { name: 'people.changed' as const, data: { id: house.workspace.id } };
  return withTenant(ctx, (tx) => queueLive(tx, ctx, event));
};

describe('while the realtime server is away', () => {
  it('a live event waits and is tried again', async () => {
    await queueOne();
    relay.wake();
    await vi.waitFor(async () => expect((await rows())[0].attempts).toBeGreaterThanOrEqual(2), {
      timeout: 20_000,
    });
    expect((await rows())[0]).toMatchObject({ sent_at: null, failure: null });
  });

  it('one that has become stale is given up: pages fetch anew when they connect', async () => {
    await database.query("update outbox set created_at = now() - interval '6 minutes', due_at = now()");
    relay.wake();
    await vi.waitFor(async () => expect((await rows())[0].failure).toMatch(/stale/), { timeout: 20_000 });
  });
});
