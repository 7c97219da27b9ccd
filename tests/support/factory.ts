import { createHash, randomUUID } from 'node:crypto';
import { withTenant } from '@/db/tenant';
import { jobContext, type JobContext, type WorkspaceContext } from '@/lib/auth/context';
import { analyse } from '@/lib/formability/analyse';
import type { EffectiveRecipe } from '@/lib/formability/recipe';
import type { CheckId, CheckStatus, Report } from '@/lib/formability/report';
import type { Fence } from '@/lib/jobs/fence';
import { claimJob, latestJobOf, markDone, type JobKind } from '@/lib/jobs/jobs-data';
import { completeUpload } from '@/lib/review/complete-upload';
import { createTemplate } from '@/lib/review/create-template';
import { markPartDone } from '@/lib/review/mark-part-done';
import { openDraft } from '@/lib/review/open-draft';
import { openThread } from '@/lib/review/open-thread';
import { postRevision } from '@/lib/review/post-revision';
import { presignParts } from '@/lib/review/presign-parts';
import { finishCheck, loadCheckInput, startCheck } from '@/lib/review/record-check';
import { acceptUpload } from '@/lib/review/record-upload';
import { saveDraft } from '@/lib/review/save-draft';
import { signGate } from '@/lib/review/sign-gate';
import { startUpload } from '@/lib/review/start-upload';
import { viewContent } from '@/lib/review/view-content';
import { viewRevision } from '@/lib/review/view-revision';
import type { FreshDatabase } from './database';
import { testPassword, type House } from './make-house';

/** A drafted block, 60 mm at the bed and 20 mm high, as binary STL; `seed` tells files apart in the header. */
export function blockStl(seed = 0): Uint8Array {
  const [b, t, h] = [30, 24, 20];
  const corners = [
    [-b, -b, 0],
    [b, -b, 0],
    [b, b, 0],
    [-b, b, 0],
    [-t, -t, h],
    [t, -t, h],
    [t, t, h],
    [-t, t, h],
  ];
  const quads = [
    [3, 2, 1, 0],
    [4, 5, 6, 7],
    [0, 1, 5, 4],
    [1, 2, 6, 5],
    [2, 3, 7, 6],
    [3, 0, 4, 7],
  ];
  const facets = quads.flatMap(([p, q, r, s]) => [
    [p, q, r],
    [p, r, s],
  ]);
  const bytes = new Uint8Array(84 + facets.length * 50);
  const view = new DataView(bytes.buffer);
  view.setUint32(0, seed, true);
  view.setUint32(80, facets.length, true);
  facets.forEach((facet, i) =>
    facet.forEach((corner, k) =>
      corners[corner].forEach((value, axis) =>
        view.setFloat32(84 + i * 50 + 12 + k * 12 + axis * 4, value, true),
      ),
    ),
  );
  return bytes;
}

let seeds = 0;
const nextSeed = () => ++seeds;
const sha256 = (bytes: Uint8Array) => createHash('sha256').update(bytes).digest('hex');

/** A note of one paragraph. */
export const note = (text: string, mention?: { id: string; name: string }) => ({
  clientKey: randomUUID(),
  body: {
    type: 'doc',
    content: [
      {
        type: 'paragraph',
        content: [
          { type: 'text', text },
          ...(mention ? [{ type: 'mention', attrs: { id: mention.id, label: mention.name } }] : []),
        ],
      },
    ],
  },
});

/** Takes the newest job about a subject, as a worker would; its context and fence. */
export async function takeJob(
  workspaceId: string,
  kind: JobKind,
  subjectId: string,
): Promise<{ ctx: JobContext; fence: Fence }> {
  const ctx = jobContext(workspaceId);
  const fence = await withTenant(ctx, async (tx) => {
    const job = await latestJobOf(tx, { workspaceId, kind, subjectId });
    const taken = job ? await claimJob(tx, { workspaceId, jobId: job.id, worker: 'test' }) : null;
    if (!taken) throw new Error(`there is no ${kind} job to take for ${subjectId}`);
    return { jobId: taken.id, attempt: taken.attempt };
  });
  return { ctx, fence };
}

/** Sends a small file to the store and records it as read; the id of the upload. */
export async function sendMesh(ctx: WorkspaceContext, templateId: string): Promise<string> {
  const bytes = blockStl(nextSeed());
  const upload = await startUpload(ctx, templateId, {
    fileName: 'block.stl',
    bytes: bytes.length,
    unit: 'mm',
  });
  const { parts } = await presignParts(ctx, upload.id, { parts: [1] });
  const sent = await fetch(parts[0].url, { method: 'PUT', body: Buffer.from(bytes) });
  if (!sent.ok) throw new Error(`the store answered ${sent.status}: ${await sent.text()}`);
  await markPartDone(ctx, upload.id, { number: 1, etag: sent.headers.get('etag') });
  await completeUpload(ctx, upload.id);
  const job = await takeJob(ctx.workspace.id, 'read-upload', upload.id);
  await acceptUpload(job.ctx, job.fence, upload.id, {
    sha256: sha256(bytes),
    bytes: bytes.length,
    format: 'stl-binary',
    unit: 'mm',
    triangles: 12,
    boundsMm: { min: [-30, -30, 0], max: [30, 30, 20] },
  });
  await withTenant(job.ctx, (tx) => markDone(tx, { workspaceId: ctx.workspace.id, ...job.fence }));
  return upload.id;
}

export type Statuses = Partial<Record<CheckId, CheckStatus>>;

let blockReport: Report | undefined;

/** The engine's report on the block (on a coarse grid), with these statuses for its checks and `pass` for the others. */
export function reportOn(
  input: { sha256: string; recipe: Record<string, unknown> },
  statuses: Statuses,
): Report {
  blockReport ??= analyse(blockStl(), { grid: { cellMm: 1.5, sheetNodes: 16 } }).report;
  const checks = blockReport.checks.map((check) => ({
    ...check,
    status: statuses[check.id] ?? 'pass',
    remedy: statuses[check.id] === 'fail' ? check.remedy || 'Change it.' : '',
  }));
  const recipe = input.recipe as unknown as EffectiveRecipe;
  return { ...blockReport, recipe, input: { ...blockReport.input, sha256: input.sha256 }, checks };
}

/** Does what the worker does with a posted revision, without its pictures. */
export async function runCheck(
  workspaceId: string,
  revisionId: string,
  statuses: Statuses = {},
): Promise<void> {
  const { ctx, fence } = await takeJob(workspaceId, 'check-revision', revisionId);
  await startCheck(ctx, fence, revisionId);
  const input = await loadCheckInput(ctx, revisionId);
  const report = reportOn({ sha256: input.mesh.sha256, recipe: input.recipe }, statuses);
  await finishCheck(ctx, fence, revisionId, { report, engineVersion: report.engine });
  await withTenant(ctx, (tx) => markDone(tx, { workspaceId, ...fence }));
}

export type Posted = { templateId: string; revisionId: string; letter: string };

/** A template with a number of its own. */
export async function newTemplate(ctx: WorkspaceContext, title = 'Test tray'): Promise<string> {
  return (await createTemplate(ctx, { title, dueOn: null })).id;
}

/** A draft with a mesh that was read, ready to be posted at the version that is returned. */
export async function readyDraft(ctx: WorkspaceContext, templateId: string): Promise<number> {
  const uploadId = await sendMesh(ctx, templateId);
  const { recipe, version } = await openDraft(ctx, templateId);
  return (await saveDraft(ctx, templateId, { uploadId, recipe, note: 'Please look.', version })).version;
}

/** Posts the next revision of a template, by the designer unless another context is given. */
export async function post(ctx: WorkspaceContext, templateId?: string): Promise<Posted> {
  const id = templateId ?? (await newTemplate(ctx));
  const version = await readyDraft(ctx, id);
  return { templateId: id, ...(await postRevision(ctx, id, { version })) };
}

/** Posts a revision and has it checked: it stands before the people's gates, or fails where `statuses` says so. */
export async function postChecked(
  house: House,
  options: { templateId?: string; statuses?: Statuses } = {},
): Promise<Posted> {
  const posted = await post(await house.enter('designer'), options.templateId);
  await runCheck(house.workspace.id, posted.revisionId, options.statuses);
  return posted;
}

/** What a signer sends: the digest that the page shows now. */
export async function shown(ctx: WorkspaceContext, revisionId: string) {
  const { digest } = await viewContent(ctx, revisionId);
  return { digest, password: testPassword };
}

/** The gate of a revision with this key, as its page shows it. */
export async function gateOf(ctx: WorkspaceContext, revisionId: string, key: string) {
  const gate = (await viewRevision(ctx, revisionId)).gates.find((row) => row.key === key);
  if (!gate) throw new Error(`the revision has no gate ${key}`);
  return gate;
}

/** Signs the gate that waits for this person. */
export async function sign(ctx: WorkspaceContext, revisionId: string) {
  const { can } = await viewRevision(ctx, revisionId);
  if (!can.sign) throw new Error(`${ctx.person.name} has nothing to sign`);
  return signGate(ctx, can.sign.gateId, await shown(ctx, revisionId));
}

/** A revision that studio and client have signed: approved and locked. */
export async function approved(house: House, templateId?: string): Promise<Posted> {
  const posted = await postChecked(house, { templateId });
  await sign(await house.enter('lead'), posted.revisionId);
  await sign(await house.enter('approver'), posted.revisionId);
  return posted;
}

/** Opens a thread and returns it. */
export async function raise(
  ctx: WorkspaceContext,
  revisionId: string,
  text: string,
  about: Record<string, unknown> = {},
) {
  return openThread(ctx, revisionId, { ...note(text), ...about });
}

/** The last entries of a workspace's chain, newest first, as a superuser sees them. */
export async function entries(database: FreshDatabase, workspaceId: string, limit = 10) {
  const { rows } = await database.query<{
    action: string;
    subject_id: string;
    detail: Record<string, unknown>;
  }>(
    'select action, subject_id, detail from audit_entries where workspace_id = $1 order by seq desc limit $2',
    [workspaceId, limit],
  );
  return rows;
}

/** The mails of one kind that wait in the outbox of a workspace: to whom. */
export async function mailsOf(database: FreshDatabase, workspaceId: string, template: string) {
  const { rows } = await database.query<{ person: string; payload: Record<string, unknown> }>(
    `select payload->'to'->>'personId' as person, payload from outbox
     where workspace_id = $1 and kind = 'mail' and payload->>'template' = $2 order by created_at, id`,
    [workspaceId, template],
  );
  return rows;
}

/** A number that changes with any row of the tenant's tables that a refused command might have touched. */
export async function fingerprint(database: FreshDatabase, workspaceId: string): Promise<string> {
  const tables = [
    'templates',
    'drafts',
    'uploads',
    'revisions',
    'check_runs',
    'threads',
    'placements',
    'notes',
    'waivers',
    'gate_plans',
    'stand_ins',
    'gates',
    'signatures',
    'locks',
    'jobs',
    'audit_entries',
    'outbox',
  ];
  const parts = tables.map(
    (table) =>
      `(select coalesce(md5(string_agg(t::text, ',' order by t::text)), '') from ${table} t where workspace_id = $1)`,
  );
  const { rows } = await database.query<{ sum: string }>(`select concat(${parts.join(', ')}) as sum`, [
    workspaceId,
  ]);
  return rows[0].sum;
}
