import type { TenantTx } from '@/db/tenant';
import type { WorkspaceContext } from '@/lib/auth/context';
import { AppError, conflict, forbidden, notFound } from '@/lib/errors/app-error';
import { composeContent, type Content } from './content';
import { firstNotes, openMustSettle } from './docket-data';
import { findGate, gatesOf, signaturesOf, type GateRow } from './gate-data';
import { holdRole } from './people-data';
import { loadRevisionParts, lockRevision, type RevisionRow, type TemplateRow } from './revision-data';
import { makersOf } from './who-signs';

export type HeldGate = {
  template: TemplateRow;
  revision: RevisionRow;
  gate: GateRow;
  role: string;
  content: Content;
  digest: string;
};

const shut: Record<string, string> = {
  waiting: 'This gate is not open yet: the one before it has not passed.',
  passed: 'This gate has passed already.',
  returned: 'This gate was returned already.',
  closed: 'This gate is closed.',
};

/**
 * Holds template, revision and gates, and finds that this person may decide at this gate now, on exactly the
 * content that they were shown. Otherwise throws not_found, forbidden or a conflict that says what stands in the way.
 */
export async function holdGate(
  tx: TenantTx,
  ctx: WorkspaceContext,
  gateId: string,
  shownDigest: string,
): Promise<HeldGate> {
  const workspaceId = ctx.workspace.id;
  const { revisionId } = await findGate(tx, workspaceId, gateId);
  const { template, revision } = await lockRevision(tx, workspaceId, revisionId);
  const gates = await gatesOf(tx, workspaceId, revisionId, { lock: true });
  const gate = gates.find((row) => row.id === gateId);
  if (!gate) throw notFound('gate');
  const role = await holdRole(tx, workspaceId, ctx.person.id);
  const { rule } = gate;
  if (rule.kind !== 'people')
    throw conflict('automatic-gate', `${rule.name} is not signed by people: it passes by itself.`);
  if (!role || !rule.roles.includes(role))
    throw forbidden(
      `At ${rule.name} sign: ${rule.roles.join(', ')}. Your role here is ${role ?? 'none'}.`,
      'role',
    );
  const { mesh } = await loadRevisionParts(tx, revision);
  if (rule.fourEyes && makersOf(revision, mesh).includes(ctx.person.id))
    throw forbidden(
      `You ${revision.authorId === ctx.person.id ? 'posted' : 'sent the mesh of'} revision ${revision.letter}; somebody else has to decide at ${rule.name}.`,
      'four-eyes',
    );
  const signed = await signaturesOf(tx, workspaceId, revisionId);
  if (signed.some((row) => row.gateId === gateId && row.signerId === ctx.person.id))
    throw conflict('already-signed', `You have decided at ${rule.name} already; one name counts once.`);
  if (revision.state !== 'in_review')
    throw conflict(
      'not-in-review',
      `Revision ${revision.letter} is ${revision.state.replaceAll('_', ' ')}; it is not in review any more.`,
    );
  if (gate.state !== 'open') throw conflict('gate-not-open', shut[gate.state]);
  const now = await composeContent(tx, revision);
  if (!now)
    throw conflict('check-not-finished', 'The check has not finished, so there is nothing to decide on yet.');
  if (now.digest !== shownDigest)
    throw conflict(
      'content-changed',
      'Something was added to this revision since you opened the page (a note, an answer, a waiver). Nothing was signed. Read what is new, then decide.',
    );
  return { template, revision, gate, role, content: now.content, digest: now.digest };
}

/** Items that must be settled keep a people's gate shut; they are named one by one. */
export async function requireSettled(tx: TenantTx, held: HeldGate): Promise<void> {
  const { workspaceId, id } = held.revision;
  const open = await openMustSettle(tx, workspaceId, id);
  if (!open.length) return;
  const words = new Map(
    (
      await firstNotes(
        tx,
        workspaceId,
        open.map((thread) => thread.continues[0] ?? thread.id),
      )
    ).map((note) => [note.threadId, `${note.authorName}: ${note.text.slice(0, 140)}`]),
  );
  throw new AppError(
    'conflict',
    `${held.gate.rule.name} stays shut: ${open.length === 1 ? 'one item' : `${open.length} items`} must be settled first.`,
    {
      reason: 'must-settle',
      errors: open.map((thread) => ({
        pointer: `/threads/${thread.id}`,
        detail: words.get(thread.continues[0] ?? thread.id) ?? thread.openedByName,
      })),
    },
  );
}
