import type { TenantTx } from '@/db/tenant';
import { digestOf } from '@/lib/audit/canonical';
import { conflict } from '@/lib/errors/app-error';
import { findCheckRun, findReportById } from '@/lib/review/check-data';
import { composeContent, type Content } from '@/lib/review/content';
import { findLock, signaturesOf, type LockRow } from '@/lib/review/gate-data';
import { loadRevisionParts, type RevisionRow } from '@/lib/review/revision-data';

/**
 * Holds a locked revision against its own parts, as they are stored at this moment: the digest is computed
 * again from mesh, recipe, report and docket. Throws conflict `not-locked`, or `content-changed` naming the part.
 */
export async function requireAgreed(tx: TenantTx, revision: RevisionRow): Promise<LockRow> {
  const { workspaceId, letter } = revision;
  const lock = await findLock(tx, workspaceId, revision.id);
  if (!lock) throw conflict('not-locked', `Revision ${letter} is not approved and locked yet.`);
  const changed = (part: string) =>
    conflict(
      'content-changed',
      `What is stored of revision ${letter} is not what was agreed: ${part}. It is not released. Have the audit chain verified.`,
    );
  const { recipe } = await loadRevisionParts(tx, revision);
  const run = await findCheckRun(tx, workspaceId, revision.id);
  const report = run?.reportId ? await findReportById(tx, workspaceId, run.reportId) : null;
  if (digestOf(lock.content) !== lock.contentDigest) throw changed('the locked content');
  if (digestOf(recipe.body) !== recipe.digest) throw changed('the recipe');
  if (!report || digestOf(report.body) !== report.sha256) throw changed('the report');
  const now = await composeContent(tx, revision, { locked: lock.content as Content });
  if (now?.digest !== lock.contentDigest) throw changed('mesh, recipe, report, docket or gate plan');
  const signed = await signaturesOf(tx, workspaceId, revision.id);
  const last = signed.filter(({ decision }) => decision === 'sign').at(-1);
  // A revision whose gates are all automatic has no signature to compare.
  if (last && last.contentDigest !== lock.contentDigest) throw changed('the last signature');
  return lock;
}
