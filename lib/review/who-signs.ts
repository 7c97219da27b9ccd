import type { GateRow, SignatureRow } from './gate-data';
import type { WorkspacePerson } from './people-data';

/** Whom four eyes keep away: who posted the revision and who sent its mesh. */
export const makersOf = (revision: { authorId: string }, mesh: { createdBy: string }): string[] => [
  revision.authorId,
  mesh.createdBy,
];

/** Those who may still sign a gate: the right role, none of the makers under four eyes, not signed already. */
export function whoMaySign(
  gate: Pick<GateRow, 'id' | 'rule'>,
  makers: string[],
  people: WorkspacePerson[],
  signed: Pick<SignatureRow, 'gateId' | 'signerId'>[],
): WorkspacePerson[] {
  const done = new Set(signed.filter((s) => s.gateId === gate.id).map((s) => s.signerId));
  return people.filter(
    (person) =>
      gate.rule.roles.includes(person.role) &&
      !(gate.rule.fourEyes && makers.includes(person.id)) &&
      !done.has(person.id),
  );
}
