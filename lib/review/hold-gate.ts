import type { TenantTx } from '@/db/tenant';
import type { WorkspaceContext } from '@/lib/auth/context';
import { AppError, conflict, forbidden, notFound } from '@/lib/errors/app-error';
import { composeContent, type Content } from './content';
import { firstNotes, openMustSettle } from './docket-data';
import { findGate, gatesOf, type GateRow } from './gate-data';
import { holdRole, type WorkspacePerson } from './people-data';
import { loadRevisionParts, lockRevision, type RevisionRow, type TemplateRow } from './revision-data';
import { signersOf } from './signers-of';
import { activeStandIns } from './stand-in-data';
import { asks, rightAt, type GateAt } from './who-signs';

export type HeldGate = {
  template: TemplateRow;
  revision: RevisionRow;
  gate: GateRow;
  role: string;
  /** Whom the person signs for here, being their stand-in. */
  standsFor: WorkspacePerson | null;
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
  const { role, at } = await holdSigners(tx, ctx, revision, gate);
  const standsFor = requireRight(ctx, revision, role, at);
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
  return { template, revision, gate, role, standsFor, content: now.content, digest: now.digest };
}

/** The gate with its people as they are until commit: nobody loses their role or their stand-in meanwhile. */
async function holdSigners(tx: TenantTx, ctx: WorkspaceContext, revision: RevisionRow, gate: GateRow) {
  const { workspaceId } = revision;
  const role = await holdRole(tx, workspaceId, ctx.person.id);
  const standIns = await activeStandIns(tx, workspaceId, { heldBy: ctx.person.id });
  for (const { personId, standInId } of standIns)
    if (standInId === ctx.person.id) await holdRole(tx, workspaceId, personId);
  const { mesh } = await loadRevisionParts(tx, revision);
  return { role: role ?? 'none', at: { ...(await signersOf(tx, revision, mesh, standIns)), gate } };
}

/** Whom the person stands for, null for nobody but themselves. Throws what keeps them from deciding. */
function requireRight(
  ctx: WorkspaceContext,
  revision: RevisionRow,
  role: string,
  at: GateAt,
): WorkspacePerson | null {
  const { rule } = at.gate;
  if (rule.kind !== 'people')
    throw conflict('automatic-gate', `${rule.name} is not signed by people: it passes by itself.`);
  const me = at.people.find(({ id }) => id === ctx.person.id);
  const awayId = at.standIns.find(({ standInId }) => standInId === ctx.person.id)?.personId;
  const away = at.people.find(
    (person) => person.id === awayId && person.role === role && asks(at.gate, person),
  );
  if (!me || (!asks(at.gate, me) && !away))
    throw forbidden(
      rule.people?.length
        ? `At ${rule.name} sign only those whom the gate plan names; you are not among them.`
        : `At ${rule.name} sign: ${rule.roles.join(', ')}. Your role here is ${role}.`,
      'role',
    );
  const made = (id: string) => (revision.authorId === id ? 'posted' : 'sent the mesh of');
  const fourEyes = (who: string) =>
    forbidden(
      `${who} revision ${revision.letter}; somebody else has to decide at ${rule.name}.`,
      'four-eyes',
    );
  if (rule.fourEyes && at.makers.includes(me.id)) throw fourEyes(`You ${made(me.id)}`);
  const right = rightAt(at, me);
  if (right) return right.standsFor;
  const decided = at.signed.filter(({ gateId }) => gateId === at.gate.id);
  if (decided.some(({ signerId }) => signerId === me.id))
    throw conflict('already-signed', `You have decided at ${rule.name} already; one name counts once.`);
  if (away && rule.fourEyes && at.makers.includes(away.id))
    throw fourEyes(`You stand in for ${away.name}, who ${made(away.id)}`);
  throw conflict(
    'already-signed',
    away && !asks(at.gate, me)
      ? `${away.name} has decided at ${rule.name} already; one name counts once.`
      : `Your stand-in has signed at ${rule.name} for you; one name counts once.`,
  );
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
