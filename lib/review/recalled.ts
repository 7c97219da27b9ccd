import type { WorkspaceContext } from '@/lib/auth/context';
import { conflict } from '@/lib/errors/app-error';
import type { RevisionRow } from './revision-data';

/** Whether this reader may have what is made from: after a recall a lead alone may, to find out what happened. */
export const mayMakeFrom = (ctx: WorkspaceContext, revision: Pick<RevisionRow, 'state'>): boolean =>
  revision.state !== 'recalled' || ctx.role === 'lead';

/** Throws conflict `recalled` where the exact mesh or the pack is no longer handed out. */
export function requireNotRecalled(ctx: WorkspaceContext, revision: RevisionRow): void {
  if (mayMakeFrom(ctx, revision)) return;
  throw conflict(
    'recalled',
    `Revision ${revision.letter} is recalled: ${revision.stateReason ?? ''} Nothing may be made from it.`,
  );
}
