import type { TenantTx } from '@/db/tenant';
import type { WorkspaceContext } from '@/lib/auth/context';
import type { MailRequest } from '@/lib/mail/messages';
import { workspacePeople } from '@/lib/review/people-data';
import { mailAbout, tellToday, type RevisionRef } from '@/lib/review/revision-mails';
import type { RevisionRow, TemplateRow } from '@/lib/review/revision-data';

type To = Extract<MailRequest, { template: 'revision-released' }>['to'];

/** Mails everybody in the workspace but the one who acts, and refreshes their Today. */
export async function tellPeople(
  tx: TenantTx,
  ctx: WorkspaceContext,
  about: { template: TemplateRow; revision: RevisionRow; occasion: string },
  write: (base: { to: To } & RevisionRef) => MailRequest,
): Promise<void> {
  const people = await workspacePeople(tx, ctx.workspace.id);
  await mailAbout(tx, ctx, people, about, (base) => write(base));
  await tellToday(tx, ctx, people, about.revision.id);
}
