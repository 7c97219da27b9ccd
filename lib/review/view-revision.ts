import { withTenant, type TenantTx } from '@/db/tenant';
import { requirePermission, type WorkspaceContext } from '@/lib/auth/context';
import { latestJobOf } from '@/lib/jobs/jobs-data';
import { asId } from './as-id';
import { derivativesOf, findCheckRun, findJob, findHelpInReport } from './check-data';
import { composeContent } from './content';
import { openMustSettle } from './docket-data';
import { findLockDigest, gatesOf } from './gate-data';
import { gateViews } from './gate-view';
import { releaseOf } from './release-data';
import {
  findRevision,
  findRevisionByLetter,
  loadRevisionParts,
  revisionsOf,
  type RevisionRow,
} from './revision-data';
import type { RevisionView } from './schemas';
import { signersOf } from './signers-of';
import { fileUrl } from './template-summary';
import { whatReaderMayDo } from './what-reader-may-do';

/** A revision as its page shows it, with what the reader may do here and now. */
export async function viewRevision(ctx: WorkspaceContext, revisionId: string): Promise<RevisionView> {
  requirePermission(ctx, 'workspace.read');
  const id = asId(revisionId, 'revision');
  return withTenant(ctx, async (tx) => compose(tx, ctx, await findRevision(tx, ctx.workspace.id, id)));
}

/** The same, found by the letter that its address carries. */
export async function viewRevisionByLetter(
  ctx: WorkspaceContext,
  templateId: string,
  letter: string,
): Promise<RevisionView> {
  requirePermission(ctx, 'workspace.read');
  const id = asId(templateId, 'template');
  return withTenant(ctx, async (tx) =>
    compose(tx, ctx, await findRevisionByLetter(tx, ctx.workspace.id, id, letter.toUpperCase())),
  );
}

async function compose(tx: TenantTx, ctx: WorkspaceContext, revision: RevisionRow): Promise<RevisionView> {
  const workspaceId = ctx.workspace.id;
  const { template, mesh, recipe } = await loadRevisionParts(tx, revision);
  const lock = await findLockDigest(tx, workspaceId, revision.id);
  const gates = await gatesOf(tx, workspaceId, revision.id);
  const shared = await signersOf(tx, revision, mesh);
  const release = await releaseOf(tx, workspaceId, revision.id);
  const packJob = release
    ? await latestJobOf(tx, { workspaceId, kind: 'build-pack', subjectId: release.release.id })
    : null;
  const check = await checkOf(tx, revision);
  const siblings = await revisionsOf(tx, workspaceId, template.id);
  const mustSettle = lock ? 0 : (await openMustSettle(tx, workspaceId, revision.id)).length;
  return {
    id: revision.id,
    template: { id: template.id, number: template.number, title: template.title, dueOn: template.dueOn },
    letter: revision.letter,
    state: revision.state,
    stateReason: revision.stateReason,
    postedAt: revision.postedAt.toISOString(),
    author: { id: revision.authorId, name: revision.authorName },
    note: revision.note,
    mesh: {
      fileName: mesh.fileName,
      bytes: mesh.bytes,
      sha256: mesh.sha256,
      triangles: mesh.triangles,
      format: mesh.format,
      unit: mesh.unit,
    },
    recipe: recipe.body,
    check,
    ...(await shownOf(tx, ctx, revision, recipe.digest)),
    gates: gateViews(gates, shared),
    contentDigest: lock?.contentDigest ?? (await composeContent(tx, revision))?.digest ?? null,
    lockedAt: lock?.lockedAt.toISOString() ?? null,
    release: release
      ? {
          id: release.release.id,
          byName: release.release.releasedByName,
          at: release.release.createdAt.toISOString(),
          note: release.release.note,
          pack: release.pack
            ? { fileName: release.pack.fileName, bytes: release.pack.bytes, sha256: release.pack.sha256 }
            : null,
          packJob: packJob ? { state: packJob.state, error: packJob.error } : null,
        }
      : null,
    siblings: siblings.map((row) => ({
      id: row.revision.id,
      letter: row.revision.letter,
      state: row.revision.state,
    })),
    can: whatReaderMayDo(ctx, {
      revision,
      gates,
      shared,
      mustSettle,
      checkFinished: check.state === 'finished',
      hasPack: Boolean(release?.pack),
      packFailed: !release?.pack && packJob?.state === 'failed',
    }),
    version: revision.version,
  };
}

async function checkOf(tx: TenantTx, revision: RevisionRow): Promise<RevisionView['check']> {
  const run = await findCheckRun(tx, revision.workspaceId, revision.id);
  const job = run ? await findJob(tx, revision.workspaceId, run.jobId) : null;
  const report = run?.reportId ? await findHelpInReport(tx, revision.workspaceId, run.reportId) : null;
  const done = run?.state === 'finished';
  return {
    state: run?.state ?? 'queued',
    stage: done ? null : (job?.stage ?? null),
    progress: done ? 1 : (job?.progress ?? 0),
    verdict: run?.verdict ?? null,
    error: run?.error ?? null,
    finishedAt: run?.finishedAt?.toISOString() ?? null,
    engineVersion: report?.engineVersion ?? null,
    advice: (report?.advice ?? []).map(({ text, mends, costS, costG }) => ({ text, mends, costS, costG })),
    life: report?.life ?? null,
  };
}

async function shownOf(
  tx: TenantTx,
  ctx: WorkspaceContext,
  revision: RevisionRow,
  recipeDigest: string,
): Promise<Pick<RevisionView, 'model' | 'sheet'>> {
  const made = await derivativesOf(tx, revision.workspaceId, revision.meshId, recipeDigest);
  const of = (kind: string) => made.find((row) => row.kind === kind);
  const [model, sheet] = [of('model'), of('sheet')];
  return {
    model: model
      ? {
          url: fileUrl(ctx, revision.id, 'model'),
          pictureUrl: fileUrl(ctx, revision.id, 'picture'),
          meta: model.meta,
        }
      : null,
    sheet: sheet ? { url: fileUrl(ctx, revision.id, 'sheet'), meta: sheet.meta } : null,
  };
}
