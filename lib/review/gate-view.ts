import type { GateRow, SignatureRow } from './gate-data';
import type { WorkspacePerson } from './people-data';
import type { GateView, SignatureView } from './schemas';
import { whoMaySign } from './who-signs';

export const signatureView = (row: SignatureRow): SignatureView => ({
  id: row.id,
  decision: row.decision,
  printedName: row.printedName,
  role: row.role,
  meaning: row.meaning,
  reason: row.reason,
  contentDigest: row.contentDigest,
  signedAt: row.signedAt.toISOString(),
  timeZone: row.timeZone,
});

/** The gate line: each gate with its names, and who is awaited at the open one. */
export function gateViews(
  gates: GateRow[],
  signatures: SignatureRow[],
  makers: string[],
  people: WorkspacePerson[],
): GateView[] {
  return gates.map((gate) => ({
    id: gate.id,
    ordinal: gate.ordinal,
    key: gate.rule.key,
    name: gate.rule.name,
    kind: gate.rule.kind,
    meaning: gate.rule.meaning,
    quorum: gate.rule.quorum,
    state: gate.state,
    openedAt: gate.openedAt?.toISOString() ?? null,
    passedAt: gate.passedAt?.toISOString() ?? null,
    signatures: signatures.filter((row) => row.gateId === gate.id).map(signatureView),
    awaited:
      gate.state === 'open' && gate.rule.kind === 'people'
        ? whoMaySign(gate, makers, people, signatures).map((person) => person.name)
        : [],
  }));
}
