import { withTenant } from '@/db/tenant';
import { requirePermission, type WorkspaceContext } from '@/lib/auth/context';
import { conflict } from '@/lib/errors/app-error';
import { asId } from './as-id';
import { findCheckRun, findReportById } from './check-data';
import { findRevision } from './revision-data';

/** The engine's report on a revision, as stored, with its digest. */
export async function readReport(
  ctx: WorkspaceContext,
  revisionId: string,
): Promise<{ body: Record<string, unknown>; sha256: string }> {
  requirePermission(ctx, 'workspace.read');
  const id = asId(revisionId, 'revision');
  return withTenant(ctx, async (tx) => {
    await findRevision(tx, ctx.workspace.id, id);
    const run = await findCheckRun(tx, ctx.workspace.id, id);
    const report = run?.reportId ? await findReportById(tx, ctx.workspace.id, run.reportId) : null;
    if (!report) throw conflict('check-not-finished', 'The check of this revision has not finished yet.');
    return { body: report.body, sha256: report.sha256 };
  });
}
