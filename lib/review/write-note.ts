import type { TenantTx } from '@/db/tenant';
import type { WorkspaceContext } from '@/lib/auth/context';
import { checkDocument } from '@/lib/editor/check-document';
import { documentText } from '@/lib/editor/document-text';
import { mentionedPeople, withNames } from '@/lib/editor/mentioned-people';
import { invalid } from '@/lib/errors/app-error';
import { queueLiveToPeople } from '@/lib/jobs/queue-live';
import { insertNote, notesOf, type NoteRow, type ThreadRow } from './docket-data';
import { workspacePeople } from './people-data';
import type { RevisionRow, TemplateRow } from './revision-data';
import { mailAbout } from './revision-mails';

/**
 * Writes one note on a thread and tells those concerned: whom it names, who spoke in the thread, the author of
 * the revision; never the writer. Throws `invalid` where the note names somebody who is not in the workspace.
 */
export async function writeNote(
  tx: TenantTx,
  ctx: WorkspaceContext,
  place: { template: TemplateRow; revision: RevisionRow; thread: ThreadRow },
  said: { clientKey: string; body: unknown },
): Promise<NoteRow> {
  const checked = checkDocument(said.body);
  const people = await workspacePeople(tx, ctx.workspace.id);
  const names = new Map(people.map((person) => [person.id, person.name]));
  const mentions = mentionedPeople(checked);
  if (mentions.some((id) => !names.has(id)))
    throw invalid(
      'The note names somebody who is not in this workspace. Take the name out, or have them invited.',
      [{ pointer: '/body', detail: 'Only people of this workspace can be named.' }],
    );
  const body = withNames(checked, names);
  const earlier = await notesOf(tx, ctx.workspace.id, [...place.thread.continues, place.thread.id]);
  const note = await insertNote(tx, {
    workspaceId: ctx.workspace.id,
    threadId: place.thread.id,
    revisionId: place.revision.id,
    body,
    text: documentText(body),
    mentions,
    authorId: ctx.person.id,
    authorName: ctx.person.name,
    clientKey: said.clientKey,
  });
  const concerned = new Set([
    ...mentions,
    ...earlier.map((row) => row.authorId),
    place.thread.openedBy,
    place.revision.authorId,
  ]);
  concerned.delete(ctx.person.id);
  const told = people.filter((person) => concerned.has(person.id));
  const about = { template: place.template, revision: place.revision, occasion: `note-posted:${note.id}` };
  await mailAbout(tx, ctx, told, about, (base, person) => ({
    template: 'note-posted',
    ...base,
    authorName: note.authorName,
    text: note.text.slice(0, 1000),
    mentioned: mentions.includes(person.id),
  }));
  const ids = told.map((person) => person.id);
  await queueLiveToPeople(tx, ctx, ids, { name: 'today.changed', data: { id: place.revision.id } });
  return note;
}
