import { signingRoles } from '@/lib/workspaces/check-gate-plan';
import type { GateRow, SignatureRow } from './gate-data';
import type { WorkspacePerson } from './people-data';

/** Whom four eyes keep away: who posted the revision and who sent its mesh. */
export const makersOf = (revision: { authorId: string }, mesh: { createdBy: string }): string[] => [
  revision.authorId,
  mesh.createdBy,
];

/** Somebody is away today, and another signs for them. */
export type StandIn = { personId: string; standInId: string };

/** A gate with everything that decides who may sign it and whether it passes. */
export type GateAt = {
  gate: Pick<GateRow, 'id' | 'rule'>;
  makers: string[];
  people: WorkspacePerson[];
  standIns: StandIn[];
  /** Of the revision, whatever the gate. */
  signed: Pick<SignatureRow, 'gateId' | 'decision' | 'signerId' | 'signedForId'>[];
};

/** Whether a gate asks this person by their name, or else by their role; four eyes aside. */
export const asks = ({ rule }: GateAt['gate'], { id, role }: { id: string; role: string }): boolean =>
  rule.people?.length
    ? rule.people.includes(id) && (signingRoles as readonly string[]).includes(role)
    : rule.roles.includes(role);

const here = ({ gate, signed }: GateAt) => signed.filter((one) => one.gateId === gate.id);
const kept = ({ gate, makers }: GateAt, id: string) => gate.rule.fourEyes && makers.includes(id);

/** Whom the gate asks of those who belong to the workspace now. */
export const askedAt = (at: GateAt): WorkspacePerson[] =>
  at.people.filter((person) => asks(at.gate, person) && !kept(at, person.id));

/** Whom the gate asks and who has not answered, themselves or through their stand-in. */
export function missingAt(at: GateAt): WorkspacePerson[] {
  const answered = new Set(here(at).flatMap(({ signerId, signedForId }) => [signerId, signedForId]));
  return askedAt(at).filter(({ id }) => !answered.has(id));
}

/** How somebody may sign: in their own right, for somebody who is away, or both. */
export type Right = { own: boolean; standsFor: WorkspacePerson | null };

/**
 * How this person may sign now; null when they may not. A stand-in has the right of the person who is away, no more:
 * under four eyes an author has none to hand on, and a stand-in who is the author uses none. Who is asked anyway signs
 * in their own right alone, except where everybody's name is needed: there it stands for both.
 */
export function rightAt(at: GateAt, person: WorkspacePerson): Right | null {
  if (kept(at, person.id) || here(at).some(({ signerId }) => signerId === person.id)) return null;
  const missing = missingAt(at);
  const own = missing.some(({ id }) => id === person.id);
  const away = at.standIns.find(({ standInId }) => standInId === person.id);
  const other = missing.find(({ id, role }) => id === away?.personId && role === person.role) ?? null;
  const standsFor = own && at.gate.rule.quorum !== 'all' ? null : other;
  return own || standsFor ? { own, standsFor } : null;
}

/** Those who may sign a gate now, for themselves or for somebody else. */
export const whoMaySign = (at: GateAt): WorkspacePerson[] =>
  at.people.filter((person) => rightAt(at, person) !== null);

/** How many signatures the gate has. */
export const signedAt = (at: GateAt): number => here(at).filter(({ decision }) => decision === 'sign').length;

/** Whether the names that the plan asks for are there. Of those who left nothing is asked; what they signed stays. */
export function quorumReached(at: GateAt): boolean {
  const { quorum } = at.gate.rule;
  if (quorum === 'all') return signedAt(at) > 0 && missingAt(at).length === 0;
  return signedAt(at) >= quorum;
}

/** Whether the gate cannot pass as things stand: too few are left whom it asks. */
export function isShort(at: GateAt): boolean {
  const { quorum } = at.gate.rule;
  if (quorumReached(at)) return false;
  return signedAt(at) + missingAt(at).length < (quorum === 'all' ? 1 : quorum);
}
