import { listSessionIds } from '@/lib/auth/auth-data';
import { log } from '@/lib/log/log';
import { endSockets } from '@/realtime/publish';

/**
 * Ends the sockets that a session opened, once it has ended. When the realtime server cannot be reached this is
 * only logged: events carry ids alone, and each fetch reads session and membership again.
 */
export async function endSessionSockets(sessionId: string): Promise<void> {
  try {
    await endSockets(sessionId);
  } catch (error) {
    log().warn(
      { reason: error instanceof Error ? error.message.split('\n')[0] : 'unknown', sessionId },
      'sockets of an ended session or a removed person could not be ended',
    );
  }
}

/** Ends all open sockets of a person after a membership ended; their sessions stay. */
export async function endPersonSockets(personId: string): Promise<void> {
  await Promise.all((await listSessionIds(personId)).map(endSessionSockets));
}
