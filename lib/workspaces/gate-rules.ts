import type { GateCondition, GateRule } from '@/db/schema/workspaces';
import type { GateInput, GateRuleView } from './gate-plan-schemas';
import type { Role } from './role-names';

/** A rule with everything said that older plans leave out. */
export type FullRule = Required<Omit<GateRule, 'dueDays'>> & { dueDays: number | null };

export function fullRule(rule: GateRule): FullRule {
  return {
    key: rule.key,
    name: rule.name,
    kind: rule.kind,
    conditions: rule.kind === 'automatic' ? (rule.conditions ?? ['checks-pass']) : [],
    roles: rule.roles,
    people: rule.people ?? [],
    quorum: rule.quorum,
    fourEyes: rule.fourEyes,
    dueDays: rule.dueDays ?? null,
    meaning: rule.meaning,
  };
}

const holds: Record<GateCondition, string> = {
  'checks-pass': 'no failing finding is open',
  'docket-settled': 'nothing on the docket is left to settle',
};

/** Rules of the gates that a lead wrote down. Gates without a key get one of their name. */
export function rulesOf(gates: readonly GateInput[]): FullRule[] {
  const taken = new Set(gates.flatMap((gate) => gate.key ?? []));
  return gates.map((gate) => {
    const key = gate.key ?? freeKey(gate.name, taken);
    taken.add(key);
    if (gate.kind === 'people') return { ...gate, key, conditions: [] };
    return {
      key,
      name: gate.name,
      kind: 'automatic' as const,
      conditions: gate.conditions,
      roles: [],
      people: [],
      quorum: 0,
      fourEyes: false,
      dueDays: null,
      meaning: `Checked by Firstpull: ${gate.conditions.map((condition) => holds[condition]).join(', and ')}.`,
    };
  });
}

function freeKey(name: string, taken: ReadonlySet<string>): string {
  const plain = name
    .normalize('NFKD')
    .toLowerCase()
    .replaceAll(/[^a-z0-9]+/g, '-')
    .replaceAll(/^-+|-+$/g, '')
    .slice(0, 30);
  const stem = plain || 'gate';
  for (let n = 1; ; n++) {
    const key = n === 1 ? stem : `${stem}-${n}`;
    if (!taken.has(key)) return key;
  }
}

/** A rule as pages and the API tell it; `names` has the members of the workspace. */
export function ruleView(rule: GateRule, names: ReadonlyMap<string, string>): GateRuleView {
  const full = fullRule(rule);
  return {
    ...full,
    roles: full.roles as Role[],
    people: full.people.map((id) => ({ id, name: names.get(id) ?? null })),
  };
}
