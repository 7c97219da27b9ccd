import { beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { GET, PUT } from '@/app/api/v1/workspaces/[workspace]/gate-plan/route';
import { withTenant } from '@/db/tenant';
import { lockHead } from '@/lib/audit/data';
import { verifyWorkspace } from '@/lib/audit/verify-workspace';
import { jobContext } from '@/lib/auth/context';
import { queueLive } from '@/lib/jobs/queue-live';
import { tell } from '@/lib/review/activity-words';
import { viewRevision } from '@/lib/review/view-revision';
import { changeGatePlan } from '@/lib/workspaces/change-gate-plan';
import { readGatePlan, readGatePlans } from '@/lib/workspaces/read-gate-plan';
import { roles } from '@/lib/workspaces/roles';
import { callRoute } from '@/tests/support/call-route';
import { freshDatabase, type FreshDatabase } from '@/tests/support/database';
import { entries, post, postChecked } from '@/tests/support/factory';
import { joinStudio, joinWorkspace, makeHouse, type House } from '@/tests/support/make-house';
import { formingGate, peopleGate, setPlan } from '@/tests/support/plans';
import { refusedIn } from '@/tests/support/refused';

let database: FreshDatabase;
let house: House;
beforeAll(async () => {
  database = await freshDatabase();
});
beforeEach(async () => {
  house = await makeHouse(database);
});

const refused = refusedIn(() => ({ database, house }));
const studio = peopleGate({ key: 'studio', name: 'Studio', roles: ['designer', 'lead'] });
const plan = { gates: [formingGate, studio, peopleGate({ dueDays: 5 })] };

describe('changeGatePlan', () => {
  it('makes the next version, says what changed, and keeps the one before', async () => {
    const lead = await house.enter('lead');
    const made = await changeGatePlan(lead, 1, plan);
    expect(made).toMatchObject({ number: 2, madeBy: lead.person.name });
    expect(made.gates.map(({ key }) => key)).toEqual(['forming', 'studio', 'client']);
    expect(await readGatePlan(await house.enter('reviewer'))).toEqual(made);

    const [entry] = await entries(database, house.workspace.id, 1);
    expect(entry).toMatchObject({
      action: 'gate-plan.changed',
      detail: {
        number: 2,
        before: {
          number: 1,
          gates: [{ key: 'forming' }, { key: 'studio' }, { key: 'client', dueDays: null }],
        },
        after: { number: 2, gates: [{ key: 'forming' }, { key: 'studio' }, { key: 'client', dueDays: 5 }] },
        endsWithoutClient: false,
      },
    });
    expect(
      tell({ ...entry, subjectKind: 'gate-plan', subjectId: entry.subject_id }, { slug: 'x', number: '' }),
    ).toEqual({
      text: expect.stringContaining('changed the gate plan to version 2: '),
      path: '/w/x/gate-plan',
    });
    const versions = await readGatePlans(await house.enter('approver'));
    expect(versions.map(({ number }) => number)).toEqual([2, 1]);
    expect(versions[0].changes).toContain('Client: due 5 days after it opens');
    expect(versions[1]).toMatchObject({ madeBy: lead.person.name, changes: [] });

    const { rows } = await database.query(
      `select payload->>'name' as name, payload->'data' as data from outbox
       where workspace_id = $1 and payload->>'name' = 'gate-plan.changed'`,
      [house.workspace.id],
    );
    expect(rows).toEqual([{ name: 'gate-plan.changed', data: { id: house.workspace.id, version: 2 } }]);
  });

  it.each(roles.filter((role) => role !== 'lead'))('is not for a %s', async (role) => {
    const ctx = await house.enter(role);
    await refused(() => changeGatePlan(ctx, 1, plan), { code: 'forbidden' });
  });

  it('is refused for a version that somebody has changed meanwhile', async () => {
    const lead = await house.enter('lead');
    await changeGatePlan(lead, 1, plan);
    await refused(() => changeGatePlan(lead, 1, { gates: [peopleGate()] }), {
      code: 'precondition_failed',
    });
    await refused(() => changeGatePlan(lead, 7, { gates: [peopleGate()] }), {
      code: 'precondition_failed',
    });
  });

  it('makes one version of a double click, and of two leads at once one of them', async () => {
    const lead = await house.enter('lead');
    const twice = await Promise.all([changeGatePlan(lead, 1, plan), changeGatePlan(lead, 1, plan)]);
    expect(twice.map(({ number }) => number)).toEqual([2, 2]);
    const raced = await Promise.allSettled([
      changeGatePlan(lead, 2, { gates: [peopleGate({ meaning: 'Mine.' })] }),
      changeGatePlan(lead, 2, { gates: [peopleGate({ meaning: 'No, mine.' })] }),
    ]);
    expect(raced.map(({ status }) => status).sort()).toEqual(['fulfilled', 'rejected']);
    const { rows } = await database.query(
      `select (select array_agg(number order by number) from gate_plans where workspace_id = $1) as plans,
         (select count(*)::int from audit_entries where workspace_id = $1 and action = 'gate-plan.changed') as told`,
      [house.workspace.id],
    );
    expect(rows).toEqual([{ plans: [1, 2, 3], told: 2 }]);
  });

  it('names where a plan cannot stand', async () => {
    const lead = await house.enter('lead');
    const outsider = (await makeHouse(database)).people.approver.person.id;
    await refused(() => changeGatePlan(lead, 1, { gates: [studio, peopleGate({ quorum: 2 })] }), {
      code: 'invalid',
      message: expect.stringContaining('Client asks for 2 signatures, but one person could'),
      errors: [{ pointer: '/gates/1/quorum', detail: expect.any(String) }],
    });
    await refused(() => changeGatePlan(lead, 1, { gates: [peopleGate({ people: [outsider] })] }), {
      code: 'invalid',
      errors: expect.arrayContaining([
        { pointer: '/gates/0/people', detail: expect.stringContaining('does not belong') },
      ]),
    });
    await refused(() => changeGatePlan(lead, 1, { gates: [peopleGate(), studio] }), {
      code: 'invalid',
      errors: [{ pointer: '/gates/1/roles', detail: expect.stringContaining('ends without the client') }],
    });
    await refused(() => changeGatePlan(lead, 1, { gates: [formingGate] }), { code: 'invalid' });
    expect(
      (await changeGatePlan(lead, 1, { gates: [peopleGate(), studio], endsWithoutClient: true })).number,
    ).toBe(2);
  });

  it('shows a named person by name, and as gone when they have left', async () => {
    const lead = await house.enter('lead');
    const second = await joinWorkspace(database, lead, 'approver');
    const named = [house.people.approver.person.id, second.person.id];
    await setPlan(lead, [peopleGate({ people: named, quorum: 'all' })]);
    const [gate] = (await readGatePlan(lead)).gates;
    expect(gate.people.map(({ name }) => name)).toEqual([
      house.people.approver.person.name,
      second.person.name,
    ]);
    await database.query('delete from members where workspace_id = $1 and user_id = $2', [
      house.workspace.id,
      second.person.id,
    ]);
    expect((await readGatePlan(lead)).gates[0].people[1]).toEqual({ id: second.person.id, name: null });
  });
});

describe('a version that a superuser changed', () => {
  it('is found by the verifier, and so is one that is missing or was never made', async () => {
    const lead = await house.enter('lead');
    await changeGatePlan(lead, 1, plan);
    const faults = async () =>
      (await verifyWorkspace(jobContext(house.workspace.id), { objects: false })).faults;
    const unguarded = async (sql: string) => {
      await database.query('alter table gate_plans disable trigger user');
      await database.query(sql, [house.workspace.id]);
      await database.query('alter table gate_plans enable trigger user');
    };
    expect(await faults()).toEqual([]);
    await unguarded(
      `update gate_plans set gates = jsonb_set(gates, '{2,quorum}', '9') where workspace_id = $1 and number = 2`,
    );
    expect(await faults()).toEqual(['gate plan 2: it is not as the audit chain has it']);
    await unguarded(`update gate_plans set id = gen_random_uuid() where workspace_id = $1 and number = 2`);
    expect(await faults()).toEqual([
      'gate plan 2: it has no entry in the audit chain',
      expect.stringMatching(/^gate plan 2 of entry \d+ is missing$/),
    ]);
  });
});

describe('a revision', () => {
  it('in review keeps the plan that it started with; the next one gets the new one', async () => {
    const lead = await house.enter('lead');
    const running = await postChecked(house);
    await setPlan(lead, [formingGate, peopleGate({ name: 'Customer', dueDays: 3 })]);
    const before = await viewRevision(lead, running.revisionId);
    expect(before.gates.map(({ name }) => name)).toEqual(['Forming', 'Studio', 'Client']);
    expect(before.gates.map(({ dueOn }) => dueOn)).toEqual([null, null, null]);
    const { revisionId } = await post(await house.enter('designer'), running.templateId);
    const after = await viewRevision(lead, revisionId);
    expect(after.gates.map(({ name }) => name)).toEqual(['Forming', 'Customer']);
  });
});

describe('a change and a command that holds the chain’s head', () => {
  it('do not wait for each other in a ring', async () => {
    const lead = await house.enter('lead');
    const approver = await house.enter('approver');
    const blocked = async () => {
      const { rows } = await database.query<{ n: number }>(
        `select count(*)::int as n from pg_stat_activity
         where datname = current_database() and cardinality(pg_blocking_pids(pid)) > 0`,
      );
      return rows[0].n > 0;
    };
    let change: Promise<{ number: number }> | undefined;
    await withTenant(approver, async (tx) => {
      await lockHead(tx, house.workspace.id);
      change = changeGatePlan(lead, 1, plan);
      while (!(await blocked()));
      // Refers to the workspace, whose row the change holds by now.
      await queueLive(tx, approver, { name: 'people.changed', data: { id: house.workspace.id } });
    });
    expect((await change)?.number).toBe(2);
  });
});

describe('the route', () => {
  const call = (method: 'GET' | 'PUT', cookie: string, headers = {}, body?: unknown) =>
    callRoute(method === 'GET' ? GET : PUT, {
      method,
      cookie,
      headers,
      body,
      params: { workspace: house.workspace.slug },
    });

  it('takes the version in If-Match and gives the next one as ETag', async () => {
    const { cookie } = house.people.lead;
    const read = await call('GET', cookie);
    expect(read.headers.get('etag')).toBe('"1"');
    expect((await call('PUT', cookie, {}, plan)).status).toBe(428);
    const changed = await call('PUT', cookie, { 'if-match': '"1"' }, plan);
    expect([changed.status, changed.headers.get('etag')]).toEqual([200, '"2"']);
    expect((await call('PUT', cookie, { 'if-match': '"1"' }, { gates: [peopleGate()] })).status).toBe(412);
    const wrong = await call('PUT', cookie, { 'if-match': '"2"' }, { gates: [peopleGate({ quorum: 3 })] });
    expect(wrong.status).toBe(422);
    expect(await wrong.json()).toMatchObject({ errors: [{ pointer: '/gates/0/quorum' }] });
  });

  it('is another tenant’s for people of another house', async () => {
    const other = await makeHouse(database);
    expect((await call('PUT', other.people.lead.cookie, { 'if-match': '"1"' }, plan)).status).toBe(404);
    expect((await call('GET', other.people.lead.cookie)).status).toBe(404);
  });
});

describe('more staff', () => {
  it('make a larger quorum possible', async () => {
    const lead = await house.enter('lead');
    const two = peopleGate({ key: 'studio', name: 'Studio', roles: ['designer', 'lead'], quorum: 2 });
    await refused(() => setPlan(lead, [two, peopleGate()]), {
      code: 'invalid',
      message: expect.stringContaining('an author never signs'),
    });
    await joinStudio(database, await house.enterStudio('lead'), 'designer');
    expect((await setPlan(lead, [two, peopleGate()])).number).toBe(2);
  });
});
