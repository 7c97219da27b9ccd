import type { TenantTx } from '@/db/tenant';
import type { JobContext, WorkspaceContext } from '@/lib/auth/context';
import { checkName } from './check-words';
import { findingsOf } from './check-data';
import { waiversOf } from './docket-data';
import { workspacePeople } from './people-data';
import type { RevisionRow, TemplateRow } from './revision-data';
import { mailAbout, tellToday } from './revision-mails';

type About = { template: TemplateRow; revision: RevisionRow };

/** Up to the first full stop that ends a sentence; the one in `2.9 mm` does not. */
export const firstSentence = (text: string) => /^.*?[.!?](?=\s|$)/s.exec(text.trim())?.[0] ?? text.trim();

/**
 * Mails what a finished check means, once: while a failing finding stands, to who posted the revision; with
 * none left, to the client's people, for whom there is something to look at only now.
 */
export async function tellCheckEnded(
  tx: TenantTx,
  ctx: JobContext | WorkspaceContext,
  { template, revision }: About,
): Promise<void> {
  const found = await findingsOf(tx, revision.workspaceId, revision.id);
  const waivers = await waiversOf(tx, revision.workspaceId, revision.id);
  const waived = new Set(waivers.map(({ findingId }) => findingId));
  const failing = found.filter(({ id, status }) => status === 'fail' && !waived.has(id));
  const people = await workspacePeople(tx, revision.workspaceId);
  if (failing.length) {
    const author = people.filter(({ id }) => id === revision.authorId);
    const about = { template, revision, occasion: `check-fails:${revision.id}` };
    await mailAbout(tx, ctx, author, about, (base) => ({
      template: 'check-fails',
      ...base,
      failing: failing.map(({ checkId, remedy, message }) => ({
        check: checkName(checkId),
        remedy: firstSentence(remedy || message),
      })),
    }));
    return tellToday(tx, ctx, author, revision.id);
  }
  const client = people.filter(({ side }) => side === 'client');
  const about = { template, revision, occasion: `revision-checked:${revision.id}` };
  await mailAbout(tx, ctx, client, about, (base) => ({
    template: 'revision-checked',
    ...base,
    authorName: revision.authorName,
    note: revision.note,
    look: found.filter(({ status }) => status === 'caution').length,
    waived: waived.size,
    notRun: found.filter(({ status }) => status === 'not-run').length,
  }));
}

/** Tells who posted the revision that its check ended without a report; once for each run that was ordered. */
export async function tellCheckGivenUp(
  tx: TenantTx,
  ctx: JobContext,
  { template, revision, jobId, reason }: About & { jobId: string; reason: string },
): Promise<void> {
  const author = (await workspacePeople(tx, revision.workspaceId)).filter(
    ({ id }) => id === revision.authorId,
  );
  const about = { template, revision, occasion: `check-given-up:${jobId}` };
  await mailAbout(tx, ctx, author, about, (base) => ({ template: 'check-given-up', ...base, reason }));
}
