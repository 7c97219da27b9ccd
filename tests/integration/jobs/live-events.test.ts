import { afterAll, beforeAll, describe, expect, it, vi } from 'vitest';
import { withTenant } from '@/db/tenant';
import { jobContext } from '@/lib/auth/context';
import { queueLive } from '@/lib/jobs/queue-live';
import { listenForWork } from '@/lib/jobs/listen';
import { startRelay } from '@/lib/jobs/relay/start-relay';
import { freshDatabase, type FreshDatabase } from '@/tests/support/database';
import { makeHouse, type House } from '@/tests/support/make-house';
import { openPage } from './open-page';

let database: FreshDatabase;
let house: House;
let stop: () => Promise<void>;

beforeAll(async () => {
  database = await freshDatabase();
  house = await makeHouse(database);
  const relay = startRelay();
  const listener = listenForWork(() => relay.wake());
  stop = async () => {
    await listener.stop();
    await relay.stop();
  };
});

afterAll(async () => {
  await stop();
});

const changed = (id: string) => ({ name: 'template.changed' as const, data: { id, version: 2 } });
const [one, two, three] = [1, 2, 3].map((n) => `01890000-0000-7000-8000-00000000000${n}`);

describe('a live event', () => {
  it('reaches an open page after commit, once, and never after a rollback', async () => {
    const ctx = jobContext(house.workspace.id);
    const heard = await openPage(house.workspace.id, 'template.changed');
    await expect(
      withTenant(ctx, async (tx) => {
        await queueLive(tx, ctx, changed(one));
        throw new Error('rolled back');
      }),
    ).rejects.toThrow('rolled back');
    await withTenant(ctx, (tx) => queueLive(tx, ctx, changed(two), changed(three)));
    await vi.waitFor(() => expect(heard).toHaveLength(2), { timeout: 10_000 });
    expect(heard).toEqual([changed(two), changed(three)]);
    await vi.waitFor(async () => {
      const { rows } = await database.query("select 1 from outbox where kind = 'live' and sent_at is null");
      expect(rows).toEqual([]);
    });
    const { rows } = await database.query(
      "select attempts from outbox where kind = 'live' and payload->'data'->>'id' = any($1)",
      [[one, two, three]],
    );
    expect(rows).toEqual([{ attempts: 1 }, { attempts: 1 }]);
  });

  it('is not heard by a page of another workspace', async () => {
    const other = await makeHouse(database);
    const theirs = await openPage(other.workspace.id, 'template.changed');
    const ours = await openPage(house.workspace.id, 'template.changed');
    const ctx = jobContext(house.workspace.id);
    await withTenant(ctx, (tx) => queueLive(tx, ctx, changed(one)));
    await vi.waitFor(() => expect(ours).toEqual([changed(one)]), { timeout: 10_000 });
    expect(theirs).toEqual([]);
  });
});
