import { beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { GET as listRoute } from '@/app/api/v1/workspaces/[workspace]/people/route';
import { changeMemberRole } from '@/lib/workspaces/change-member-role';
import { listPeople } from '@/lib/workspaces/list-people';
import { removeMember } from '@/lib/workspaces/remove-member';
import { callRoute } from '@/tests/support/call-route';
import { freshDatabase, type FreshDatabase } from '@/tests/support/database';
import { makeHouse, type House } from '@/tests/support/make-house';

let database: FreshDatabase;
let house: House;
beforeAll(async () => {
  database = await freshDatabase();
});
beforeEach(async () => {
  house = await makeHouse(database);
});

const idOf = (role: keyof House['people']) => house.people[role].person.id;
const roleOf = async (role: keyof House['people']) =>
  (
    await database.query<{ role: string }>(
      'select role from members where workspace_id = $1 and user_id = $2',
      [house.workspace.id, idOf(role)],
    )
  ).rows[0]?.role;

describe('listPeople', () => {
  it('shows everybody of the workspace with their side, to everybody in it', async () => {
    for (const role of ['lead', 'reviewer'] as const) {
      const { people } = await listPeople(await house.enter(role));
      expect(Object.fromEntries(people.map((person) => [person.role, person.side]))).toEqual({
        lead: 'studio',
        designer: 'studio',
        producer: 'studio',
        reviewer: 'client',
        approver: 'client',
      });
    }
  });
});

describe('changeMemberRole', () => {
  it('changes a client and writes it down', async () => {
    await changeMemberRole(await house.enter('lead'), idOf('reviewer'), { role: 'approver' });
    expect(await roleOf('reviewer')).toBe('approver');
    const { rows } = await database.query(
      `select detail->>'from' as was, detail->>'to' as is from audit_entries where action = 'person.role-changed' and subject_id = $1`,
      [idOf('reviewer')],
    );
    expect(rows).toEqual([{ was: 'reviewer', is: 'approver' }]);
  });

  it('makes nobody staff, and changes no staff', async () => {
    const lead = await house.enter('lead');
    await expect(changeMemberRole(lead, idOf('reviewer'), { role: 'lead' })).rejects.toMatchObject({
      code: 'invalid',
    });
    await expect(changeMemberRole(lead, idOf('designer'), { role: 'approver' })).rejects.toMatchObject({
      reason: 'studio-staff',
    });
    expect([await roleOf('reviewer'), await roleOf('designer')]).toEqual(['reviewer', 'designer']);
  });

  it.each(['designer', 'producer', 'reviewer', 'approver'] as const)(
    'is refused to a %s, also for themselves',
    async (role) => {
      const ctx = await house.enter(role);
      for (const target of [idOf('reviewer'), ctx.person.id])
        await expect(changeMemberRole(ctx, target, { role: 'approver' })).rejects.toMatchObject({
          code: 'forbidden',
        });
      expect(await roleOf('reviewer')).toBe('reviewer');
    },
  );
});

describe('removeMember', () => {
  it('shuts a client out at once, whatever cookie they hold, and keeps the trail', async () => {
    const call = () =>
      callRoute(listRoute, {
        params: { workspace: house.workspace.slug },
        cookie: house.people.approver.cookie,
      });
    expect((await call()).status).toBe(200);
    await removeMember(await house.enter('lead'), idOf('approver'));
    expect((await call()).status).toBe(404);
    const { rows } = await database.query(
      `select detail->>'role' as role from audit_entries where action = 'person.removed' and subject_id = $1`,
      [idOf('approver')],
    );
    expect(rows).toEqual([{ role: 'approver' }]);
  });

  it('lets a client leave by themselves', async () => {
    await removeMember(await house.enter('reviewer'), idOf('reviewer'));
    expect(await roleOf('reviewer')).toBeUndefined();
    await expect(house.enter('reviewer')).rejects.toMatchObject({ code: 'not_found' });
  });

  it('is refused to who may not change people, and never removes staff', async () => {
    await expect(removeMember(await house.enter('approver'), idOf('reviewer'))).rejects.toMatchObject({
      code: 'forbidden',
    });
    await expect(removeMember(await house.enter('lead'), idOf('producer'))).rejects.toMatchObject({
      reason: 'studio-staff',
    });
    expect([await roleOf('reviewer'), await roleOf('producer')]).toEqual(['reviewer', 'producer']);
  });

  it('does not know people of another workspace', async () => {
    const other = await makeHouse(database);
    const foreign = other.people.approver.person.id;
    const lead = await house.enter('lead');
    await expect(removeMember(lead, foreign)).rejects.toMatchObject({ code: 'not_found' });
    await expect(changeMemberRole(lead, foreign, { role: 'reviewer' })).rejects.toMatchObject({
      code: 'not_found',
    });
    expect((await other.enter('approver')).role).toBe('approver');
  });
});
