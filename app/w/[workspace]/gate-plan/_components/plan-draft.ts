import type { PlanProblem } from '@/lib/workspaces/check-gate-plan';
import { gateConditions, signingRoles, type SigningRole } from '@/lib/workspaces/check-gate-plan';
import type { GateInput, GateRuleView } from '@/lib/workspaces/gate-plan-schemas';

/** A gate while it is edited: what is not chosen now is kept, so that choosing back brings it back. */
export interface DraftGate {
  /** Of this page only. */
  id: string;
  key?: string;
  kind: 'automatic' | 'people';
  name: string;
  conditions: (typeof gateConditions)[number][];
  who: 'roles' | 'people';
  roles: SigningRole[];
  people: string[];
  howMany: 'one' | 'several' | 'all';
  /** Null while the field holds no number. */
  several: number | null;
  fourEyes: boolean;
  dueDays: number | null;
  meaning: string;
}

let made = 0;
const nextId = () => `gate-${++made}`;

export const draftOf = (gate: GateRuleView): DraftGate => ({
  id: nextId(),
  key: gate.key,
  kind: gate.kind,
  name: gate.name,
  conditions: gate.conditions.length ? gate.conditions : ['checks-pass'],
  who: gate.people.length ? 'people' : 'roles',
  roles: gate.roles.filter((role): role is SigningRole => (signingRoles as readonly string[]).includes(role)),
  // Who has left cannot be asked again.
  people: gate.people.flatMap(({ id, name }) => (name === null ? [] : id)),
  howMany: gate.quorum === 'all' ? 'all' : gate.quorum > 1 ? 'several' : 'one',
  several: typeof gate.quorum === 'number' && gate.quorum > 1 ? gate.quorum : 2,
  fourEyes: gate.kind === 'people' ? gate.fourEyes : true,
  dueDays: gate.dueDays,
  meaning: gate.kind === 'people' ? gate.meaning : '',
});

export const newGate = (kind: DraftGate['kind']): DraftGate => ({
  id: nextId(),
  kind,
  name: '',
  conditions: ['docket-settled'],
  who: 'roles',
  roles: kind === 'people' ? ['lead'] : [],
  people: [],
  howMany: 'one',
  several: 2,
  fourEyes: true,
  dueDays: null,
  meaning: kind === 'people' ? 'I checked this revision and stand by it.' : '',
});

export function inputOf(gate: DraftGate): GateInput {
  const named = { key: gate.key, name: gate.name.trim() };
  if (gate.kind === 'automatic') return { kind: 'automatic', ...named, conditions: gate.conditions };
  return {
    kind: 'people',
    ...named,
    roles: gate.who === 'roles' ? gate.roles : [],
    people: gate.who === 'people' ? gate.people : [],
    quorum: gate.howMany === 'all' ? 'all' : gate.howMany === 'one' ? 1 : (gate.several ?? 0),
    fourEyes: gate.fourEyes,
    dueDays: gate.dueDays,
    meaning: gate.meaning.trim(),
  };
}

/** The gate as it would be told once it stands. */
export function viewOf(gate: DraftGate, people: readonly { id: string; name: string }[]): GateRuleView {
  const input = inputOf(gate);
  const { conditions, roles, quorum, fourEyes, dueDays, meaning } = {
    conditions: [],
    roles: [],
    quorum: 0,
    fourEyes: false,
    dueDays: null,
    meaning: '',
    ...input,
  };
  const named = input.kind === 'people' ? input.people : [];
  return {
    key: gate.key ?? gate.id,
    name: input.name,
    kind: input.kind,
    conditions,
    roles,
    people: named.map((id) => ({ id, name: people.find((one) => one.id === id)?.name ?? null })),
    quorum,
    fourEyes,
    dueDays,
    meaning,
  };
}

/** What a field needs before the plan is sent; the server holds the same and more. */
export function fieldProblems(gates: readonly DraftGate[]): PlanProblem[] {
  return gates.flatMap((gate, at) => {
    const problems: PlanProblem[] = [];
    if (!gate.name.trim()) problems.push({ at, field: 'name', detail: 'Give the gate a name.' });
    if (gate.kind === 'automatic') {
      if (!gate.conditions.length)
        problems.push({ at, field: 'conditions', detail: 'Say what the gate waits for.' });
      return problems;
    }
    if (gate.howMany === 'several' && (gate.several ?? 0) < 1)
      problems.push({ at, field: 'quorum', detail: 'Say how many have to sign.' });
    if (!gate.meaning.trim())
      problems.push({ at, field: 'meaning', detail: 'Give the words that are signed.' });
    return problems;
  });
}

/** The gate at `from` goes to `to`; the others keep their order. */
export function moved<T>(list: readonly T[], from: number, to: number): T[] {
  const rest = list.filter((_, index) => index !== from);
  return [...rest.slice(0, to), list[from], ...rest.slice(to)];
}
