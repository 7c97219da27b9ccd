import type { TenantTx } from '@/db/tenant';
import { conflict } from '@/lib/errors/app-error';
import type { ThreadRow } from './docket-data';
import { findLockDigest } from './gate-data';
import type { RevisionRow } from './revision-data';

/** A docket that was locked takes no more notes; what is said afterwards has its own threads. */
export async function requireOpenDocket(
  tx: TenantTx,
  revision: RevisionRow,
  thread: ThreadRow,
): Promise<void> {
  if (thread.afterApproval || !(await findLockDigest(tx, revision.workspaceId, revision.id))) return;
  throw conflict(
    'revision-locked',
    `Revision ${revision.letter} is locked, and its docket with it. Open a new note: it is kept apart as "after approval".`,
  );
}
