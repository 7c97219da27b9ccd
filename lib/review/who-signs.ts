import type { GateRow, SignatureRow } from './gate-data';
import type { WorkspacePerson } from './people-data';

/** Those who may still sign a gate: the right role, not the author under four eyes, not signed already. */
export function whoMaySign(
  gate: Pick<GateRow, 'id' | 'rule'>,
  authorId: string,
  people: WorkspacePerson[],
  signed: Pick<SignatureRow, 'gateId' | 'signerId'>[],
): WorkspacePerson[] {
  const done = new Set(signed.filter((s) => s.gateId === gate.id).map((s) => s.signerId));
  return people.filter(
    (person) =>
      gate.rule.roles.includes(person.role) &&
      !(gate.rule.fourEyes && person.id === authorId) &&
      !done.has(person.id),
  );
}
