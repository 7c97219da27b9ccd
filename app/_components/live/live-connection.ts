import type PusherClient from 'pusher-js';
import type { Channel, PresenceChannel } from 'pusher-js';
import { readLiveEvent, type LiveEvent } from '@/realtime/events';

/** What a browser needs to reach the realtime server; the key is public. */
export interface LiveConfig {
  key: string;
  host: string;
  port: number;
  tls: boolean;
}

export interface LivePerson {
  id: string;
  name: string;
}

export interface LiveListeners {
  /** True once every wanted channel is subscribed, false as soon as the socket or a channel is lost. */
  onSubscribed: (subscribed: boolean) => void;
  onEvent: (event: LiveEvent, channel: string) => void;
}

export interface LiveConnection {
  /** Shows the person on a presence channel; `onPeople` hears of everybody on it. Returns the way to leave. */
  join: (channel: string, onPeople: (people: LivePerson[]) => void) => () => void;
  close: () => void;
}

async function authorize(socketId: string, channelName: string) {
  const response = await fetch('/api/v1/realtime/authorize', {
    method: 'POST',
    headers: { 'content-type': 'application/x-www-form-urlencoded' },
    body: new URLSearchParams({ socket_id: socketId, channel_name: channelName }),
    credentials: 'same-origin',
  });
  if (!response.ok) throw new Error(`The channel was refused (${response.status}).`);
  return (await response.json()) as { auth: string; channel_data?: string };
}

type Done = (error: Error | null, answer: unknown) => void;

/** Says whose socket this is; the server ends those that nobody signs in, and those of an ended session. */
async function signIn(socketId: string) {
  const response = await fetch('/api/v1/realtime/sign-in', {
    method: 'POST',
    headers: { 'content-type': 'application/x-www-form-urlencoded' },
    body: new URLSearchParams({ socket_id: socketId }),
    credentials: 'same-origin',
  });
  if (!response.ok) throw new Error(`The socket was refused (${response.status}).`);
  return (await response.json()) as { auth: string; user_data: string };
}

/** Opens one socket for the page and subscribes to `channels`. The client library comes only when called. */
export async function openLiveConnection(
  config: LiveConfig,
  channels: readonly string[],
  listeners: LiveListeners,
): Promise<LiveConnection> {
  const { default: Pusher } = await import('pusher-js');
  const pusher: PusherClient = new Pusher(config.key, {
    cluster: '',
    wsHost: config.host,
    wsPort: config.port,
    wssPort: config.port,
    forceTLS: config.tls,
    enabledTransports: [config.tls ? 'wss' : 'ws'],
    disableStats: true,
    // A socket that says nothing is asked after 8 s and given up 4 s later.
    activityTimeout: 8_000,
    pongTimeout: 4_000,
    unavailableTimeout: 6_000,
    channelAuthorization: {
      customHandler: ({ socketId, channelName }: { socketId: string; channelName: string }, done: Done) => {
        authorize(socketId, channelName).then(
          (answer) => done(null, answer),
          (error: Error) => done(error, null),
        );
      },
    } as never,
    userAuthentication: {
      customHandler: ({ socketId }: { socketId: string }, done: Done) => {
        signIn(socketId).then(
          (answer) => done(null, answer),
          (error: Error) => done(error, null),
        );
      },
    } as never,
  });
  pusher.signin();

  const held = new Set<string>();
  const tell = () => listeners.onSubscribed(channels.every((name) => held.has(name)));
  for (const name of channels) {
    const channel: Channel = pusher.subscribe(name);
    channel.bind('pusher:subscription_succeeded', () => {
      held.add(name);
      tell();
    });
    channel.bind('pusher:subscription_error', () => {
      held.delete(name);
      tell();
    });
    channel.bind_global((eventName: string, data: unknown) => {
      const event = readLiveEvent(eventName, data);
      if (event) listeners.onEvent(event, name);
    });
  }
  pusher.connection.bind('state_change', ({ current }: { current: string }) => {
    if (current === 'connected') return;
    held.clear();
    tell();
  });

  return {
    join(name, onPeople) {
      const channel = pusher.subscribe(name) as PresenceChannel;
      const report = () => {
        const people: LivePerson[] = [];
        channel.members.each((member: { id: string; info: { name: string } }) =>
          people.push({ id: member.id, name: member.info.name }),
        );
        onPeople(people);
      };
      channel.bind('pusher:subscription_succeeded', report);
      channel.bind('pusher:member_added', report);
      channel.bind('pusher:member_removed', report);
      return () => {
        channel.unbind();
        pusher.unsubscribe(name);
      };
    },
    close() {
      pusher.disconnect();
    },
  };
}
