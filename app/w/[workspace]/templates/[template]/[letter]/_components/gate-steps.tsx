import type { GateStep } from '@/app/_components/gate-line';
import { Time } from '@/app/_components/time';
import type { RevisionView } from '@/lib/review/schemas';

type Gate = RevisionView['gates'][number];
/** Failing findings that nobody waived, waived ones, and checks that were not run. */
export interface FindingCounts {
  failing: number;
  waived: number;
  notRun: number;
}

const count = (n: number, one: string, many: string) => (n === 1 ? `one ${one}` : `${n} ${many}`);

/** The gates as the line shows them, with the two steps that follow every plan: locked and released. */
export function gateSteps(revision: RevisionView, findings: FindingCounts, mustSettle: number): GateStep[] {
  const steps = revision.gates.map((gate) => stepOf(gate, revision, findings, mustSettle));
  return [...steps, lockedStep(revision), releasedStep(revision)];
}

function stepOf(gate: Gate, revision: RevisionView, findings: FindingCounts, mustSettle: number): GateStep {
  const signatures = gate.signatures.map((signature) => ({
    name: signature.printedName,
    role: signature.signedFor ? `${signature.role}, for ${signature.signedFor}` : signature.role,
    at: signature.signedAt,
    words: signature.decision === 'return' ? (signature.reason ?? signature.meaning) : signature.meaning,
  }));
  const base = { id: gate.id, name: gate.name, signatures };
  if (gate.state === 'passed') {
    return {
      ...base,
      state: 'passed',
      line: gate.kind === 'automatic' ? passedLine(gate, findings) : undefined,
    };
  }
  if (gate.state === 'returned') return { ...base, state: 'returned' };
  if (gate.state === 'closed') return { ...base, state: 'ahead', line: 'closed with the revision' };
  if (gate.state === 'waiting') return { ...base, state: 'ahead', line: aheadLine(gate) };
  if (gate.kind === 'automatic') {
    const line =
      gate.conditions?.includes('checks-pass') === false
        ? settleLine(mustSettle)
        : formingLine(revision, findings, mustSettle);
    return { ...base, state: 'open', line };
  }
  return {
    ...base,
    state: 'open',
    line: gate.short
      ? 'too few are left who may sign: ask a lead to invite somebody'
      : mustSettle > 0
        ? `${count(mustSettle, 'item', 'items')} to settle first`
        : gate.held
          ? 'something was added since the last signature, and all who are left have signed: ask a lead to invite somebody, or post the next revision'
          : undefined,
    awaited: {
      names: gate.awaited,
      since: gate.openedAt ?? undefined,
      // The plan's day for this gate, or else the template's.
      due: gate.dueOn ?? revision.template.dueOn ?? undefined,
      have: gate.signatures.filter((signature) => signature.decision === 'sign').length,
      needed: gate.quorum,
      everybody: gate.everybody,
    },
  };
}

/** The rule by which it opened, not a promise that the template forms. */
function passedLine(gate: Gate, { waived, notRun }: FindingCounts): GateStep['line'] {
  if (gate.conditions?.includes('checks-pass') === false)
    return <>nothing left to settle, {gate.passedAt ? <Time at={gate.passedAt} show="moment" /> : null}</>;
  return (
    <>
      no failing finding open, {gate.passedAt ? <Time at={gate.passedAt} show="moment" /> : null}
      {waived > 0 ? <span className="text-ink">, {count(waived, 'finding', 'findings')} waived</span> : null}
      {notRun > 0 ? (
        <span className="text-ink">, {count(notRun, 'check was', 'checks were')} not run</span>
      ) : null}
    </>
  );
}

function formingLine(
  { check }: RevisionView,
  { failing }: FindingCounts,
  mustSettle: number,
): GateStep['line'] {
  if (check.state === 'queued') return 'waits for the check';
  if (check.state === 'running') return 'being checked';
  if (check.state === 'failed') return 'the check did not finish';
  if (failing > 0) return `${count(failing, 'finding', 'findings')} to mend or to waive`;
  return settleLine(mustSettle);
}

const settleLine = (mustSettle: number) =>
  mustSettle > 0 ? `${count(mustSettle, 'item', 'items')} to settle first` : 'about to pass';

function aheadLine(gate: Gate): string {
  if (gate.kind === 'automatic')
    return gate.conditions?.includes('checks-pass') === false ? 'by the docket' : 'by the check';
  if (gate.everybody) return 'everybody signs';
  return gate.quorum > 1 ? `${gate.quorum} signatures` : 'one signature';
}

function lockedStep({ lockedAt }: RevisionView): GateStep {
  return {
    id: 'locked',
    name: 'Locked',
    state: lockedAt ? 'passed' : 'ahead',
    line: lockedAt ? (
      <>
        to these bytes, <Time at={lockedAt} show="moment" />
      </>
    ) : (
      'to these bytes'
    ),
  };
}

function releasedStep({ release, state }: RevisionView): GateStep {
  const recalled = state === 'recalled';
  return {
    id: 'released',
    name: recalled ? 'Recalled' : 'Released',
    state: release ? (recalled ? 'returned' : 'passed') : 'ahead',
    line: release ? (
      <>
        by <span className="text-ink">{release.byName}</span>, <Time at={release.at} show="moment" />
        {release.note ? <span className="text-ink"> “{release.note}”</span> : null}
      </>
    ) : (
      'by production'
    ),
  };
}
