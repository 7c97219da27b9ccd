import { withTenant, type TenantTx } from '@/db/tenant';
import { appendEntry } from '@/lib/audit/append-entry';
import { requirePermission, type WorkspaceContext } from '@/lib/auth/context';
import { conflict, notFound } from '@/lib/errors/app-error';
import { parseInput } from '@/lib/http/read-input';
import { queueLive } from '@/lib/jobs/queue-live';
import { asId } from './as-id';
import { findFinding } from './check-data';
import { insertPlacements, insertThread, noteByClientKey, threadOfFinding } from './docket-data';
import { viewThreadRow } from './docket-view';
import { findLockDigest } from './gate-data';
import { loadThread } from './load-docket';
import { lockRevision, type RevisionRow, type TemplateRow } from './revision-data';
import { OpenThreadInput, type ThreadView } from './schemas';
import { writeNote } from './write-note';

/**
 * Opens a matter on a revision: about a finding, pinned to a place, or free. A second send under the same client
 * key answers with the thread that is there. On a locked revision it stands outside what was agreed.
 */
export async function openThread(
  ctx: WorkspaceContext,
  revisionId: string,
  input: unknown,
): Promise<ThreadView> {
  requirePermission(ctx, 'docket.note');
  const { clientKey, body, findingId, pin, mustSettle } = parseInput(OpenThreadInput, input);
  const id = asId(revisionId, 'revision');
  const workspaceId = ctx.workspace.id;
  return withTenant(ctx, async (tx) => {
    const { template, revision } = await lockRevision(tx, workspaceId, id);
    const sent = await noteByClientKey(tx, workspaceId, ctx.person.id, clientKey);
    if (sent) return viewThreadRow(await loadThread(tx, workspaceId, sent.threadId));
    const afterApproval = (await findLockDigest(tx, workspaceId, id)) !== null;
    requireCurrent(template, revision, afterApproval);
    // A finding of a locked revision is answered afterwards by a free thread: its own answers are frozen.
    const about = findingId && !afterApproval ? await freeFinding(tx, workspaceId, id, findingId) : null;
    const thread = await insertThread(tx, {
      workspaceId,
      templateId: template.id,
      revisionId: id,
      findingId: about,
      mustSettle: mustSettle && !afterApproval,
      afterApproval,
      openedBy: ctx.person.id,
      openedByName: ctx.person.name,
    });
    await insertPlacements(tx, [
      { workspaceId, threadId: thread.id, revisionId: id, pin, standing: pin ? 'placed' : 'free' },
    ]);
    const note = await writeNote(tx, ctx, { template, revision, thread }, { clientKey, body });
    await appendEntry(tx, ctx, {
      action: 'thread.opened',
      subjectKind: 'thread',
      subjectId: thread.id,
      detail: {
        templateId: template.id,
        number: template.number,
        revisionId: id,
        letter: revision.letter,
        findingId: about,
        mustSettle: thread.mustSettle,
        afterApproval,
        noteId: note.id,
        text: note.text.slice(0, 200),
      },
    });
    await queueLive(tx, ctx, { name: 'docket.changed', data: { revisionId: id, threadId: thread.id } });
    return viewThreadRow(await loadThread(tx, workspaceId, thread.id));
  });
}

/** A closed revision with a newer one after it would keep a new item from being seen. */
function requireCurrent(template: TemplateRow, revision: RevisionRow, locked: boolean): void {
  if (locked || revision.state === 'in_review' || template.latestRevisionId === revision.id) return;
  throw conflict(
    'not-current',
    `Revision ${revision.letter} is closed and ${template.latestLetter ?? 'a newer one'} has followed it. Write the note there.`,
  );
}

async function freeFinding(
  tx: TenantTx,
  workspaceId: string,
  revisionId: string,
  findingId: string,
): Promise<string> {
  const finding = await findFinding(tx, workspaceId, findingId);
  if (finding?.revisionId !== revisionId) throw notFound('finding');
  if (await threadOfFinding(tx, workspaceId, findingId))
    throw conflict(
      'already-answered',
      'This finding is being talked about already. Reload, and reply there.',
    );
  return findingId;
}
