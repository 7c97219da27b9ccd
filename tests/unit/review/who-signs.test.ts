import { describe, expect, it } from 'vitest';
import type { GateRule } from '@/db/schema/workspaces';
import { verdictOf } from '@/lib/review/record-check';
import {
  isShort,
  missingAt,
  quorumReached,
  rightAt,
  whoMaySign,
  type GateAt,
  type StandIn,
} from '@/lib/review/who-signs';
import type { Role } from '@/lib/workspaces/roles';

const person = (id: string, role: Role) => ({
  id,
  name: id,
  email: `${id}@example.test`,
  timeZone: 'UTC',
  role,
  side: role === 'approver' || role === 'reviewer' ? ('client' as const) : ('studio' as const),
});
const everybody = [
  person('ada', 'designer'),
  person('ben', 'lead'),
  person('cem', 'producer'),
  person('dee', 'approver'),
  person('eli', 'reviewer'),
  person('fay', 'lead'),
];

type Given = {
  rule?: Partial<GateRule>;
  makers?: string[];
  standIns?: [away: string, standIn: string][];
  signed?: (string | [signer: string, forWhom: string])[];
  without?: string[];
};

function at({ rule = {}, makers = ['zoe'], standIns = [], signed = [], without = [] }: Given): GateAt {
  return {
    gate: {
      id: 'g',
      rule: {
        key: 'studio',
        name: 'Studio',
        kind: 'people',
        roles: ['designer', 'lead'],
        quorum: 1,
        fourEyes: true,
        meaning: '',
        ...rule,
      },
    },
    makers,
    people: everybody.filter(({ id }) => !without.includes(id)),
    standIns: standIns.map(([personId, standInId]): StandIn => ({ personId, standInId })),
    signed: signed.map((one) => ({
      gateId: 'g',
      decision: 'sign',
      signerId: Array.isArray(one) ? one[0] : one,
      signedForId: Array.isArray(one) ? one[1] : null,
    })),
  };
}
const names = (given: Given) => whoMaySign(at(given)).map(({ id }) => id);
const right = (id: string, given: Given) => {
  const found = rightAt(
    at(given),
    everybody.find((one) => one.id === id)!,
  );
  return found && { own: found.own, for: found.standsFor?.id ?? null };
};

describe('whoMaySign', () => {
  it('asks for the role', () => {
    expect(names({})).toEqual(['ada', 'ben', 'fay']);
    expect(names({ rule: { roles: ['approver'] } })).toEqual(['dee']);
    expect(names({ rule: { roles: [] } })).toEqual([]);
  });

  it('asks for named people whatever the roles say, if theirs may sign', () => {
    expect(names({ rule: { roles: [], people: ['dee', 'ben'] } })).toEqual(['ben', 'dee']);
    expect(names({ rule: { roles: ['lead'], people: ['ada'] } })).toEqual(['ada']);
    expect(names({ rule: { roles: [], people: ['cem', 'eli', 'gone'] } })).toEqual([]);
  });

  it('leaves out who posted it and who sent the mesh, under four eyes only', () => {
    expect(names({ makers: ['ada'] })).toEqual(['ben', 'fay']);
    expect(names({ makers: ['zoe', 'ada'] })).toEqual(['ben', 'fay']);
    expect(names({ makers: ['ada'], rule: { fourEyes: false } })).toEqual(['ada', 'ben', 'fay']);
  });

  it('counts a name once a gate', () => {
    expect(names({ signed: ['ben'] })).toEqual(['ada', 'fay']);
    const elsewhere = at({ signed: ['ben'] });
    elsewhere.signed[0].gateId = 'other';
    expect(whoMaySign(elsewhere).map(({ id }) => id)).toEqual(['ada', 'ben', 'fay']);
  });
});

describe('a stand-in', () => {
  const named = { roles: [], people: ['ben'] };
  const benAway: [string, string][] = [['ben', 'fay']];

  it('signs for who is away, where the gate asks only them', () => {
    expect(right('fay', { rule: named })).toBeNull();
    expect(right('fay', { rule: named, standIns: benAway })).toEqual({ own: false, for: 'ben' });
    expect(right('ben', { rule: named, standIns: benAway })).toEqual({ own: true, for: null });
  });

  it('signs in their own right where they are asked anyway, and for both where everybody is', () => {
    expect(right('fay', { standIns: benAway })).toEqual({ own: true, for: null });
    expect(right('fay', { standIns: benAway, rule: { quorum: 'all' } })).toEqual({ own: true, for: 'ben' });
  });

  it('needs the same role, and somebody who is still there', () => {
    expect(right('ada', { rule: named, standIns: [['ben', 'ada']] })).toBeNull();
    expect(right('fay', { rule: named, standIns: benAway, without: ['ben'] })).toBeNull();
  });

  it('has no right of the author under four eyes, nor as the author, but keeps their own', () => {
    expect(right('fay', { rule: named, standIns: benAway, makers: ['ben'] })).toBeNull();
    expect(right('fay', { rule: named, standIns: benAway, makers: ['fay'] })).toBeNull();
    expect(right('fay', { standIns: benAway, makers: ['ben'] })).toEqual({ own: true, for: null });
    expect(right('fay', { rule: { ...named, fourEyes: false }, standIns: benAway, makers: ['ben'] })).toEqual(
      { own: false, for: 'ben' },
    );
  });

  it('and who is away answer once: the second of them may not', () => {
    expect(right('fay', { rule: named, standIns: benAway, signed: ['ben'] })).toBeNull();
    expect(right('ben', { rule: named, standIns: benAway, signed: [['fay', 'ben']] })).toBeNull();
  });
});

describe('the quorum', () => {
  it.each([1, 2, 3])('of %i is reached by as many signatures, no fewer', (quorum) => {
    const signers = ['ada', 'ben', 'fay'];
    for (let n = 0; n <= 3; n++)
      expect(quorumReached(at({ rule: { quorum }, signed: signers.slice(0, n) }))).toBe(n >= quorum);
  });

  it('does not count a return', () => {
    const returned = at({ signed: ['ben'] });
    returned.signed[0].decision = 'return';
    expect(quorumReached(returned)).toBe(false);
  });

  it('of all needs everybody who is asked, makers aside under four eyes', () => {
    const rule = { quorum: 'all' as const };
    expect(quorumReached(at({ rule, signed: ['ada', 'ben'] }))).toBe(false);
    expect(quorumReached(at({ rule, signed: ['ada', 'ben', 'fay'] }))).toBe(true);
    expect(quorumReached(at({ rule, signed: ['ben', 'fay'], makers: ['ada'] }))).toBe(true);
    expect(
      quorumReached(at({ rule: { ...rule, fourEyes: false }, signed: ['ben', 'fay'], makers: ['ada'] })),
    ).toBe(false);
  });

  it('of all waits for nobody who has left, and counts a stand-in for who is away', () => {
    const rule = { quorum: 'all' as const };
    expect(quorumReached(at({ rule, signed: ['ada', 'ben'], without: ['fay'] }))).toBe(true);
    expect(quorumReached(at({ rule, signed: ['ada', ['fay', 'ben']] }))).toBe(true);
    expect(missingAt(at({ rule, signed: [['fay', 'ben']] })).map(({ id }) => id)).toEqual(['ada']);
    expect(quorumReached(at({ rule, without: ['ada', 'ben', 'fay'] }))).toBe(false);
  });
});

describe('a gate is short', () => {
  it('when fewer are left than it needs, signatures counted', () => {
    expect(isShort(at({ rule: { quorum: 3 } }))).toBe(false);
    expect(isShort(at({ rule: { quorum: 3 }, without: ['fay'] }))).toBe(true);
    expect(isShort(at({ rule: { quorum: 3 }, without: ['fay'], signed: ['fay'] }))).toBe(false);
    expect(isShort(at({ rule: { quorum: 3 }, makers: ['ada'] }))).toBe(true);
  });

  it('when everybody is asked and nobody is there, unless somebody has signed', () => {
    const rule = { quorum: 'all' as const, roles: ['approver'] };
    expect(isShort(at({ rule }))).toBe(false);
    expect(isShort(at({ rule, without: ['dee'] }))).toBe(true);
    expect(isShort(at({ rule, without: ['dee'], signed: ['dee'] }))).toBe(false);
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
