import { describe, expect, it } from 'vitest';
import { defaultGatePlan } from '@/lib/workspaces/default-gate-plan';
import { permits, roles, sideOf, type Permission, type Role } from '@/lib/workspaces/roles';

/** Who may do what, as a table of its own. */
const allowed: [Permission, Role[]][] = [
  ['workspace.read', ['designer', 'lead', 'producer', 'reviewer', 'approver']],
  ['docket.note', ['designer', 'lead', 'producer', 'reviewer', 'approver']],
  ['template.create', ['designer', 'lead']],
  ['revision.post', ['designer', 'lead']],
  ['revision.release', ['lead', 'producer']],
  ['gate.sign', ['designer', 'lead', 'approver']],
  ['gate.plan', ['lead']],
  ['finding.waive', ['lead']],
  ['people.invite', ['lead']],
  ['people.change', ['lead']],
  ['pack.download', ['designer', 'lead', 'producer', 'approver']],
];

describe('roles', () => {
  it.each(allowed)('%s is for %j and nobody else', (permission, expected) => {
    expect(roles.filter((role) => permits(role, permission))).toEqual(
      roles.filter((role) => expected.includes(role)),
    );
  });

  it('belong to one side each', () => {
    expect(roles.map(sideOf)).toEqual(['studio', 'studio', 'studio', 'client', 'client']);
  });
});

describe('the default gate plan', () => {
  it('is Forming, Studio, Client in this order', () => {
    expect(
      defaultGatePlan.map(({ name, kind, roles: who, quorum, fourEyes }) => ({
        name,
        kind,
        who,
        quorum,
        fourEyes,
      })),
    ).toEqual([
      { name: 'Forming', kind: 'automatic', who: [], quorum: 0, fourEyes: false },
      { name: 'Studio', kind: 'people', who: ['designer', 'lead'], quorum: 1, fourEyes: true },
      { name: 'Client', kind: 'people', who: ['approver'], quorum: 1, fourEyes: true },
    ]);
  });

  it('lets nobody sign whose role may not sign', () => {
    for (const gate of defaultGatePlan)
      for (const role of gate.roles) expect(permits(role as Role, 'gate.sign')).toBe(true);
  });
});
