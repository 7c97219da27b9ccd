import type { GateRow, SignatureRow } from './gate-data';
import { waitsFor } from './gate-conditions';
import type { WorkspacePerson } from './people-data';
import type { GateView, SignatureView } from './schemas';
import { isShort, missingAt, quorumReached, rightAt, signedAt, type GateAt } from './who-signs';

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
  signedFor: row.signedForName,
});

/** What the gates of one revision share: its people, its makers and its signatures. */
export type GatesAt = Omit<GateAt, 'gate' | 'signed'> & { signed: SignatureRow[] };

/** The gate line: each gate with its names, and who is awaited at the open one. */
export function gateViews(gates: GateRow[], shared: GatesAt): GateView[] {
  return gates.map((gate) => {
    const at = { ...shared, gate };
    const { rule } = gate;
    const asking = gate.state === 'open' && rule.kind === 'people';
    const missing = asking ? missingAt(at) : [];
    const waits = waitsFor(rule);
    return {
      id: gate.id,
      ordinal: gate.ordinal,
      key: rule.key,
      name: rule.name,
      kind: rule.kind,
      meaning: rule.meaning,
      quorum: rule.quorum === 'all' ? signedAt(at) + missing.length : rule.quorum,
      everybody: rule.quorum === 'all',
      conditions: [
        ...(waits.checks ? ['checks-pass' as const] : []),
        ...(waits.docket ? ['docket-settled' as const] : []),
      ],
      dueOn: gate.dueOn,
      state: gate.state,
      openedAt: gate.openedAt?.toISOString() ?? null,
      passedAt: gate.passedAt?.toISOString() ?? null,
      signatures: shared.signed.filter((row) => row.gateId === gate.id).map(signatureView),
      awaited: missing.map((person) => nameAwaited(at, person)),
      short: asking && isShort(at),
      held: asking && quorumReached(at),
    };
  });
}

/** The name, and who signs while its bearer is away. */
function nameAwaited(at: GateAt, { id, name }: WorkspacePerson): string {
  const standIn = at.people.find((person) => rightAt(at, person)?.standsFor?.id === id);
  return standIn ? `${name} (away; ${standIn.name} signs for them)` : name;
}
