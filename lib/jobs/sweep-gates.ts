import { jobContext } from '@/lib/auth/context';
import { log } from '@/lib/log/log';
import { lookAfterGates } from '@/lib/review/look-after-gates';
import { workspacesWithOpenGates } from './sweep-data';

/** Looks after the gates of every workspace that has an open one; ends early when the worker stops. */
export async function sweepGates(stopping?: AbortSignal): Promise<void> {
  for (const workspaceId of await workspacesWithOpenGates()) {
    if (stopping?.aborted) return;
    await sweepGatesOf(workspaceId);
  }
}

/**
 * The same for one workspace, for a verb whose people have just changed; after its commit, because gates are locked
 * before members. What fails here is found again by the worker's sweep.
 */
export async function sweepGatesOf(workspaceId: string): Promise<void> {
  try {
    await lookAfterGates(jobContext(workspaceId));
  } catch (error) {
    log().warn({ err: error, workspaceId }, 'gates not looked after');
  }
}
