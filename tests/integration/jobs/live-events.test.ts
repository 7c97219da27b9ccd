import Pusher from 'pusher-js';
import { afterAll, beforeAll, describe, expect, it, vi } from 'vitest';
import { withTenant } from '@/db/tenant';
import { jobContext } from '@/lib/auth/context';
import { queueLive } from '@/lib/jobs/queue-live';
import { listenForWork } from '@/lib/jobs/listen';
import { startRelay } from '@/lib/jobs/relay/start-relay';
import { signChannel } from '@/realtime/authorize';
import { parseChannel, workspaceChannel } from '@/realtime/channels';
import { freshDatabase, type FreshDatabase } from '@/tests/support/database';
import { makeHouse, type House } from '@/tests/support/make-house';

let database: FreshDatabase;
let house: House;
let stop: () => Promise<void>;
const sockets: Pusher[] = [];

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
  sockets.forEach((socket) => socket.disconnect());
  await stop();
});

/** A page that is open on a workspace: the Pusher protocol for real, the channel signed as our route signs it. */
async function openPage(workspaceId: string) {
  const env = process.env;
  const socket = new Pusher(env.PUSHER_KEY!, {
    cluster: 'unused',
    wsHost: env.PUSHER_PUBLIC_HOST,
    wsPort: Number(env.PUSHER_PUBLIC_PORT),
    forceTLS: false,
    enabledTransports: ['ws'],
    channelAuthorization: {
      endpoint: 'unused',
      transport: 'ajax',
      customHandler: ({ socketId, channelName }, done) =>
        done(
          null,
          signChannel(socketId, channelName, parseChannel(channelName)!, { id: 'x', name: 'x' }) as never,
        ),
    },
  });
  sockets.push(socket);
  const heard: { name: string; data: unknown }[] = [];
  const channel = socket.subscribe(workspaceChannel(workspaceId));
  channel.bind_global((name: string, data: unknown) => {
    // The house's own events may still be on their way.
    if (name === 'template.changed') heard.push({ name, data });
  });
  await new Promise<void>((resolve, reject) => {
    channel.bind('pusher:subscription_succeeded', () => resolve());
    channel.bind('pusher:subscription_error', reject);
  });
  return heard;
}

const changed = (id: string) => ({ name: 'template.changed' as const, data: { id, version: 2 } });
const [one, two, three] = [1, 2, 3].map((n) => `01890000-0000-7000-8000-00000000000${n}`);

describe('a live event', () => {
  it('reaches an open page after commit, once, and never after a rollback', async () => {
    const ctx = jobContext(house.workspace.id);
    const heard = await openPage(house.workspace.id);
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
    const theirs = await openPage(other.workspace.id);
    const ours = await openPage(house.workspace.id);
    const ctx = jobContext(house.workspace.id);
    await withTenant(ctx, (tx) => queueLive(tx, ctx, changed(one)));
    await vi.waitFor(() => expect(ours).toEqual([changed(one)]), { timeout: 10_000 });
    expect(theirs).toEqual([]);
  });
});
