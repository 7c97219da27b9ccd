import { withTenant, type TenantTx } from '@/db/tenant';
import { appendEntry } from '@/lib/audit/append-entry';
import { digestOf } from '@/lib/audit/canonical';
import { requirePermission, type WorkspaceContext } from '@/lib/auth/context';
import { conflict } from '@/lib/errors/app-error';
import { parseInput } from '@/lib/http/read-input';
import { enqueueJob } from '@/lib/jobs/enqueue-job';
import { queueLive } from '@/lib/jobs/queue-live';
import { advanceGates } from './advance-gates';
import { asId } from './as-id';
import { carryThreads } from './carry-threads';
import { changedMeanwhile } from './changed-meanwhile';
import { insertCheckRun } from './check-data';
import { closeRevision } from './close-revision';
import { deleteDraft, findDraft, type DraftRow } from './draft-data';
import { effectiveRecipe } from './effective-recipe';
import { insertGates, newestGatePlan } from './gate-data';
import { revisionLetter } from './letters';
import { movedLimits } from './library-data';
import { hasOwnUnit } from './mesh-format';
import { workspacePeople } from './people-data';
import {
  followRevisions,
  insertRecipe,
  insertRevision,
  latestRevision,
  lockTemplate,
  type MeshRow,
  type RevisionRow,
  type TemplateRow,
} from './revision-data';
import { mailAbout, tellToday } from './revision-mails';
import { PostRevisionInput } from './schemas';
import { tellWithdrawn } from './tell-withdrawn';
import { findUpload, meshOfUpload } from './upload-data';

/**
 * Posts the draft as the next lettered revision: mesh and recipe are frozen, the gates of the newest plan are
 * laid out, open items travel along, the check run is queued, and everybody is told; all or nothing.
 */
export async function postRevision(
  ctx: WorkspaceContext,
  templateId: string,
  input: unknown,
): Promise<{ revisionId: string; letter: string }> {
  requirePermission(ctx, 'revision.post');
  const { version } = parseInput(PostRevisionInput, input);
  const id = asId(templateId, 'template');
  const workspaceId = ctx.workspace.id;
  return withTenant(ctx, async (tx) => {
    const template = await lockTemplate(tx, workspaceId, id);
    const draft = await findDraft(tx, workspaceId, id, { lock: true });
    if (!draft)
      throw conflict(
        'no-draft',
        'There is no draft to post: it was posted or discarded already. Reload to see.',
      );
    if (draft.version !== version) throw changedMeanwhile('draft', draft.version);
    const mesh = await readyMesh(tx, draft);
    const plan = await newestGatePlan(tx, workspaceId);
    if (!plan) throw conflict('no-gate-plan', 'This workspace has no gate plan yet. Ask a lead to set one.');
    const limits = await movedLimits(tx, ctx.studio.id);
    const body = effectiveRecipe(draft.recipe, limits, mesh.unit, hasOwnUnit(mesh.format));
    const before = await latestRevision(tx, workspaceId, id);
    const ordinal = (before?.ordinal ?? 0) + 1;
    const letter = revisionLetter(ordinal - 1);
    // Two revisions in review would ask the same people twice. Signatures that the older one has stay to be seen.
    const replaced = before?.state === 'in_review' ? before : null;
    if (replaced) {
      const reason = `Replaced by ${letter}.`;
      await closeRevision(tx, ctx, replaced, 'withdrawn', reason);
      await tellWithdrawn(tx, ctx, { template, revision: replaced, reason }, ['client']);
    }

    const recipe = await insertRecipe(tx, {
      workspaceId,
      body: body as unknown as Record<string, unknown>,
      digest: digestOf(body),
      sheetMaterial: body.sheet.material,
      gaugeMm: String(body.sheet.gaugeMm),
      printMaterial: body.print.material,
      nozzleMm: String(body.print.nozzleMm),
      layerMm: String(body.print.layerMm),
    });
    const revision = await insertRevision(tx, {
      workspaceId,
      templateId: id,
      ordinal,
      letter,
      meshId: mesh.id,
      recipeId: recipe.id,
      gatePlanId: plan.id,
      note: draft.note,
      authorId: ctx.person.id,
      authorName: ctx.person.name,
    });
    await insertGates(
      tx,
      plan.gates.map((rule, index) => ({ workspaceId, revisionId: revision.id, ordinal: index + 1, rule })),
    );
    const carried = before ? await carryThreads(tx, before, revision) : 0;
    const jobId = await enqueueJob(tx, ctx, {
      kind: 'check-revision',
      subjectId: revision.id,
      inputDigest: digestOf({ meshSha256: mesh.sha256, recipeDigest: recipe.digest }),
    });
    await insertCheckRun(tx, { workspaceId, revisionId: revision.id, jobId });
    await advanceGates(tx, ctx, template, revision);
    await followRevisions(tx, template);
    await deleteDraft(tx, draft);
    await appendEntry(tx, ctx, {
      action: 'revision.posted',
      subjectKind: 'revision',
      subjectId: revision.id,
      detail: {
        templateId: id,
        number: template.number,
        letter,
        meshSha256: mesh.sha256,
        recipeDigest: recipe.digest,
        gatePlan: plan.number,
        carried,
        replaces: replaced?.letter ?? null,
      },
    });
    await tellPosted(tx, ctx, { template, revision, replaces: replaced?.letter ?? null });
    return { revisionId: revision.id, letter };
  });
}

const waits: Record<string, string> = {
  none: 'Choose a file first: the draft has none.',
  sending: 'The file is still being sent. Post when it is complete.',
  reading: 'The file is still being read. Post in a moment.',
  refused: 'The file was refused. Send another one.',
  cancelled: 'The file was cancelled. Send another one.',
};

async function readyMesh(tx: TenantTx, draft: DraftRow): Promise<MeshRow> {
  const upload = draft.uploadId ? await findUpload(tx, draft.workspaceId, draft.uploadId) : null;
  const mesh = upload?.state === 'ready' ? await meshOfUpload(tx, upload) : null;
  if (!mesh) throw conflict('file-not-ready', waits[upload?.state ?? 'none'] ?? waits.none);
  return mesh;
}

async function tellPosted(
  tx: TenantTx,
  ctx: WorkspaceContext,
  { template, revision, replaces }: { template: TemplateRow; revision: RevisionRow; replaces: string | null },
): Promise<void> {
  const people = await workspacePeople(tx, ctx.workspace.id);
  await mailAbout(
    tx,
    ctx,
    // The client's people are told when the check has ended and there is something to look at (tell-check.ts).
    people.filter((person) => person.side === 'studio'),
    { template, revision, occasion: `revision-posted:${revision.id}` },
    (base) => ({
      template: 'revision-posted',
      ...base,
      authorName: revision.authorName,
      note: revision.note,
      replaces,
    }),
  );
  await tellToday(tx, ctx, people, revision.id);
  await queueLive(
    tx,
    ctx,
    {
      name: 'revision.changed',
      data: { id: revision.id, templateId: template.id, version: revision.version },
    },
    { name: 'template.changed', data: { id: template.id } },
    { name: 'draft.changed', data: { id: revision.id, templateId: template.id } },
  );
}
