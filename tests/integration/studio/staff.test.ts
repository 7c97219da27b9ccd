import { beforeAll, beforeEach, describe, expect, it } from 'vitest';
import {
  DELETE as removeRoute,
  PATCH as changeRoute,
} from '@/app/api/v1/studios/[studio]/people/[person]/route';
import { POST as inviteRoute } from '@/app/api/v1/workspaces/[workspace]/invitations/route';
import { personContext, type StudioContext } from '@/lib/auth/context';
import { enterStudio } from '@/lib/auth/enter';
import { changeStaffRole } from '@/lib/studio/change-staff-role';
import { listStaff } from '@/lib/studio/list-staff';
import { removeStaff } from '@/lib/studio/remove-staff';
import { createWorkspace } from '@/lib/workspaces/create-workspace';
import { updateMe } from '@/lib/workspaces/update-me';
import { workspaceChannel } from '@/realtime/channels';
import { callRoute } from '@/tests/support/call-route';
import { freshDatabase, type FreshDatabase } from '@/tests/support/database';
import { joinStudio, makeHouse, type House } from '@/tests/support/make-house';

let database: FreshDatabase;
let house: House;
let lead: StudioContext;
beforeAll(async () => {
  database = await freshDatabase();
});
beforeEach(async () => {
  house = await makeHouse(database);
  lead = await house.enterStudio('lead');
});

const leads = async () =>
  (
    await database.query<{ n: number }>(
      `select count(*)::int as n from studio_members where studio_id = $1 and role = 'lead'`,
      [house.studio.id],
    )
  ).rows[0].n;

describe('staff of a studio', () => {
  it('change their role in every workspace at once', async () => {
    const { id } = house.people.designer.person;
    await changeStaffRole(lead, id, { role: 'producer' });
    expect((await house.enter('designer')).role).toBe('producer');
    expect((await house.enterStudio('designer')).role).toBe('producer');
    const { rows } = await database.query(
      `select detail->>'from' as was, detail->>'to' as is from studio_entries where action = 'person.role-changed' and studio_id = $1`,
      [house.studio.id],
    );
    expect(rows).toEqual([{ was: 'designer', is: 'producer' }]);
  });

  it('do at once only what the new role allows, whatever cookie they hold', async () => {
    const second = await joinStudio(database, lead, 'lead');
    const invite = (email: string) =>
      callRoute(inviteRoute, {
        params: { workspace: house.workspace.slug },
        cookie: second.cookie,
        body: { email, role: 'reviewer' },
      });
    expect((await invite('before@example.test')).status).toBe(201);
    await changeStaffRole(lead, second.person.id, { role: 'producer' });
    expect((await invite('after@example.test')).status).toBe(403);
    await removeStaff(lead, second.person.id);
    expect((await invite('after@example.test')).status).toBe(404);
  });

  it('lose every workspace when they are removed', async () => {
    const { id } = house.people.producer.person;
    await removeStaff(lead, id);
    await expect(house.enter('producer')).rejects.toMatchObject({ code: 'not_found' });
    await expect(house.enterStudio('producer')).rejects.toMatchObject({ code: 'not_found' });
    const { people } = await listStaff(lead);
    expect(people.map((person) => person.id)).not.toContain(id);
  });

  it('may leave by themselves', async () => {
    const designer = await house.enterStudio('designer');
    await removeStaff(designer, designer.person.id);
    await expect(house.enter('designer')).rejects.toMatchObject({ code: 'not_found' });
  });

  it.each(['designer', 'producer'] as const)('are not changed or removed by a %s', async (role) => {
    const ctx = await house.enterStudio(role);
    await expect(changeStaffRole(ctx, ctx.person.id, { role: 'lead' })).rejects.toMatchObject({
      code: 'forbidden',
    });
    await expect(removeStaff(ctx, lead.person.id)).rejects.toMatchObject({ code: 'forbidden' });
    expect((await house.enterStudio(role)).role).toBe(role);
  });
});

describe('a change of staff', () => {
  it('stands in the chain of every workspace of the studio, and is told there', async () => {
    const second = await createWorkspace(lead, { name: 'Second firm', code: 'ZZZ' });
    const joined = await joinStudio(database, lead, 'designer');
    const { id, name } = joined.person;
    await changeStaffRole(lead, id, { role: 'producer' });
    await removeStaff(await enterStudio(joined.person, house.studio.id), id);
    for (const workspaceId of [house.workspace.id, second.id]) {
      const { rows } = await database.query(
        `select action, actor_id as actor, detail - 'invitationId' as detail from audit_entries
         where workspace_id = $1 and subject_id = $2 order by seq`,
        [workspaceId, id],
      );
      expect(rows).toEqual([
        { action: 'person.joined', actor: id, detail: { name, role: 'designer' } },
        {
          action: 'person.role-changed',
          actor: lead.person.id,
          detail: { name, from: 'designer', to: 'producer' },
        },
        { action: 'person.removed', actor: id, detail: { name, role: 'producer', left: true } },
      ]);
      const told = await database.query<{ n: number }>(
        `select count(*)::int as n from outbox where workspace_id = $1 and payload->>'name' = 'people.changed'
           and payload->>'channel' = $2`,
        [workspaceId, workspaceChannel(workspaceId)],
      );
      expect(told.rows[0].n).toBeGreaterThanOrEqual(3);
    }
  });

  it('of several people at once leaves no chain forked and nobody waiting for the other', async () => {
    await createWorkspace(lead, { name: 'Second firm', code: 'ZZZ' });
    const { designer, producer } = house.people;
    await Promise.all([
      changeStaffRole(lead, designer.person.id, { role: 'producer' }),
      changeStaffRole(lead, producer.person.id, { role: 'designer' }),
      updateMe(personContext(lead.person), { name: 'Lead Renamed' }),
    ]);
    const { rows } = await database.query(
      `select e.workspace_id, count(*)::int as n, max(h.seq) as seq from audit_entries e
         join audit_heads h using (workspace_id) join workspaces w on w.id = e.workspace_id
       where w.studio_id = $1 group by e.workspace_id`,
      [house.studio.id],
    );
    expect(rows).toHaveLength(2);
    for (const row of rows as { n: number; seq: number }[]) expect(row.n).toBe(row.seq);
  });
});

describe('a new name', () => {
  const renames = async (personId: string) =>
    (
      await database.query(
        `select workspace_id, detail from audit_entries where action = 'person.renamed' and subject_id = $1
         order by workspace_id`,
        [personId],
      )
    ).rows;

  it('is written into every workspace of the person, once', async () => {
    const second = await createWorkspace(lead, { name: 'Second firm', code: 'ZZZ' });
    const { person } = house.people.designer;
    await updateMe(personContext(person), { name: 'Somebody Else', units: 'in' });
    const detail = { from: person.name, to: 'Somebody Else' };
    expect(await renames(person.id)).toEqual(
      [house.workspace.id, second.id].sort().map((workspace_id) => ({ workspace_id, detail })),
    );
    const { rows } = await database.query('select name, units from users where id = $1', [person.id]);
    expect(rows).toEqual([{ name: 'Somebody Else', units: 'in' }]);
  });

  it('that is the old one, or none, is not', async () => {
    const { person } = house.people.designer;
    await updateMe(personContext(person), { name: person.name, units: 'in' });
    await updateMe(personContext(person), { timeZone: 'Europe/Paris' });
    expect(await renames(person.id)).toEqual([]);
  });
});

describe('the last lead', () => {
  const call = (
    handler: typeof removeRoute,
    method: string,
    person: string,
    cookie: string,
    body?: unknown,
  ) => callRoute(handler, { method, params: { studio: house.studio.slug, person }, cookie, body });

  it('neither leaves nor steps down', async () => {
    const { cookie, person } = house.people.lead;
    const left = await call(removeRoute, 'DELETE', person.id, cookie);
    const stepped = await call(changeRoute, 'PATCH', person.id, cookie, { role: 'designer' });
    for (const answer of [left, stepped]) {
      expect(answer.status).toBe(409);
      expect(await answer.json()).toMatchObject({ type: '/problems/last-lead' });
    }
    expect(await leads()).toBe(1);
    const { rows } = await database.query(
      `select 1 from studio_entries where studio_id = $1 and action in ('person.removed', 'person.role-changed')`,
      [house.studio.id],
    );
    expect(rows).toEqual([]);
  });

  it.each(Array.from({ length: 8 }, (_, round) => round + 1))(
    'stays when two leads leave, step down or remove each other at once (round %i)',
    async (round) => {
      const other = await joinStudio(database, lead, 'lead');
      const second = await enterStudio(other.person, house.studio.id);
      const acts = [
        [() => removeStaff(lead, lead.person.id), () => removeStaff(second, second.person.id)],
        [
          () => changeStaffRole(lead, lead.person.id, { role: 'designer' }),
          () => changeStaffRole(second, second.person.id, { role: 'designer' }),
        ],
        [() => removeStaff(lead, second.person.id), () => removeStaff(second, lead.person.id)],
        [
          () => removeStaff(lead, second.person.id),
          () => changeStaffRole(second, lead.person.id, { role: 'producer' }),
        ],
      ][round % 4];
      await Promise.allSettled(acts.map((act) => act()));
      expect(await leads()).toBe(1);
    },
  );
});
