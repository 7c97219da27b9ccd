import { withTenant } from '@/db/tenant';
import { appendEntry } from '@/lib/audit/append-entry';
import { digestOf } from '@/lib/audit/canonical';
import type { JobContext } from '@/lib/auth/context';
import { holdsJob, type Fence } from '@/lib/jobs/fence';
import { queueLive } from '@/lib/jobs/queue-live';
import type { Check, Report } from '@/lib/formability/report';
import { ENGINE_VERSION } from '@/lib/formability/version';
import { advanceGates } from './advance-gates';
import {
  changeCheckRun,
  derivativesOf,
  findCheckRun,
  findMesh,
  findReport,
  insertFindings,
  keepDerivative,
  keepReport,
  type DerivativeRow,
} from './check-data';
import { findRevision, loadRevisionParts, lockRevision } from './revision-data';
import { tellCheckEnded, tellCheckGivenUp } from './tell-check';

export type DerivativeKind = DerivativeRow['kind'];

export type CheckInput = {
  revisionId: string;
  templateId: string;
  mesh: { id: string; storeKey: string; sha256: string; bytes: number; fileName: string };
  /** The effective recipe, as frozen. */
  recipe: Record<string, unknown>;
  recipeDigest: string;
  checkRunId: string;
  state: 'queued' | 'running' | 'finished' | 'failed';
  /** The report that this engine version has given for the same bytes and recipe before. */
  knownReport: Record<string, unknown> | null;
  derivativesDone: DerivativeKind[];
};

/** What a worker needs to check a revision. Throws not_found for a revision that is not of the workspace. */
export async function loadCheckInput(ctx: JobContext, revisionId: string): Promise<CheckInput> {
  return withTenant(ctx, async (tx) => {
    const revision = await findRevision(tx, ctx.workspaceId, revisionId);
    const { mesh, recipe } = await loadRevisionParts(tx, revision);
    const run = await findCheckRun(tx, ctx.workspaceId, revisionId);
    if (!run) throw new Error('the revision has no check run');
    const known = await findReport(tx, ctx.workspaceId, {
      meshSha256: mesh.sha256,
      recipeDigest: recipe.digest,
      engineVersion: ENGINE_VERSION,
    });
    const made = await derivativesOf(tx, ctx.workspaceId, mesh.id, recipe.digest);
    return {
      revisionId,
      templateId: revision.templateId,
      mesh: {
        id: mesh.id,
        storeKey: mesh.storeKey,
        sha256: mesh.sha256,
        bytes: mesh.bytes,
        fileName: mesh.fileName,
      },
      recipe: recipe.body,
      recipeDigest: recipe.digest,
      checkRunId: run.id,
      state: run.state,
      knownReport: known?.body ?? null,
      derivativesDone: made.map((row) => row.kind),
    };
  });
}

/** Records what the page shows of a mesh; the first one of a kind stands. */
export async function recordDerivative(
  ctx: JobContext,
  fence: Fence,
  revisionId: string,
  meshId: string,
  kind: DerivativeKind,
  file: {
    storeKey: string;
    bytes: number;
    sha256: string;
    meta: Record<string, unknown>;
    recipeDigest?: string;
  },
): Promise<void> {
  await withTenant(ctx, async (tx) => {
    if (!(await holdsJob(tx, ctx, fence))) return;
    if (!(await findMesh(tx, ctx.workspaceId, meshId))) throw new Error('the mesh is not of this workspace');
    const revision = await findRevision(tx, ctx.workspaceId, revisionId);
    const made = await keepDerivative(tx, { workspaceId: ctx.workspaceId, meshId, kind, ...file });
    if (!made) return;
    await queueLive(tx, ctx, {
      name: 'revision.changed',
      data: { id: revisionId, templateId: revision.templateId },
    });
  });
}

/** The check run is at work. A run that has finished stays finished. */
export async function startCheck(ctx: JobContext, fence: Fence, revisionId: string): Promise<void> {
  await withTenant(ctx, async (tx) => {
    if (!(await holdsJob(tx, ctx, fence))) return;
    const { revision } = await lockRevision(tx, ctx.workspaceId, revisionId);
    const run = await findCheckRun(tx, ctx.workspaceId, revisionId);
    if (!run || run.state === 'finished' || run.state === 'running') return;
    await changeCheckRun(tx, run, { state: 'running', error: null });
    await queueLive(tx, ctx, {
      name: 'revision.changed',
      data: { id: revisionId, templateId: revision.templateId },
    });
  });
}

/** The worst status of a report's checks; checks that were not run say nothing. */
export function verdictOf(checks: Pick<Check, 'status'>[]): 'pass' | 'caution' | 'fail' {
  if (checks.some((check) => check.status === 'fail')) return 'fail';
  return checks.some((check) => check.status === 'caution') ? 'caution' : 'pass';
}

/**
 * Stores the report once, lists its findings, and lets the gates go on: the automatic gate passes when no
 * failing finding is open. Does nothing for a run that has finished, so that a repeated job is harmless.
 */
export async function finishCheck(
  ctx: JobContext,
  fence: Fence,
  revisionId: string,
  result: { report: Report; engineVersion: string },
): Promise<void> {
  await withTenant(ctx, async (tx) => {
    if (!(await holdsJob(tx, ctx, fence))) return;
    const { template, revision } = await lockRevision(tx, ctx.workspaceId, revisionId);
    const run = await findCheckRun(tx, ctx.workspaceId, revisionId);
    if (!run || run.state === 'finished') return;
    const { mesh, recipe } = await loadRevisionParts(tx, revision);
    if (result.report.input.sha256 !== mesh.sha256)
      throw new Error('the report speaks of other bytes than the revision has');
    const kept = await keepReport(tx, {
      workspaceId: ctx.workspaceId,
      meshSha256: mesh.sha256,
      recipeDigest: recipe.digest,
      engineVersion: result.engineVersion,
      body: result.report as unknown as Record<string, unknown>,
      sha256: digestOf(result.report),
    });
    const { checks } = kept.body as unknown as Report;
    await insertFindings(
      tx,
      checks.map((check, index) => ({
        workspaceId: ctx.workspaceId,
        revisionId,
        ordinal: index + 1,
        checkId: check.id,
        status: check.status,
        measured: check.measured,
        limit: check.limit,
        unit: check.unit,
        message: check.message,
        remedy: check.remedy,
        basis: check.basis,
        places: check.places,
      })),
    );
    const verdict = verdictOf(checks);
    await changeCheckRun(tx, run, {
      state: 'finished',
      verdict,
      reportId: kept.id,
      error: null,
      finished: true,
    });
    const inReview = revision.state === 'in_review';
    // Told of the check first, then of a gate that waits: mails go out in the order in which they are queued.
    if (inReview) await tellCheckEnded(tx, ctx, { template, revision });
    const passed = inReview ? await advanceGates(tx, ctx, template, revision) : [];
    await appendEntry(tx, ctx, {
      action: 'check.finished',
      subjectKind: 'revision',
      subjectId: revisionId,
      detail: {
        templateId: template.id,
        letter: revision.letter,
        verdict,
        failing: checks.filter((check) => check.status === 'fail').map((check) => check.id),
        reportSha256: kept.sha256,
        engineVersion: kept.engineVersion,
        gatesPassed: passed.map((gate) => gate.rule.name),
      },
    });
    await queueLive(
      tx,
      ctx,
      { name: 'revision.changed', data: { id: revisionId, templateId: template.id } },
      { name: 'docket.changed', data: { revisionId } },
      { name: 'template.changed', data: { id: template.id } },
    );
  });
}

/** The run ended without a report, e.g. after the last try. `reason` is a sentence for the page. */
export async function failCheck(
  ctx: JobContext,
  fence: Fence,
  revisionId: string,
  reason: string,
): Promise<void> {
  await withTenant(ctx, async (tx) => {
    if (!(await holdsJob(tx, ctx, fence))) return;
    const { template, revision } = await lockRevision(tx, ctx.workspaceId, revisionId);
    const run = await findCheckRun(tx, ctx.workspaceId, revisionId);
    if (!run || run.state === 'finished') return;
    if (revision.state === 'in_review')
      await tellCheckGivenUp(tx, ctx, { template, revision, jobId: run.jobId, reason: reason.slice(0, 500) });
    await changeCheckRun(tx, run, { state: 'failed', error: reason.slice(0, 500), finished: true });
    await appendEntry(tx, ctx, {
      action: 'check.failed',
      subjectKind: 'revision',
      subjectId: revisionId,
      detail: { templateId: revision.templateId, letter: revision.letter, reason: reason.slice(0, 500) },
    });
    await queueLive(tx, ctx, {
      name: 'revision.changed',
      data: { id: revisionId, templateId: revision.templateId },
    });
  });
}
