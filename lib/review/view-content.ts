import { withTenant } from '@/db/tenant';
import { requirePermission, type WorkspaceContext } from '@/lib/auth/context';
import { conflict } from '@/lib/errors/app-error';
import { asId } from './as-id';
import { findCheckRun } from './check-data';
import { composeContent, type Content } from './content';
import { viewDocketRows } from './docket-view';
import { findLock, gatesOf } from './gate-data';
import { recipeLines } from './recipe-lines';
import { findRevision } from './revision-data';
import type { ContentView, DocketView } from './schemas';

/** Exactly what a signer puts their name to, and its digest; once locked, what was agreed. */
export async function viewContent(ctx: WorkspaceContext, revisionId: string): Promise<ContentView> {
  requirePermission(ctx, 'workspace.read');
  const id = asId(revisionId, 'revision');
  const workspaceId = ctx.workspace.id;
  return withTenant(ctx, async (tx) => {
    const revision = await findRevision(tx, workspaceId, id);
    const run = await findCheckRun(tx, workspaceId, id);
    const gates = await gatesOf(tx, workspaceId, id);
    const names = gates.map((gate) => gate.rule.name);
    const verdict = run?.verdict ?? null;
    const lock = await findLock(tx, workspaceId, id);
    if (lock)
      return asView(lock.content as Content, lock.contentDigest, lock.docket as DocketView, verdict, names);
    const now = await composeContent(tx, revision);
    if (!now)
      throw conflict(
        'check-not-finished',
        'The check of this revision has not finished, so there is nothing to sign yet.',
      );
    return asView(now.content, now.digest, viewDocketRows(id, now.docket), verdict, names);
  });
}

function asView(
  content: Content,
  digest: string,
  docket: DocketView,
  verdict: ContentView['summary']['verdict'],
  gateNames: string[],
): ContentView {
  const open = docket.threads.filter((thread) => thread.state === 'open' && !thread.afterApproval);
  return {
    digest,
    content,
    summary: {
      revision: `${content.template.number} revision ${content.revision.letter}`,
      meshSha256: content.mesh.sha256,
      meshFile: content.mesh.fileName,
      meshBytes: content.mesh.bytes,
      recipe: recipeLines(content.recipe),
      verdict,
      findings: docket.findings.map((finding) => ({
        checkId: finding.checkId,
        status: finding.status,
        message: finding.message,
        waived: finding.waiver ? `${finding.waiver.by}: ${finding.waiver.reason}` : null,
      })),
      openItems: open.map((thread) => {
        const [first] = thread.notes;
        const words = first ? `${first.authorName}: ${first.text.slice(0, 140)}` : thread.openedByName;
        return thread.mustSettle ? `Must be settled. ${words}` : words;
      }),
      gatePlan: `Plan ${content.gatePlan.number}: ${gateNames.join(', ')}`,
    },
  };
}
