import { withTenant } from '@/db/tenant';
import { appendEntry } from '@/lib/audit/append-entry';
import { requirePermission, type WorkspaceContext } from '@/lib/auth/context';
import { parseInput } from '@/lib/http/read-input';
import { queueLive } from '@/lib/jobs/queue-live';
import { asId } from './as-id';
import { findThread, newestPlacement, noteByClientKey } from './docket-data';
import { viewThreadRow } from './docket-view';
import { loadThread } from './load-docket';
import { requireOpenDocket } from './require-open-docket';
import { lockRevision } from './revision-data';
import { NoteInput, type ThreadView } from './schemas';
import { writeNote } from './write-note';

/** Replies in a thread, on the newest revision that it stands on. A repeated client key writes nothing twice. */
export async function replyToThread(
  ctx: WorkspaceContext,
  threadId: string,
  input: unknown,
): Promise<ThreadView> {
  requirePermission(ctx, 'docket.note');
  const said = parseInput(NoteInput, input);
  const id = asId(threadId, 'thread');
  const workspaceId = ctx.workspace.id;
  return withTenant(ctx, async (tx) => {
    const placement = await newestPlacement(tx, workspaceId, id);
    const { template, revision } = await lockRevision(tx, workspaceId, placement.revisionId);
    const thread = await findThread(tx, workspaceId, id);
    const sent = await noteByClientKey(tx, workspaceId, ctx.person.id, said.clientKey);
    if (!sent) {
      await requireOpenDocket(tx, revision, thread);
      const note = await writeNote(tx, ctx, { template, revision, thread }, said);
      await appendEntry(tx, ctx, {
        action: 'note.posted',
        subjectKind: 'note',
        subjectId: note.id,
        detail: {
          templateId: template.id,
          number: template.number,
          revisionId: revision.id,
          letter: revision.letter,
          threadId: id,
          text: note.text.slice(0, 200),
        },
      });
      await queueLive(tx, ctx, { name: 'docket.changed', data: { revisionId: revision.id, threadId: id } });
    }
    return viewThreadRow(await loadThread(tx, workspaceId, sent?.threadId ?? id));
  });
}
