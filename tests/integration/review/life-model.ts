import type { Role } from '@/lib/workspaces/roles';

/** The life of a revision, written down a second time, without the product's code. */
export type State =
  'in_review' | 'returned' | 'withdrawn' | 'approved' | 'released' | 'superseded' | 'recalled' | 'retired';

export type People = 'studio' | 'client';

export type ModelRevision = {
  id: string;
  author: Role;
  state: State;
  check: 'running' | 'sound' | 'failing';
  waived: boolean;
  signed: { gate: People; by: Role }[];
  returned: { gate: People; by: Role } | null;
  locked: boolean;
  /** Open items that must be settled before anybody signs. */
  mustSettle: number;
  /** Items that stand in the docket that was locked. */
  items: number;
};

export type Model = { revisions: ModelRevision[]; done: number; refused: number };

/** A refusal: the error's code, and its reason where the case has one. */
export type Refusal = { code: 'forbidden' | 'conflict'; reason?: string };

const conflict = (reason: string): Refusal => ({ code: 'conflict', reason });
const forbidden = (reason?: string): Refusal => ({ code: 'forbidden', ...(reason ? { reason } : {}) });

const makers: Role[] = ['designer', 'lead'];
const signers: Record<People, Role[]> = { studio: ['designer', 'lead'], client: ['approver'] };
const production: Role[] = ['producer', 'lead'];

export const latest = (model: Model): ModelRevision | undefined =>
  model.revisions[model.revisions.length - 1];

/** The gate of people that is open, or null: studio after a check that holds, client after the studio. */
export function openGate({ state, check, waived, signed }: ModelRevision): People | null {
  if (state !== 'in_review' || check === 'running' || (check === 'failing' && !waived)) return null;
  const passed = (gate: People) => signed.some((one) => one.gate === gate);
  return passed('studio') ? (passed('client') ? null : 'client') : 'studio';
}

export const mayPost = (by: Role): Refusal | null => (makers.includes(by) ? null : forbidden());

/** @param seen whether the signer sends the digest of what stands now */
export function maySign(revision: ModelRevision, gate: People, by: Role, seen: boolean): Refusal | null {
  const refused = mayDecide(revision, gate, by, seen);
  if (refused) return refused;
  return revision.mustSettle > 0 ? conflict('must-settle') : null;
}

export function mayDecide(revision: ModelRevision, gate: People, by: Role, seen: boolean): Refusal | null {
  if (!['designer', 'lead', 'approver'].includes(by)) return forbidden();
  if (!signers[gate].includes(by)) return forbidden('role');
  if (revision.author === by) return forbidden('four-eyes');
  const decisions = [...revision.signed, ...(revision.returned ? [revision.returned] : [])];
  if (decisions.some((one) => one.gate === gate && one.by === by)) return conflict('already-signed');
  if (revision.state !== 'in_review') return conflict('not-in-review');
  if (openGate(revision) !== gate) return conflict('gate-not-open');
  return seen ? null : conflict('content-changed');
}

export function mayWithdraw(revision: ModelRevision, by: Role): Refusal | null {
  if (!makers.includes(by)) return forbidden();
  if (revision.author !== by) return forbidden('not-the-author');
  if (revision.state !== 'in_review') return conflict('not-in-review');
  return revision.signed.length > 0 ? conflict('already-signed') : null;
}

export function mayWaive(revision: ModelRevision, by: Role): Refusal | null {
  if (by !== 'lead') return forbidden();
  if (revision.state !== 'in_review') return conflict('not-in-review');
  return revision.waived ? conflict('already-waived') : null;
}

export function mayRelease(revision: ModelRevision, by: Role): Refusal | null {
  if (!production.includes(by)) return forbidden();
  return revision.state === 'approved' ? null : conflict('not-approved');
}

export function mayEnd(revision: ModelRevision, by: Role): Refusal | null {
  if (!production.includes(by)) return forbidden();
  return revision.state === 'released' ? null : conflict('not-released');
}

export function mayRaise(model: Model, revision: ModelRevision): Refusal | null {
  const open = revision.locked || revision.state === 'in_review' || latest(model) === revision;
  return open ? null : conflict('not-current');
}

/** The client's signature is the last one: the revision is locked, and older agreed ones are superseded. */
export function takeSignature(model: Model, revision: ModelRevision, gate: People, by: Role): void {
  revision.signed.push({ gate, by });
  if (gate !== 'client') return;
  revision.state = 'approved';
  revision.locked = true;
  for (const older of model.revisions.slice(0, model.revisions.indexOf(revision)))
    if (older.state === 'approved' || older.state === 'released') older.state = 'superseded';
}

export function takeReturn(revision: ModelRevision, gate: People, by: Role): void {
  revision.returned = { gate, by };
  revision.state = 'returned';
}

/** One revision is in review at a time: the newer takes the place of the older, with its open items. */
export function takePosted(model: Model, id: string, author: Role): void {
  const before = latest(model);
  if (before?.state === 'in_review') before.state = 'withdrawn';
  model.revisions.push({
    id,
    author,
    state: 'in_review',
    check: 'running',
    waived: false,
    signed: [],
    returned: null,
    locked: false,
    mustSettle: before?.mustSettle ?? 0,
    items: before?.mustSettle ?? 0,
  });
}
