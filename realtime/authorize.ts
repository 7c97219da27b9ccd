import { pusher } from './publish';
import type { Channel } from './channels';

/** `1234.5678`, made by the realtime server. Anything else could be signed for another channel (GHSA-7v7m-pcw5-h3cg). */
export const socketIdPattern = /^\d+\.\d+$/;

/** Signs a subscription that the caller has already found to be allowed. */
export function signChannel(
  socketId: string,
  channelName: string,
  channel: Channel,
  person: { id: string; name: string },
): { auth: string; channel_data?: string } {
  if (!socketIdPattern.test(socketId)) throw new TypeError('not a socket id');
  if (channel.kind !== 'revision') return pusher().authorizeChannel(socketId, channelName);
  return pusher().authorizeChannel(socketId, channelName, {
    user_id: person.id,
    user_info: { name: person.name },
  });
}

/**
 * Signs a socket in; without it the server ends the socket (`enableUserAuthentication`). The protocol's user is the
 * session, so that one session's sockets can be ended; who is present is told by `signChannel`.
 */
export function signSession(socketId: string, sessionId: string): { auth: string; user_data: string } {
  if (!socketIdPattern.test(socketId)) throw new TypeError('not a socket id');
  return pusher().authenticateUser(socketId, { id: sessionId }) as { auth: string; user_data: string };
}
