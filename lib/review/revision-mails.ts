import type { TenantTx } from '@/db/tenant';
import { workspaceIdOf, type JobContext, type WorkspaceContext } from '@/lib/auth/context';
import { queueLiveToPeople } from '@/lib/jobs/queue-live';
import { queueMail } from '@/lib/jobs/queue-mail';
import type { MailRequest } from '@/lib/mail/messages';
import { workspaceNames, type WorkspaceNames, type WorkspacePerson } from './people-data';
import type { RevisionRow, TemplateRow } from './revision-data';

/** Address of a revision's page on our own host. */
export const revisionPath = (workspaceSlug: string, templateId: string, letter: string) =>
  `/w/${workspaceSlug}/templates/${templateId}/${letter}`;

/** The part of a mail that says which revision it speaks of. */
export function revisionRef(names: WorkspaceNames, template: TemplateRow, revision: { letter: string }) {
  return {
    workspaceId: names.id,
    workspaceName: names.name,
    number: template.number,
    title: template.title,
    letter: revision.letter,
    path: revisionPath(names.slug, template.id, revision.letter),
  };
}
export type RevisionRef = ReturnType<typeof revisionRef>;

type To = { personId: string; email: string; name: string };

/**
 * Queues one mail a person about a revision; `occasion` with the person's id is the key that drops repeats.
 * Nobody is mailed about what they just did themselves, unless it asks something of them (`evenActor`).
 */
export async function mailAbout(
  tx: TenantTx,
  ctx: WorkspaceContext | JobContext,
  people: WorkspacePerson[],
  about: { template: TemplateRow; revision: RevisionRow; occasion: string; evenActor?: boolean },
  write: (base: { to: To } & RevisionRef, person: WorkspacePerson) => MailRequest,
): Promise<void> {
  const actor = 'person' in ctx ? ctx.person.id : null;
  const told = about.evenActor ? people : people.filter((person) => person.id !== actor);
  if (!told.length) return;
  const workspaceId = workspaceIdOf(ctx);
  const ref = revisionRef(await workspaceNames(tx, workspaceId), about.template, about.revision);
  await queueMail(
    tx,
    { workspaceId },
    told.map((person) => ({
      request: write({ to: { personId: person.id, email: person.email, name: person.name }, ...ref }, person),
      dedupeKey: `${about.occasion}:${person.id}`,
    })),
  );
}

/** Their Today has changed. */
export async function tellToday(
  tx: TenantTx,
  ctx: WorkspaceContext | JobContext,
  people: WorkspacePerson[],
  revisionId: string,
): Promise<void> {
  await queueLiveToPeople(
    tx,
    ctx,
    people.map((person) => person.id),
    { name: 'today.changed', data: { id: revisionId } },
  );
}
