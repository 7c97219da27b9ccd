import { withTenant } from '@/db/tenant';
import type { JobContext, WorkspaceContext } from '@/lib/auth/context';
import { workspaceIdOf } from '@/lib/auth/context';
import { digestOf } from '@/lib/audit/canonical';
import { conflict } from '@/lib/errors/app-error';
import { signedParts } from './activity-data';
import { findCheckRun, findReportById } from './check-data';
import type { Content } from './content';
import { findLock, gatesOf, signaturesOf } from './gate-data';
import { findRevision, loadRevisionParts } from './revision-data';
import type { DocketView } from './schemas';

/**
 * Everything that was agreed on a locked revision, as frozen. Throws not_found for a foreign revision and
 * conflict `not-locked` for one that is not approved.
 */
export async function loadAgreed(ctx: WorkspaceContext | JobContext, revisionId: string) {
  const workspaceId = workspaceIdOf(ctx);
  return withTenant(ctx, async (tx) => {
    const revision = await findRevision(tx, workspaceId, revisionId);
    const lock = await findLock(tx, workspaceId, revisionId);
    if (!lock)
      throw conflict('not-locked', `Revision ${revision.letter} is not approved, so nothing is agreed yet.`);
    const { mesh, recipe } = await loadRevisionParts(tx, revision);
    const run = await findCheckRun(tx, workspaceId, revisionId);
    const report = run?.reportId ? await findReportById(tx, workspaceId, run.reportId) : null;
    if (!report) throw new Error('a locked revision has no report');
    const gates = await gatesOf(tx, workspaceId, revisionId);
    const names = new Map(gates.map((gate) => [gate.id, gate.rule.name]));
    const signed = await signedParts(tx, workspaceId, revisionId);
    const signatures = (await signaturesOf(tx, workspaceId, revisionId)).map((row) => ({
      id: row.id,
      gateId: row.gateId,
      gateName: names.get(row.gateId) ?? '',
      decision: row.decision,
      signerId: row.signerId,
      printedName: row.printedName,
      role: row.role,
      meaning: row.meaning,
      reason: row.reason,
      contentDigest: row.contentDigest,
      method: row.method,
      signedAt: row.signedAt.toISOString(),
      timeZone: row.timeZone,
      signedFor: row.signedForName ? { id: row.signedForId, name: row.signedForName } : null,
      content: contentAsSigned(lock.content as Content, signed.get(row.id), row.contentDigest),
    }));
    return {
      // As signed; the template itself may have been renamed since.
      template: { ...(lock.content as Content).template },
      revision: {
        id: revision.id,
        letter: revision.letter,
        state: revision.state,
        note: revision.note,
        authorName: revision.authorName,
        postedAt: revision.postedAt.toISOString(),
      },
      mesh: {
        id: mesh.id,
        fileName: mesh.fileName,
        bytes: mesh.bytes,
        sha256: mesh.sha256,
        format: mesh.format,
        unit: mesh.unit,
        triangles: mesh.triangles,
        storeKey: mesh.storeKey,
      },
      recipe: { body: recipe.body, digest: recipe.digest },
      report: { body: report.body, sha256: report.sha256, engineVersion: report.engineVersion },
      gates: gates.map((gate) => ({ id: gate.id, ordinal: gate.ordinal, rule: gate.rule })),
      signatures,
      lock: {
        contentDigest: lock.contentDigest,
        content: lock.content as Content,
        docket: lock.docket as DocketView,
        lockedAt: lock.lockedAt.toISOString(),
      },
    };
  });
}
export type Agreed = Awaited<ReturnType<typeof loadAgreed>>;

/**
 * The content behind one signature. Between two gates notes may join the docket and the template be renamed, so an
 * earlier signature stands on earlier parts, which the audit chain keeps; null where the digest does not come out (then it is not proven).
 */
function contentAsSigned(
  locked: Content,
  parts: Partial<Content> | undefined,
  digest: string,
): Content | null {
  const content = { ...locked, ...parts };
  return digestOf(content) === digest ? content : null;
}
