import type { WorkspaceContext } from '@/lib/auth/context';
import { endRelease, type EndedView } from './end-release';

/**
 * Ends a released revision that has served its time. Producers and leads.
 * Throws forbidden, not_found, invalid, conflict `not-released`.
 */
export const retireRevision = (
  ctx: WorkspaceContext,
  revisionId: string,
  input: unknown,
): Promise<EndedView> => endRelease(ctx, revisionId, input, 'retired');
