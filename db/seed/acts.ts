import { randomUUID } from 'node:crypto';
import { setTimeout as pause } from 'node:timers/promises';
import type { WorkspaceContext } from '@/lib/auth/context';
import { replyToThread } from '@/lib/review/reply-to-thread';
import { completeUpload } from '@/lib/review/complete-upload';
import { createTemplate } from '@/lib/review/create-template';
import { markPartDone } from '@/lib/review/mark-part-done';
import { openDraft } from '@/lib/review/open-draft';
import { openThread } from '@/lib/review/open-thread';
import { postRevision } from '@/lib/review/post-revision';
import { presignParts } from '@/lib/review/presign-parts';
import { saveDraft } from '@/lib/review/save-draft';
import { signGate } from '@/lib/review/sign-gate';
import { startUpload } from '@/lib/review/start-upload';
import { viewContent } from '@/lib/review/view-content';
import { viewDocket } from '@/lib/review/view-docket';
import { viewRevision } from '@/lib/review/view-revision';
import { waiveFinding } from '@/lib/review/waive-finding';
import { viewUpload } from '@/lib/review/view-upload';
import type { PinInput, RevisionView } from '@/lib/review/schemas';

/** What people do in the demo, by the same verbs that the pages call. The worker does its part meanwhile. */

const patienceMs = 180_000;

async function until<T>(what: string, look: () => Promise<T | null>): Promise<T> {
  const end = Date.now() + patienceMs;
  for (;;) {
    const seen = await look();
    if (seen !== null) return seen;
    if (Date.now() > end) throw new Error(`${what} did not come about within ${patienceMs / 1000} s`);
    await pause(250);
  }
}

export async function newTemplate(
  ctx: WorkspaceContext,
  title: string,
  dueInDays: number | null,
): Promise<string> {
  const due =
    dueInDays === null ? null : new Date(Date.now() + dueInDays * 86_400_000).toISOString().slice(0, 10);
  return (await createTemplate(ctx, { title, dueOn: due })).id;
}

/** Sends the bytes to the store as a browser does, waits until they were read, and posts the revision. */
export async function post(
  ctx: WorkspaceContext,
  templateId: string,
  given: { file: string; bytes: Uint8Array; note: string; recipe?: Record<string, Record<string, unknown>> },
): Promise<string> {
  const upload = await startUpload(ctx, templateId, {
    fileName: given.file,
    bytes: given.bytes.length,
    unit: 'mm',
  });
  for (let number = 1; number <= upload.partCount; number++) {
    const { parts } = await presignParts(ctx, upload.id, { parts: [number] });
    const from = (number - 1) * upload.partBytes;
    const body = Buffer.from(given.bytes.subarray(from, from + parts[0].bytes));
    const answer = await fetch(parts[0].url, { method: 'PUT', body });
    const etag = answer.headers.get('etag');
    if (!answer.ok || !etag)
      throw new Error(`the store answered ${answer.status} to part ${number} of ${given.file}`);
    await markPartDone(ctx, upload.id, { number, etag });
  }
  await completeUpload(ctx, upload.id);
  await until(`reading ${given.file}`, async () => {
    const { state, refusal } = await viewUpload(ctx, upload.id);
    if (state === 'refused') throw new Error(`${given.file} was refused: ${refusal?.message}`);
    return state === 'ready' ? true : null;
  });
  const draft = await openDraft(ctx, templateId);
  const recipe = { ...draft.recipe } as Record<string, Record<string, unknown>>;
  for (const [section, fields] of Object.entries(given.recipe ?? {}))
    recipe[section] = { ...recipe[section], ...fields };
  const saved = await saveDraft(ctx, templateId, {
    uploadId: upload.id,
    recipe,
    note: given.note,
    version: draft.version,
  });
  const { revisionId } = await postRevision(ctx, templateId, { version: saved.version });
  await until(`the check run of ${given.file}`, async () => {
    const { check } = await viewRevision(ctx, revisionId);
    if (check.state === 'failed') throw new Error(`the check run of ${given.file} failed: ${check.error}`);
    return check.state === 'finished' ? true : null;
  });
  return revisionId;
}

type Inline = { text: string; mention?: { id: string; name: string } };

/** A one-paragraph note; a part with `mention` names a person of the workspace. */
export function paragraph(...parts: (string | Inline)[]): Record<string, unknown> {
  const content = parts.map((part) => {
    if (typeof part === 'string') return { type: 'text', text: part };
    if (part.mention) return { type: 'mention', attrs: { id: part.mention.id, label: part.mention.name } };
    return { type: 'text', text: part.text };
  });
  return { type: 'doc', content: [{ type: 'paragraph', content }] };
}

export async function raise(
  ctx: WorkspaceContext,
  revisionId: string,
  body: Record<string, unknown>,
  about: { findingId?: string; pin?: PinInput; mustSettle?: boolean } = {},
): Promise<string> {
  const { findingId = null, pin = null, mustSettle = false } = about;
  const thread = await openThread(ctx, revisionId, {
    clientKey: randomUUID(),
    body,
    findingId,
    pin,
    mustSettle,
  });
  return thread.id;
}

export async function reply(
  ctx: WorkspaceContext,
  threadId: string,
  body: Record<string, unknown>,
): Promise<void> {
  await replyToThread(ctx, threadId, { clientKey: randomUUID(), body });
}

/** Lets what fails on a revision stand, with a reason; nothing where nothing fails. The context is a lead's. */
export async function waiveFailing(ctx: WorkspaceContext, revisionId: string, reason: string): Promise<void> {
  const { findings } = await viewDocket(ctx, revisionId);
  for (const { id, status } of findings) if (status === 'fail') await waiveFinding(ctx, id, { reason });
}

/** Signs the open gate of a revision, after reading what is signed. */
export async function sign(
  ctx: WorkspaceContext,
  revisionId: string,
  password: string,
): Promise<RevisionView> {
  const view = await viewRevision(ctx, revisionId);
  const gate = view.can.sign;
  if (!gate) throw new Error(`${ctx.person.name} has nothing to sign on revision ${view.letter}`);
  const { digest } = await viewContent(ctx, revisionId);
  await signGate(ctx, gate.gateId, { digest, password });
  return viewRevision(ctx, revisionId);
}
