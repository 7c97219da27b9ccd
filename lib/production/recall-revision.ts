import type { WorkspaceContext } from '@/lib/auth/context';
import { endRelease, type EndedView } from './end-release';

/**
 * Takes a released revision back because something is wrong with it: nothing more may be made from it.
 * Producers and leads. Throws forbidden, not_found, invalid, conflict `not-released`.
 */
export const recallRevision = (
  ctx: WorkspaceContext,
  revisionId: string,
  input: unknown,
): Promise<EndedView> => endRelease(ctx, revisionId, input, 'recalled');
