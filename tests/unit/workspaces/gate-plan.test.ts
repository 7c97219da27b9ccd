import { describe, expect, it } from 'vitest';
import {
  peopleProblems,
  planHints,
  signersOf,
  signingRoles,
  type PlanPerson,
} from '@/lib/workspaces/check-gate-plan';
import { defaultGatePlan } from '@/lib/workspaces/default-gate-plan';
import { ChangeGatePlanInput, type GateInput } from '@/lib/workspaces/gate-plan-schemas';
import { fullRule, ruleView, rulesOf } from '@/lib/workspaces/gate-rules';
import { planChanges, whenPasses, whoSigns } from '@/lib/workspaces/gate-words';
import { permits, roles, type Role } from '@/lib/workspaces/roles';

const ids: Record<string, string> = Object.fromEntries(
  ['ada', 'ben', 'cem', 'dee', 'eli'].map((name, n) => [name, `0192f1c4-0000-7000-8000-00000000000${n}`]),
);
const person = (name: string, role: Role): PlanPerson => ({ id: ids[name], name, role });
const people = [
  person('ada', 'designer'),
  person('ben', 'lead'),
  person('dee', 'approver'),
  person('eli', 'reviewer'),
];

const checks: GateInput = { kind: 'automatic', name: 'Forming', conditions: ['checks-pass'] };
const signed = (change: Partial<Extract<GateInput, { kind: 'people' }>> = {}) => ({
  kind: 'people' as const,
  name: 'Studio',
  roles: ['designer' as const, 'lead' as const],
  people: [] as string[],
  quorum: 1 as number | 'all',
  fourEyes: true,
  dueDays: null as number | null,
  meaning: 'I stand by it.',
  ...change,
});
const client = signed({ name: 'Client', roles: ['approver'] });

const shape = (input: unknown) => {
  const result = ChangeGatePlanInput.safeParse(input);
  return result.success
    ? []
    : result.error.issues.map(({ path, message }) => `${path.join('/')}: ${message}`);
};
const plan = (...gates: unknown[]) => shape({ gates });
const inPlace = (
  gates: GateInput[],
  options: { endsWithoutClient?: boolean; who?: PlanPerson[]; invited?: number } = {},
) =>
  peopleProblems(
    { gates, endsWithoutClient: options.endsWithoutClient ?? false },
    options.who ?? people,
    options.invited ? { approver: options.invited } : {},
  ).map(({ at, field, detail }) => `${at}/${field}: ${detail}`);

describe('the shape of a plan', () => {
  it('takes the default plan back', () => {
    const input = defaultGatePlan
      .map(fullRule)
      .map(({ meaning, ...rule }) => (rule.kind === 'people' ? { ...rule, meaning } : rule));
    expect(plan(...input)).toEqual([]);
    expect(rulesOf(ChangeGatePlanInput.parse({ gates: input }).gates).map(({ key }) => key)).toEqual([
      'forming',
      'studio',
      'client',
    ]);
  });

  it('has at least one gate that people sign, and one of them last', () => {
    expect(plan()).toContain('gates: A plan has at least one gate.');
    expect(plan(checks)).toEqual([expect.stringContaining('signed by people')]);
    expect(plan(client, checks)).toEqual([expect.stringMatching(/^gates\/1\/kind: The last gate/)]);
  });

  it('has names of their own, whatever the case', () => {
    expect(plan(signed(), { ...client, name: 'STUDIO' })).toEqual([
      'gates/1/name: Gate 1 has this name already. Give each its own.',
    ]);
    expect(plan({ ...signed(), key: 'a' }, { ...client, key: 'a' })).toEqual([
      expect.stringContaining('gates/1/key'),
    ]);
  });

  it('asks roles or people, never both or neither, and only who signs', () => {
    expect(plan({ ...client, roles: [] })).toEqual([expect.stringContaining('gates/0/roles: Say who signs')]);
    expect(plan({ ...client, people: [ids.dee] })).toEqual([expect.stringContaining('not both')]);
    expect(plan({ ...client, roles: ['producer'] })).toEqual([expect.stringContaining('Only designers')]);
    expect(signingRoles).toEqual(roles.filter((role) => permits(role, 'gate.sign')));
  });

  it.each([
    ['quorum', 0],
    ['quorum', 1.5],
    ['quorum', 'most'],
    ['dueDays', 0],
    ['dueDays', 91],
    ['meaning', ' '],
    ['name', 'x'.repeat(41)],
    ['name', 'two\nlines'],
    ['key', 'Not A Key'],
  ])('refuses %s %j', (field, value) => {
    expect(plan({ ...client, [field]: value })).toEqual([expect.stringContaining(`gates/0/${field}`)]);
  });

  it('names a condition once, and has one', () => {
    expect(plan({ ...checks, conditions: [] }, client)).toEqual([expect.stringContaining('waits for')]);
    expect(plan({ ...checks, conditions: ['checks-pass', 'checks-pass'] }, client)).toHaveLength(1);
    expect(plan({ ...checks, conditions: ['docket-settled', 'checks-pass'] }, client)).toEqual([]);
  });
});

describe('a plan in its workspace', () => {
  it('is the default one: studio, then client', () => {
    expect(inPlace([checks, signed(), client])).toEqual([]);
  });

  it('asks for no more than could sign, and counts who is invited', () => {
    expect(inPlace([signed(), { ...client, quorum: 2 }])).toEqual([
      '1/quorum: Client asks for 2 signatures, but one person could give one here. Ask for fewer, ask others, or invite people first.',
    ]);
    expect(inPlace([signed(), { ...client, quorum: 2 }], { invited: 1 })).toEqual([]);
    const nobody = people.filter(({ role }) => role !== 'approver');
    expect(inPlace([signed(), client], { who: nobody })).toEqual([
      expect.stringMatching(/^1\/quorum: Client asks for a signature, but nobody could/),
    ]);
    expect(inPlace([signed(), { ...client, quorum: 'all' }], { who: nobody })).toHaveLength(1);
  });

  it('counts the author out under four eyes, whoever that is', () => {
    expect(inPlace([signed({ quorum: 2 }), client])).toEqual([
      expect.stringContaining('as an author never signs'),
    ]);
    expect(inPlace([signed({ quorum: 2, fourEyes: false }), client])).toEqual([]);
    // Ada may post, so the one lead can be asked; where he posts himself, nobody is left.
    expect(inPlace([signed({ roles: ['lead'] }), client])).toEqual([]);
    expect(signersOf(signed({ roles: ['lead'] }), people, {})).toEqual({ most: 1, fewest: 0 });
  });

  it('names only members who may sign', () => {
    const named = (...who: string[]) => signed({ roles: [], people: who.map((name) => ids[name]) });
    expect(inPlace([named('ben'), client])).toEqual([]);
    expect(inPlace([named('ben', 'cem'), client])).toEqual([
      expect.stringContaining('0/people: One of the named people does not belong'),
    ]);
    expect(inPlace([named('ben', 'eli'), client])).toEqual([
      expect.stringContaining('0/people: eli is reviewer here'),
    ]);
    expect(inPlace([{ ...named('ada', 'ben'), quorum: 2 }, client])).toHaveLength(1);
  });

  it('ends with the client, unless the lead says otherwise', () => {
    expect(inPlace([client, signed()])).toEqual([
      expect.stringContaining('1/roles: The last name is the client’s'),
    ]);
    expect(inPlace([client, signed()], { endsWithoutClient: true })).toEqual([]);
    expect(inPlace([signed(), signed({ name: 'Client', roles: [], people: [ids.dee] })])).toEqual([]);
  });

  it('never lets an author agree alone', () => {
    const alone = signed({ fourEyes: false });
    expect(inPlace([alone], { endsWithoutClient: true })).toEqual([
      expect.stringContaining('an author could agree alone'),
    ]);
    expect(inPlace([alone, client])).toEqual([]);
  });
});

describe('hints', () => {
  const hints = (...gates: GateInput[]) =>
    planHints(gates, people, {}).map(({ at, detail }) => `${at}: ${detail}`);

  it('tell of a gate that an author could leave without signers, and of checks that nothing waits for', () => {
    expect(hints(checks, signed(), client)).toEqual([]);
    expect(hints(checks, signed({ roles: ['lead'] }), client)).toEqual([
      expect.stringMatching(/^1: When one of those/),
    ]);
    expect(hints({ ...checks, conditions: ['docket-settled'] }, client)).toEqual([
      expect.stringMatching(/^null: No gate waits for the checks/),
    ]);
  });
});

describe('rules', () => {
  it('get keys of their names, each its own', () => {
    const gates = [
      signed({ name: 'Prüfung & Form' }),
      signed({ name: 'Prüfung Form' }),
      signed({ name: '??', key: 'gate' }),
      signed({ name: '!!' }),
    ];
    expect(rulesOf(gates).map(({ key }) => key)).toEqual([
      'pru-fung-form',
      'pru-fung-form-2',
      'gate',
      'gate-2',
    ]);
  });

  it('of an automatic gate say what it waits for', () => {
    const [rule] = rulesOf([{ ...checks, conditions: ['checks-pass', 'docket-settled'] }]);
    expect(rule).toMatchObject({ kind: 'automatic', roles: [], quorum: 0, fourEyes: false });
    expect(rule.meaning).toContain('no failing finding is open, and nothing on the docket');
    expect(whenPasses(ruleView(rule, new Map()))).toContain(', and when nothing on the docket');
  });
});

describe('words', () => {
  const names = new Map(Object.entries(ids).map(([name, id]) => [id, name]));
  const view = (gate: GateInput) => ruleView(rulesOf([gate])[0], names);

  it.each([
    [signed(), 'One designer or lead signs.'],
    [signed({ quorum: 2 }), 'Two people who are designer or lead sign.'],
    [signed({ quorum: 'all', roles: ['approver'] }), 'Every approver signs.'],
    [signed({ roles: [], people: [ids.ada] }), 'ada signs.'],
    [signed({ roles: [], people: [ids.ada, ids.ben] }), 'One of ada and ben signs.'],
    [signed({ roles: [], people: [ids.ada, ids.ben, ids.dee], quorum: 2 }), 'Two of ada, ben and dee sign.'],
    [signed({ roles: [], people: [ids.ada, ids.ben], quorum: 'all' }), 'ada and ben sign, each of them.'],
  ])('say who signs (%#)', (gate, words) => {
    expect(whoSigns(view(gate))).toBe(words);
  });

  it('say that a named person has left', () => {
    expect(whoSigns(ruleView(rulesOf([signed({ roles: [], people: [ids.ada] })])[0], new Map()))).toBe(
      'somebody who has left signs.',
    );
  });

  it('say what a version changed', () => {
    const before = [checks, signed(), client].map(view);
    const after = [
      { ...before[2], name: 'Customer', quorum: 2, dueDays: 5 },
      { ...before[0], conditions: ['docket-settled' as const] },
      view(signed({ name: 'Tooling' })),
    ];
    expect(planChanges(before, before)).toEqual([]);
    expect(planChanges(before, after)).toEqual([
      'renamed Client to Customer',
      'Customer: Two people who are approver sign.',
      'Customer: due 5 days after it opens',
      expect.stringContaining('Forming: Passes by itself when nothing on the docket'),
      'added Tooling',
      'took out Studio',
      'changed the order',
    ]);
  });
});
