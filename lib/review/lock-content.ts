import type { TenantTx } from '@/db/tenant';
import { appendEntry } from '@/lib/audit/append-entry';
import { conflict } from '@/lib/errors/app-error';
import { workspaceIdOf, type JobContext, type WorkspaceContext } from '@/lib/auth/context';
import { composeContent } from './content';
import { frozenRecord } from './frozen-record';
import { insertLock } from './gate-data';
import { moveRevision, type RevisionRow } from './revision-data';
import { viewDocketRows } from './docket-view';

/**
 * Locks a revision whose gates have all passed: writes down what was agreed and its digest, then approves it.
 * From this row on the database refuses changes to mesh, recipe, report, docket and signatures.
 */
export async function lockContent(
  tx: TenantTx,
  ctx: WorkspaceContext | JobContext,
  revision: RevisionRow,
): Promise<void> {
  const workspaceId = workspaceIdOf(ctx);
  const composed = await composeContent(tx, revision);
  if (!composed) throw conflict('check-not-finished', 'The check of this revision has not finished yet.');
  await insertLock(tx, {
    workspaceId,
    revisionId: revision.id,
    contentDigest: composed.digest,
    content: composed.content,
    docket: viewDocketRows(revision.id, composed.docket),
  });
  const moved = await moveRevision(tx, ctx, revision, 'approved', null);
  await appendEntry(tx, ctx, {
    action: 'revision.locked',
    subjectKind: 'revision',
    subjectId: revision.id,
    detail: {
      templateId: revision.templateId,
      letter: moved.letter,
      contentDigest: composed.digest,
      record: await frozenRecord(tx, moved),
    },
  });
}
