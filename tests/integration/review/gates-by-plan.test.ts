import { beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { verifyWorkspace } from '@/lib/audit/verify-workspace';
import { jobContext, personContext, type WorkspaceContext } from '@/lib/auth/context';
import { enterWorkspace } from '@/lib/auth/enter';
import { sweepGates } from '@/lib/jobs/sweep-gates';
import { endStandIn } from '@/lib/review/end-stand-in';
import { listStandIns } from '@/lib/review/list-stand-ins';
import { lookAfterGates } from '@/lib/review/look-after-gates';
import { nameStandIn } from '@/lib/review/name-stand-in';
import { settleThread } from '@/lib/review/settle-thread';
import { signGate } from '@/lib/review/sign-gate';
import { viewRevision } from '@/lib/review/view-revision';
import { viewToday } from '@/lib/review/view-today';
import { removeStaff } from '@/lib/studio/remove-staff';
import { changeMemberRole } from '@/lib/workspaces/change-member-role';
import { removeMember } from '@/lib/workspaces/remove-member';
import { dayIn } from '@/lib/time/day-in';
import { freshDatabase, type FreshDatabase } from '@/tests/support/database';
import { entries, gateOf, mailsOf, postChecked, raise, shown, sign } from '@/tests/support/factory';
import { joinStudio, joinWorkspace, makeHouse, type House, type SignedIn } from '@/tests/support/make-house';
import { formingGate, peopleGate, setPlan } from '@/tests/support/plans';
import { refusedIn } from '@/tests/support/refused';

let database: FreshDatabase;
let house: House;
let lead: WorkspaceContext;
let approver: WorkspaceContext;
beforeAll(async () => {
  database = await freshDatabase();
});
beforeEach(async () => {
  house = await makeHouse(database);
  [lead, approver] = [await house.enter('lead'), await house.enter('approver')];
});

const refused = refusedIn(() => ({ database, house }));
const enter = ({ person }: SignedIn) => enterWorkspace(person, house.workspace.id);
const another = async () => enter(await joinWorkspace(database, lead, 'approver'));
const gate = (ctx: WorkspaceContext, revisionId: string) => gateOf(ctx, revisionId, 'client');
const today = () => dayIn('Europe/Lisbon');
const daysOn = (days: number) =>
  new Date(Date.parse(`${today()}T12:00:00Z`) + days * 86_400_000).toISOString().slice(0, 10);
const signItems = async (ctx: WorkspaceContext) =>
  (await viewToday(personContext(ctx.person))).items.filter(({ kind }) => kind === 'sign');
const sound = async () =>
  expect((await verifyWorkspace(jobContext(house.workspace.id), { objects: false })).faults).toEqual([]);

describe('a quorum', () => {
  it('of two waits for two names', async () => {
    const second = await another();
    await setPlan(lead, [formingGate, peopleGate({ quorum: 2 })]);
    const { revisionId } = await postChecked(house);
    expect(await sign(approver, revisionId)).toMatchObject({ gatePassed: false, locked: false });
    expect(await gate(lead, revisionId)).toMatchObject({ quorum: 2, awaited: [second.person.name] });
    expect(await sign(second, revisionId)).toMatchObject({ gatePassed: true, locked: true });
    await sound();
  });

  it('of everybody waits for each, and no longer for who has left', async () => {
    const second = await another();
    const third = await another();
    await setPlan(lead, [formingGate, peopleGate({ quorum: 'all' })]);
    const { revisionId } = await postChecked(house);
    await sign(approver, revisionId);
    expect(await gate(lead, revisionId)).toMatchObject({ quorum: 3, everybody: true });
    await changeMemberRole(lead, second.person.id, { role: 'reviewer' });
    expect((await gate(lead, revisionId)).awaited).toEqual([third.person.name]);
    // They leave by themselves, and nobody has to come by for the gate to pass.
    await removeMember(third, third.person.id);
    const view = await viewRevision(lead, revisionId);
    expect(view).toMatchObject({ state: 'approved', lockedAt: expect.any(String) });
    const told = await mailsOf(database, house.workspace.id, 'revision-signed');
    expect(told.filter(({ payload }) => payload.locked).map(({ person }) => person)).toContain(
      approver.person.id,
    );
    const passed = (await entries(database, house.workspace.id, 10)).find(
      ({ action }) => action === 'gate.passed',
    );
    expect(passed?.detail.asked).toEqual([{ id: approver.person.id, name: approver.person.name }]);
    await sound();
  });

  it('of everybody locks nothing that nobody signed, whoever leaves', async () => {
    const second = await another();
    await setPlan(lead, [formingGate, peopleGate({ quorum: 'all' })]);
    const { revisionId } = await postChecked(house);
    await sign(approver, revisionId);
    const thread = await raise(second, revisionId, 'The rim is too thin.', { mustSettle: true });
    await removeMember(second, second.person.id);
    expect(await viewRevision(lead, revisionId)).toMatchObject({ state: 'in_review', lockedAt: null });
    await settleThread(approver, thread.id, { settled: true, version: thread.version });
    // Settled, but the only signature stands on the docket of before.
    await sweepGates();
    expect(await viewRevision(lead, revisionId)).toMatchObject({ state: 'in_review', lockedAt: null });
    expect(await gate(lead, revisionId)).toMatchObject({ held: true, short: false, awaited: [] });
    const told = await mailsOf(database, house.workspace.id, 'gate-short');
    expect(told).toEqual([
      { person: lead.person.id, payload: expect.objectContaining({ held: true, have: 1, left: 0 }) },
    ]);
    expect((await sign(await another(), revisionId)).locked).toBe(true);
    await sound();
  });

  it('of everybody at a gate before the last waits for open items, then passes by itself', async () => {
    const second = await another();
    await setPlan(lead, [
      formingGate,
      peopleGate({ key: 'first', name: 'First', quorum: 'all' }),
      peopleGate(),
    ]);
    const { revisionId } = await postChecked(house);
    await sign(approver, revisionId);
    const thread = await raise(second, revisionId, 'The rim is too thin.', { mustSettle: true });
    await removeMember(second, second.person.id);
    expect((await gateOf(lead, revisionId, 'first')).state).toBe('open');
    await settleThread(approver, thread.id, { settled: true, version: thread.version });
    expect((await gateOf(lead, revisionId, 'first')).state).toBe('passed');
    expect((await sign(approver, revisionId)).locked).toBe(true);
    await sound();
  });

  it('tells the leads when the last who may sign leaves, once, and passes when somebody joins and signs', async () => {
    await setPlan(lead, [formingGate, peopleGate()]);
    const { revisionId } = await postChecked(house);
    expect((await gate(lead, revisionId)).short).toBe(false);
    await removeMember(lead, approver.person.id);
    expect(await gate(lead, revisionId)).toMatchObject({ short: true, awaited: [] });
    await sweepGates();
    const told = await mailsOf(database, house.workspace.id, 'gate-short');
    expect(told).toEqual([
      {
        person: lead.person.id,
        payload: expect.objectContaining({ gateName: 'Client', needed: 1, left: 0 }),
      },
    ]);
    expect((await sign(await another(), revisionId)).locked).toBe(true);
  });

  it('tells them too when staff leave the studio', async () => {
    const second = await joinStudio(database, await house.enterStudio('lead'), 'designer');
    const named = peopleGate({ key: 'studio', name: 'Studio', people: [second.person.id] });
    await setPlan(lead, [formingGate, named, peopleGate()]);
    const { revisionId } = await postChecked(house);
    expect((await gateOf(lead, revisionId, 'studio')).awaited).toEqual([second.person.name]);
    await removeStaff(await house.enterStudio('lead'), second.person.id);
    expect((await mailsOf(database, house.workspace.id, 'gate-short')).map(({ person }) => person)).toEqual([
      lead.person.id,
    ]);
  });
});

describe('named people', () => {
  it('sign, whatever others of their role would', async () => {
    const second = await another();
    await setPlan(lead, [formingGate, peopleGate({ people: [second.person.id] })]);
    const { revisionId } = await postChecked(house);
    const { id, awaited } = await gate(lead, revisionId);
    expect(awaited).toEqual([second.person.name]);
    const seen = await shown(approver, revisionId);
    await refused(() => signGate(approver, id, seen), {
      code: 'forbidden',
      reason: 'role',
      message: expect.stringContaining('whom the gate plan names'),
    });
    expect([(await signItems(approver)).length, (await signItems(second)).length]).toEqual([0, 1]);
    expect((await sign(second, revisionId)).locked).toBe(true);
  });
});

describe('an automatic gate for the docket', () => {
  it('passes when the last item is settled, and the people after it are asked then', async () => {
    await setPlan(lead, [
      { kind: 'automatic', name: 'Docket', conditions: ['checks-pass', 'docket-settled'] },
      peopleGate(),
    ]);
    const open = await postChecked(house);
    expect((await gateOf(lead, open.revisionId, 'docket')).state).toBe('passed');
    // The next revision carries an item, so that its gate waits.
    const thread = await raise(approver, open.revisionId, 'Wider, please.', { mustSettle: true });
    const { revisionId } = await postChecked(house, { templateId: open.templateId });
    expect((await gateOf(lead, revisionId, 'docket')).state).toBe('open');
    const mails = async () =>
      (await mailsOf(database, house.workspace.id, 'gate-waits')).filter(
        ({ payload }) => payload.letter === 'B',
      );
    expect(await mails()).toEqual([]);
    await settleThread(approver, thread.id, { settled: true, version: thread.version });
    expect((await gateOf(lead, revisionId, 'docket')).state).toBe('passed');
    expect((await mails()).map(({ person }) => person)).toEqual([approver.person.id]);
  });
});

describe('a due day', () => {
  it('counts from the opening, in the workspace’s zone, and stands on the gate and on Today', async () => {
    await database.query(`update workspaces set time_zone = 'Pacific/Auckland' where id = $1`, [
      house.workspace.id,
    ]);
    await setPlan(lead, [formingGate, peopleGate({ dueDays: 2 })]);
    const { revisionId } = await postChecked(house);
    const { openedAt, dueOn } = await gate(lead, revisionId);
    const opened = dayIn('Pacific/Auckland', new Date(openedAt!));
    expect((Date.parse(dueOn!) - Date.parse(opened)) / 86_400_000).toBe(2);
    expect((await signItems(approver)).map((item) => item.dueOn)).toEqual([dueOn]);
    const [mail] = await mailsOf(database, house.workspace.id, 'gate-waits');
    expect(mail.payload.dueOn).toBe(dueOn);
  });

  it('is reminded of once the day before and once on the day, to those who are still asked', async () => {
    const second = await another();
    await setPlan(lead, [formingGate, peopleGate({ quorum: 2, dueDays: 5 })]);
    const { revisionId } = await postChecked(house);
    const { dueOn } = await gate(lead, revisionId);
    const sweep = async (day: string, hour = '12') => {
      for (let times = 0; times < 2; times++)
        await lookAfterGates(jobContext(house.workspace.id), new Date(`${day}T${hour}:00:00Z`));
      return (await mailsOf(database, house.workspace.id, 'gate-due')).map(({ person, payload }) => [
        person,
        payload.when,
      ]);
    };
    expect(await sweep(daysOn(3))).toEqual([]);
    expect(await sweep(daysOn(4), '03')).toEqual([]);
    const before = await sweep(daysOn(4));
    expect(before.sort()).toEqual(
      [
        [approver.person.id, 'tomorrow'],
        [second.person.id, 'tomorrow'],
      ].sort(),
    );
    await sign(second, revisionId);
    const after = await sweep(dueOn!);
    expect(after).toHaveLength(3);
    expect(after.at(-1)).toEqual([approver.person.id, 'today']);
    expect(await sweep(daysOn(6))).toHaveLength(3);
  });
});

describe('a stand-in', () => {
  const named = async () => {
    const second = await another();
    await setPlan(lead, [formingGate, peopleGate({ people: [approver.person.id], dueDays: 1 })]);
    return second;
  };
  const away = { fromOn: '', untilOn: '' };
  beforeEach(() => Object.assign(away, { fromOn: today(), untilOn: daysOn(3) }));

  it('signs for who is away, and the signature says so for ever after', async () => {
    const second = await named();
    const { revisionId } = await postChecked(house);
    expect(await signItems(second)).toEqual([]);
    await nameStandIn(approver, { standInId: second.person.id, ...away });
    expect((await listStandIns(await house.enter('reviewer'))).standIns).toMatchObject([
      {
        away: { name: approver.person.name },
        standIn: { name: second.person.name },
        now: true,
        mayEnd: false,
      },
    ]);
    expect(
      (await mailsOf(database, house.workspace.id, 'stand-in-named')).map(({ person }) => person),
    ).toEqual([second.person.id]);
    expect((await gate(lead, revisionId)).awaited).toEqual([
      `${approver.person.name} (away; ${second.person.name} signs for them)`,
    ]);
    expect((await signItems(second))[0].text).toContain(`, for ${approver.person.name}`);
    expect((await viewRevision(second, revisionId)).can.sign?.standsFor).toBe(approver.person.name);
    const { signature, locked } = await sign(second, revisionId);
    expect({ locked, signedFor: signature.signedFor, name: signature.printedName }).toEqual({
      locked: true,
      signedFor: approver.person.name,
      name: second.person.name,
    });
    const signed = (await entries(database, house.workspace.id, 10)).find(
      ({ action }) => action === 'gate.signed',
    );
    expect(signed?.detail.signedFor).toEqual({ id: approver.person.id, name: approver.person.name });
    await sound();
    await database.query('alter table signatures disable trigger all');
    await database.query(`update signatures set signed_for_name = 'Somebody Else' where revision_id = $1`, [
      revisionId,
    ]);
    await database.query('alter table signatures enable trigger all');
    const { faults } = await verifyWorkspace(jobContext(house.workspace.id), { objects: false });
    expect(faults.join(' ')).toContain('is not as the audit chain has it');
  });

  it('has no right before the first day, after the last, once it is ended, or with another role', async () => {
    const second = await named();
    const { revisionId } = await postChecked(house);
    const mayNot = async () => {
      expect((await viewRevision(second, revisionId)).can.sign).toBeNull();
      expect(await signItems(second)).toEqual([]);
    };
    const later = await nameStandIn(approver, {
      standInId: second.person.id,
      fromOn: daysOn(1),
      untilOn: daysOn(2),
    });
    await mayNot();
    await endStandIn(approver, later.id);
    const now = await nameStandIn(approver, { standInId: second.person.id, ...away });
    expect((await viewRevision(second, revisionId)).can.sign).not.toBeNull();
    const { id } = await gate(lead, revisionId);
    const seen = await shown(second, revisionId);
    await endStandIn(lead, now.id);
    await mayNot();
    await refused(() => signGate(second, id, seen), { code: 'forbidden', reason: 'role' });
    // Ended twice changes nothing.
    const before = (await entries(database, house.workspace.id, 50)).length;
    await endStandIn(lead, now.id);
    expect((await entries(database, house.workspace.id, 50)).length).toBe(before);
    await nameStandIn(approver, { standInId: second.person.id, ...away });
    await changeMemberRole(lead, second.person.id, { role: 'reviewer' });
    expect((await listStandIns(lead)).standIns).toEqual([]);
  });

  it('never signs for the author under four eyes, and signs in their own right where they have one', async () => {
    const atStudio = await house.enterStudio('lead');
    const second = await enter(await joinStudio(database, atStudio, 'designer'));
    const designer = await house.enter('designer');
    const only = peopleGate({ key: 'studio', name: 'Studio', people: [designer.person.id, lead.person.id] });
    await setPlan(lead, [formingGate, only, peopleGate()]);
    await nameStandIn(designer, { standInId: second.person.id, ...away });
    const posted = await postChecked(house);
    const { id } = await gateOf(lead, posted.revisionId, 'studio');
    const seen = await shown(second, posted.revisionId);
    await refused(() => signGate(second, id, seen), {
      code: 'forbidden',
      reason: 'four-eyes',
      message: expect.stringContaining(`You stand in for ${designer.person.name}, who posted`),
    });
    expect(await signItems(second)).toEqual([]);
    await setPlan(lead, [
      formingGate,
      peopleGate({ key: 'studio', name: 'Studio', roles: ['designer', 'lead'] }),
      peopleGate(),
    ]);
    const next = await postChecked(house, { templateId: posted.templateId });
    const { signature } = await sign(second, next.revisionId);
    expect(signature.signedFor).toBeNull();
  });

  it('stands for both where everybody signs', async () => {
    const second = await another();
    await setPlan(lead, [formingGate, peopleGate({ quorum: 'all' })]);
    await nameStandIn(approver, { standInId: second.person.id, ...away });
    const { revisionId } = await postChecked(house);
    const { signature, locked } = await sign(second, revisionId);
    expect({ locked, signedFor: signature.signedFor }).toEqual({
      locked: true,
      signedFor: approver.person.name,
    });
    await sound();
  });

  it('who has left keeps nobody from naming another for the same days, and does not come back beside them', async () => {
    const second = await another();
    const third = await another();
    await nameStandIn(approver, { standInId: second.person.id, ...away });
    await removeMember(lead, second.person.id);
    expect((await listStandIns(approver)).standIns).toEqual([]);
    await nameStandIn(approver, { standInId: third.person.id, ...away });
    const { rows } = await database.query<{ id: string }>(
      'select stand_in_id as id from stand_ins where workspace_id = $1 and ended_at is null',
      [house.workspace.id],
    );
    expect(rows).toEqual([{ id: third.person.id }]);
    const ended = (await entries(database, house.workspace.id, 5)).find(
      ({ action }) => action === 'stand-in.ended',
    );
    expect(ended?.detail).toMatchObject({
      personName: approver.person.name,
      standInName: 'somebody who has left',
    });
  });

  it('has the same role, and stands for one person at a time', async () => {
    const second = await another();
    const third = await another();
    const reviewer = await house.enter('reviewer');
    const name = (ctx: WorkspaceContext, standIn: WorkspaceContext, days: Partial<typeof away> = {}) =>
      nameStandIn(ctx, { standInId: standIn.person.id, ...away, ...days });
    await refused(() => name(approver, lead), { code: 'invalid' });
    await refused(() => name(approver, approver), { code: 'invalid' });
    await refused(() => name(reviewer, reviewer), { code: 'forbidden' });
    await refused(() => name(approver, second, { fromOn: daysOn(-1) }), { code: 'invalid' });
    await refused(() => name(approver, second, { untilOn: daysOn(-1) }), { code: 'invalid' });
    await refused(() => name(approver, second, { untilOn: daysOn(200) }), { code: 'invalid' });
    const outsider = (await makeHouse(database)).people.approver.person.id;
    await refused(() => nameStandIn(approver, { standInId: outsider, ...away }), { code: 'invalid' });

    const made = await Promise.all([name(approver, second), name(approver, second)]);
    expect(made[0].id).toBe(made[1].id);
    await refused(() => name(approver, third), { code: 'conflict', reason: 'away-already' });
    await refused(() => name(second, third), { code: 'conflict', reason: 'stands-in' });
    await refused(() => name(third, second), { code: 'conflict', reason: 'stands-already' });
    await refused(() => name(third, approver), { code: 'conflict', reason: 'stand-in-away' });
    await name(third, second, { fromOn: daysOn(4), untilOn: daysOn(5) });
    await refused(() => endStandIn(third, made[0].id), { code: 'forbidden' });
    await endStandIn(second, made[0].id);
  });
});
