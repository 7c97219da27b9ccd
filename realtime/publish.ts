import Pusher from 'pusher';
import { realtimeEnv } from '@/lib/env/env';
import type { LivePayload } from './events';

let client: Pusher | undefined;

export function pusher(): Pusher {
  const e = realtimeEnv();
  client ??= new Pusher({
    appId: e.PUSHER_APP_ID,
    key: e.PUSHER_KEY,
    secret: e.PUSHER_SECRET,
    host: e.PUSHER_HOST,
    port: String(e.PUSHER_PORT),
    useTLS: e.PUSHER_TLS,
    cluster: 'unused',
    timeout: 2_000,
  });
  return client;
}

/** Hands live events to the realtime server, at most ten a call (its limit). Throws when it cannot be reached. */
export async function publish(events: LivePayload[]): Promise<void> {
  for (let i = 0; i < events.length; i += 10) {
    const batch = events
      .slice(i, i + 10)
      .map(({ channel, name, data }) => ({ channel, name, data: JSON.stringify(data) }));
    await pusher().triggerBatch(batch as never);
  }
}

/** Ends the open sockets of a session; whoever opens another must be signed in and asks again for each channel. */
export async function endSockets(sessionId: string): Promise<void> {
  await pusher().terminateUserConnections(sessionId);
}
