import type { TenantTx } from '@/db/tenant';
import { workspaceIdOf, type JobContext, type WorkspaceContext } from '@/lib/auth/context';
import { entryHash } from './chain';
import { insertEntry, lockHead } from './data';

export type AuditEvent = {
  /** `subject.verb` in the past tense, e.g. `revision.posted`. */
  action: string;
  subjectKind:
    | 'workspace'
    | 'person'
    | 'invitation'
    | 'template'
    | 'upload'
    | 'revision'
    | 'finding'
    | 'thread'
    | 'note'
    | 'gate'
    | 'release'
    | 'pack'
    | 'check-run'
    | 'gate-plan'
    | 'stand-in'
    | 'draft';
  subjectId: string;
  /** JSON only; what a reader needs to understand the entry in years: letters, names, digests, reasons. */
  detail: Record<string, unknown>;
};

/**
 * Adds one entry to the workspace's chain in the caller's transaction. The chain head is the last row
 * that a command locks (template → revision → gate → head), so writers queue and never fork it.
 */
export async function appendEntry(
  tx: TenantTx,
  ctx: WorkspaceContext | JobContext,
  event: AuditEvent,
): Promise<void> {
  const workspaceId = workspaceIdOf(ctx);
  const head = await lockHead(tx, workspaceId);
  const seq = head.seq + 1;
  const entry = {
    workspaceId,
    seq,
    at: head.now.toISOString(),
    actorId: ctx.kind === 'job' ? null : ctx.person.id,
    actorName: ctx.kind === 'job' ? 'Firstpull worker' : ctx.person.name,
    ...event,
  };
  const hash = entryHash(head.hash, entry);
  await insertEntry(tx, { ...entry, at: head.now, previous: head.hash, hash });
}
