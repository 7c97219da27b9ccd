import { log } from '@/lib/log/log';
import { endSockets } from '@/realtime/publish';

/**
 * Ends a person's open sockets after a membership ended. When the realtime server cannot be reached this is
 * only logged: events carry ids alone, and each fetch reads the membership again.
 */
export async function endPersonSockets(personId: string): Promise<void> {
  try {
    await endSockets(personId);
  } catch (error) {
    log().warn(
      { reason: error instanceof Error ? error.message.split('\n')[0] : 'unknown', personId },
      'sockets of a removed person could not be ended',
    );
  }
}
