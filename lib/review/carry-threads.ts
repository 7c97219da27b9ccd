import { uuidv7 } from 'uuidv7';
import type { TenantTx } from '@/db/tenant';
import { insertPlacements, insertThread, threadsOn } from './docket-data';
import { findLock } from './gate-data';
import type { RevisionRow } from './revision-data';

/**
 * Open items travel to the next revision: a pinned one as `carried`, until it is projected onto the new surface.
 * A thread of a locked docket is frozen with it; a new one goes on with it, and its notes are read along.
 * Returns how many travelled.
 */
export async function carryThreads(tx: TenantTx, from: RevisionRow, to: RevisionRow): Promise<number> {
  const { workspaceId } = from;
  const placed = await threadsOn(tx, workspaceId, from.id);
  const open = placed.filter(({ thread }) => thread.state === 'open');
  const locked = (await findLock(tx, workspaceId, from.id)) !== null;
  const rows = [];
  for (const { thread, placement } of open) {
    const threadId = locked ? uuidv7() : thread.id;
    if (locked)
      await insertThread(tx, {
        id: threadId,
        workspaceId,
        templateId: thread.templateId,
        revisionId: to.id,
        continues: [...thread.continues, thread.id],
        mustSettle: thread.mustSettle,
        openedBy: thread.openedBy,
        openedByName: thread.openedByName,
      });
    rows.push({
      workspaceId,
      threadId,
      revisionId: to.id,
      pin: placement.pin,
      standing: placement.pin ? ('carried' as const) : ('free' as const),
      carriedFrom: from.id,
    });
  }
  await insertPlacements(tx, rows);
  return open.length;
}
