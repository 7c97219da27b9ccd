import Pusher from 'pusher-js';
import { afterAll } from 'vitest';
import { signChannel } from '@/realtime/authorize';
import { parseChannel, workspaceChannel } from '@/realtime/channels';
import type { LiveEventName } from '@/realtime/events';

export type Heard = { name: string; data: unknown };
const sockets: Pusher[] = [];
afterAll(() => sockets.forEach((socket) => socket.disconnect()));

/**
 * A page that is open on a workspace: the Pusher protocol for real, the channel signed as our route
 * signs it. Gathers the events of one name; others may still be on their way from what the test did before.
 */
export async function openPage(workspaceId: string, event: LiveEventName): Promise<Heard[]> {
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
  const heard: Heard[] = [];
  const channel = socket.subscribe(workspaceChannel(workspaceId));
  channel.bind_global((name: string, data: unknown) => {
    if (name === event) heard.push({ name, data });
  });
  await new Promise<void>((resolve, reject) => {
    channel.bind('pusher:subscription_succeeded', () => resolve());
    channel.bind('pusher:subscription_error', reject);
  });
  return heard;
}
