import { beforeAll, describe, expect, it } from 'vitest';
import { enterWorkspace } from '@/lib/auth/enter';
import { createWorkspace } from '@/lib/workspaces/create-workspace';
import { defaultGatePlan } from '@/lib/workspaces/default-gate-plan';
import { listWorkspaces } from '@/lib/workspaces/list-workspaces';
import { readGatePlan } from '@/lib/workspaces/read-gate-plan';
import { freshDatabase, type FreshDatabase } from '@/tests/support/database';
import { makeHouse, type House } from '@/tests/support/make-house';

let database: FreshDatabase;
let house: House;
beforeAll(async () => {
  database = await freshDatabase();
  house = await makeHouse(database);
});

describe('createWorkspace', () => {
  it('opens it with its staff, version 1 of the gate plan and its first entries', async () => {
    const ctx = await house.enterStudio('lead');
    const made = await createWorkspace(ctx, { name: 'Harbour Foods', code: 'HBF', timeZone: 'Europe/Riga' });
    expect(made).toMatchObject({ name: 'Harbour Foods', code: 'HBF', timeZone: 'Europe/Riga' });
    for (const role of ['lead', 'designer', 'producer'] as const) {
      const inside = await enterWorkspace(house.people[role].person, made.slug);
      expect(inside.role).toBe(role);
      expect(await readGatePlan(inside)).toMatchObject({ number: 1, gates: defaultGatePlan });
    }
    await expect(enterWorkspace(house.people.approver.person, made.slug)).rejects.toMatchObject({
      code: 'not_found',
    });
    const chain = await database.query(
      'select seq, action, actor_id from audit_entries where workspace_id = $1 order by seq',
      [made.id],
    );
    expect(chain.rows).toEqual([
      { seq: 1, action: 'workspace.opened', actor_id: ctx.person.id },
      { seq: 2, action: 'gate-plan.made', actor_id: ctx.person.id },
    ]);
    const studio = await database.query(
      `select 1 from studio_entries where action = 'workspace.opened' and detail->>'workspaceId' = $1`,
      [made.id],
    );
    expect(studio.rows).toHaveLength(1);
  });

  it.each(['designer', 'producer'] as const)('is not for a %s', async (role) => {
    const ctx = await house.enterStudio(role);
    await expect(createWorkspace(ctx, { name: 'X', code: 'XX' })).rejects.toMatchObject({
      code: 'forbidden',
    });
    const { workspaces } = await listWorkspaces(ctx);
    expect(workspaces.map((workspace) => workspace.code)).not.toContain('XX');
  });

  it('keeps codes apart within a studio and lets two studios use the same', async () => {
    const other = await makeHouse(database);
    const ctx = await house.enterStudio('lead');
    await createWorkspace(ctx, { name: 'One', code: 'DUP' });
    await expect(createWorkspace(ctx, { name: 'Two', code: 'DUP' })).rejects.toMatchObject({
      reason: 'code-taken',
    });
    await expect(
      createWorkspace(await other.enterStudio('lead'), { name: 'One', code: 'DUP' }),
    ).resolves.toMatchObject({
      code: 'DUP',
    });
  });

  it('opens one workspace when the same code is sent twice at once', async () => {
    const ctx = await house.enterStudio('lead');
    const outcomes = await Promise.allSettled(
      [1, 2, 3].map(() => createWorkspace(ctx, { name: 'Race', code: 'RAC' })),
    );
    expect(outcomes.filter((outcome) => outcome.status === 'fulfilled')).toHaveLength(1);
    const { rows } = await database.query(`select 1 from workspaces where code = 'RAC'`);
    expect(rows).toHaveLength(1);
  });

  it('names what is wrong with the input', async () => {
    const ctx = await house.enterStudio('lead');
    await expect(
      createWorkspace(ctx, { name: '', code: 'abc', timeZone: 'Nowhere/Town' }),
    ).rejects.toMatchObject({
      code: 'invalid',
      errors: [{ pointer: '/name' }, { pointer: '/code' }, { pointer: '/timeZone' }],
    });
  });
});

describe('listWorkspaces', () => {
  it('lists the studio’s own with their counts', async () => {
    const ctx = await house.enterStudio('designer');
    const { workspaces } = await listWorkspaces(ctx);
    const own = workspaces.find((workspace) => workspace.id === house.workspace.id);
    expect(own).toMatchObject({ clients: 2, pendingInvitations: 0, templates: 0 });
    const { rows } = await database.query<{ n: number }>(
      'select count(*)::int as n from workspaces where studio_id = $1',
      [house.studio.id],
    );
    expect(workspaces).toHaveLength(rows[0].n);
  });
});
