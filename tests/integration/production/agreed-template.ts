import { vi } from 'vitest';
import { tartTray } from '@/db/seed/templates';
import type { WorkspaceContext } from '@/lib/auth/context';
import { completeUpload } from '@/lib/review/complete-upload';
import { createTemplate } from '@/lib/review/create-template';
import { markPartDone } from '@/lib/review/mark-part-done';
import { openDraft } from '@/lib/review/open-draft';
import { postRevision } from '@/lib/review/post-revision';
import { presignParts } from '@/lib/review/presign-parts';
import { saveDraft } from '@/lib/review/save-draft';
import { signGate } from '@/lib/review/sign-gate';
import { startUpload } from '@/lib/review/start-upload';
import { viewDocket } from '@/lib/review/view-docket';
import { waiveFinding } from '@/lib/review/waive-finding';
import { viewContent } from '@/lib/review/view-content';
import { viewRevision } from '@/lib/review/view-revision';
import { viewUpload } from '@/lib/review/view-upload';
import type { FreshDatabase } from '@/tests/support/database';
import { testPassword, type House } from '@/tests/support/make-house';

export type File = { fileName: string; bytes: Uint8Array };
export type Posted = File & { templateId: string; uploadId: string; revisionId: string };

/** Sends a file to the store as a browser does, and has it read. */
export async function sendFile(
  ctx: WorkspaceContext,
  templateId: string,
  { fileName, bytes }: File,
): Promise<string> {
  const upload = await startUpload(ctx, templateId, { fileName, bytes: bytes.length, unit: 'mm' });
  const numbers = Array.from({ length: upload.partCount }, (_, index) => index + 1);
  const { parts } = await presignParts(ctx, upload.id, { parts: numbers });
  for (const { number, url, bytes: length } of parts) {
    const from = (number - 1) * upload.partBytes;
    const answer = await fetch(url, {
      method: 'PUT',
      body: Buffer.from(bytes.subarray(from, from + length)),
    });
    if (!answer.ok) throw new Error(`the store answered ${answer.status}: ${await answer.text()}`);
    await markPartDone(ctx, upload.id, { number, etag: answer.headers.get('etag') });
  }
  await completeUpload(ctx, upload.id);
  return upload.id;
}

/** Waits until the newest job about a subject is settled; a worker must be running somewhere. */
export async function settledJob(database: FreshDatabase, subjectId: string, timeout = 60_000) {
  return vi.waitFor(
    async () => {
      const { rows } = await database.query<{
        id: string;
        state: string;
        attempt: number;
        error: string | null;
      }>(
        'select id, state, attempt, error from jobs where subject_id = $1 order by created_at desc limit 1',
        [subjectId],
      );
      if (!['done', 'failed', 'cancelled'].includes(rows[0]?.state))
        throw new Error(`the job stands at ${JSON.stringify(rows[0])}`);
      return rows[0];
    },
    { timeout, interval: 50 },
  );
}

/** A file that was sent and read. */
export async function readyUpload(database: FreshDatabase, house: House, file: File) {
  const designer = await house.enter('designer');
  const { id: templateId } = await createTemplate(designer, { title: 'Tart tray, six cup', dueOn: null });
  const uploadId = await sendFile(designer, templateId, file);
  await settledJob(database, uploadId);
  return { templateId, uploadId, upload: await viewUpload(designer, uploadId) };
}

/** Posts a read file; the check run is queued, and not waited for. `beforePost` runs once the file is read. */
export async function postFile(
  database: FreshDatabase,
  house: House,
  file: File,
  beforePost: () => void = () => undefined,
): Promise<Posted> {
  const { templateId, uploadId, upload } = await readyUpload(database, house, file);
  if (upload.state !== 'ready') throw new Error(`the file was refused: ${upload.refusal?.message}`);
  const designer = await house.enter('designer');
  const draft = await openDraft(designer, templateId);
  const { version } = await saveDraft(designer, templateId, {
    uploadId,
    // A coarse sheet: these tests are about the run, not its figures.
    recipe: { ...draft.recipe, grid: { sheetNodes: 32 } },
    note: 'Ready to agree.',
    version: draft.version,
  });
  beforePost();
  const { revisionId } = await postRevision(designer, templateId, { version });
  return { ...file, templateId, uploadId, revisionId };
}

/** Signs the open gate, after reading what is signed. */
export async function sign(ctx: WorkspaceContext, revisionId: string): Promise<void> {
  const { can } = await viewRevision(ctx, revisionId);
  if (!can.sign) throw new Error(`${ctx.person.name} has nothing to sign`);
  const { digest } = await viewContent(ctx, revisionId);
  await signGate(ctx, can.sign.gateId, { digest, password: testPassword });
}

/** A drafted tray that was posted, checked by a running worker, and signed by studio and client. */
export async function approvedTemplate(
  database: FreshDatabase,
  house: House,
  fileName = 'tart tray.stl',
): Promise<Posted> {
  const bytes = await tartTray({ draftDeg: 8, ventMm: 1 });
  const posted = await postFile(database, house, { fileName, bytes });
  await settledJob(database, posted.revisionId);
  await sign(await house.enter('lead'), posted.revisionId);
  await sign(await house.enter('approver'), posted.revisionId);
  return posted;
}

/** A lead lets every failing finding stand. */
export async function waiveFailing(lead: WorkspaceContext, revisionId: string): Promise<void> {
  const { findings } = await viewDocket(lead, revisionId);
  for (const { id, status } of findings)
    if (status === 'fail')
      await waiveFinding(lead, id, { reason: 'The client wants it so; polished by hand.' });
}
