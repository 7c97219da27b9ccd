import { describe, expect, it } from 'vitest';
import type { GateRule } from '@/db/schema/workspaces';
import { verdictOf } from '@/lib/review/record-check';
import { whoMaySign } from '@/lib/review/who-signs';
import type { Role } from '@/lib/workspaces/roles';

const person = (id: string, role: Role) => ({
  id,
  name: id,
  email: `${id}@example.test`,
  timeZone: 'UTC',
  role,
  side: role === 'approver' || role === 'reviewer' ? ('client' as const) : ('studio' as const),
});
const people = [
  person('ada', 'designer'),
  person('ben', 'lead'),
  person('cem', 'producer'),
  person('dee', 'approver'),
  person('eli', 'reviewer'),
];
const gate = (rule: Partial<GateRule>) => ({
  id: 'g',
  rule: {
    key: 'studio',
    name: 'Studio',
    kind: 'people' as const,
    roles: ['designer', 'lead'],
    quorum: 1,
    fourEyes: true,
    meaning: '',
    ...rule,
  },
});

const names = (...args: Parameters<typeof whoMaySign>) => whoMaySign(...args).map(({ id }) => id);

describe('whoMaySign', () => {
  it('asks for the role', () => {
    expect(names(gate({}), ['zoe'], people, [])).toEqual(['ada', 'ben']);
    expect(names(gate({ roles: ['approver'] }), ['zoe'], people, [])).toEqual(['dee']);
    expect(names(gate({ roles: [] }), ['zoe'], people, [])).toEqual([]);
  });

  it('leaves out who posted it and who sent the mesh, under four eyes only', () => {
    expect(names(gate({}), ['ada'], people, [])).toEqual(['ben']);
    expect(names(gate({}), ['zoe', 'ada'], people, [])).toEqual(['ben']);
    expect(names(gate({ fourEyes: false }), ['ada'], people, [])).toEqual(['ada', 'ben']);
  });

  it('counts a name once a gate', () => {
    expect(names(gate({}), ['zoe'], people, [{ gateId: 'g', signerId: 'ben' }])).toEqual(['ada']);
    expect(names(gate({}), ['zoe'], people, [{ gateId: 'other', signerId: 'ben' }])).toEqual(['ada', 'ben']);
  });
});

describe('verdictOf', () => {
  const of = (...statuses: ('pass' | 'caution' | 'fail' | 'not-run')[]) =>
    verdictOf(statuses.map((status) => ({ status })));
  it('is the worst of what was run', () => {
    expect(of('pass', 'caution', 'fail', 'not-run')).toBe('fail');
    expect(of('pass', 'caution', 'not-run')).toBe('caution');
    expect(of('pass', 'not-run')).toBe('pass');
    expect(of()).toBe('pass');
  });
});
