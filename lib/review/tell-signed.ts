import type { TenantTx } from '@/db/tenant';
import type { JobContext, WorkspaceContext } from '@/lib/auth/context';
import type { SignatureRow } from './gate-data';
import { workspacePeople } from './people-data';
import type { RevisionRow, TemplateRow } from './revision-data';
import { mailAbout, tellToday } from './revision-mails';

/** Tells the author of a signature, and everybody of one that locked the revision. */
export async function tellSigned(
  tx: TenantTx,
  ctx: WorkspaceContext | JobContext,
  at: { template: TemplateRow; revision: RevisionRow; signature: SignatureRow; locked: boolean },
): Promise<void> {
  const { template, revision, signature, locked } = at;
  const people = await workspacePeople(tx, revision.workspaceId);
  const concerned = people.filter((person) => locked || person.id === revision.authorId);
  // A lock that came later, by somebody's leaving, is another occasion than the signature was.
  const occasion = `revision-signed:${signature.id}${ctx.kind === 'job' ? ':locked' : ''}`;
  await mailAbout(tx, ctx, concerned, { template, revision, occasion }, (base) => ({
    template: 'revision-signed',
    ...base,
    printedName: signature.printedName,
    role: signature.role,
    meaning: signature.meaning,
    signedAt: signature.signedAt.toISOString(),
    timeZone: signature.timeZone,
    digest: signature.contentDigest,
    signedFor: signature.signedForName,
    locked,
  }));
  await tellToday(tx, ctx, people, revision.id);
}
