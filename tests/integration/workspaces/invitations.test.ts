import { Client } from 'pg';
import { beforeAll, describe, expect, it } from 'vitest';
import { GET as readRoute } from '@/app/api/v1/invitations/[invitation]/route';
import { POST as acceptRoute } from '@/app/api/v1/invitations/[invitation]/accept/route';
import type { StudioContext, WorkspaceContext } from '@/lib/auth/context';
import { enterWorkspace } from '@/lib/auth/enter';
import { removeStaff } from '@/lib/studio/remove-staff';
import { inviteToStudio } from '@/lib/studio/invite-to-studio';
import { createWorkspace } from '@/lib/workspaces/create-workspace';
import { cancelInvitation } from '@/lib/workspaces/cancel-invitation';
import { inviteToWorkspace } from '@/lib/workspaces/invite-to-workspace';
import { removeMember } from '@/lib/workspaces/remove-member';
import { listPeople } from '@/lib/workspaces/list-people';
import { callRoute, cookieOf } from '@/tests/support/call-route';
import { freshDatabase, type FreshDatabase } from '@/tests/support/database';
import {
  joinStudio,
  makeHouse,
  makePerson,
  signIn,
  testPassword,
  tokenOf,
  type House,
} from '@/tests/support/make-house';

let database: FreshDatabase;
let house: House;
let lead: WorkspaceContext;
let atStudio: StudioContext;
let number = 0;
const newEmail = () => `invited.${++number}@example.test`;
const newcomer = { name: 'Nora New', password: testPassword };

beforeAll(async () => {
  database = await freshDatabase();
  house = await makeHouse(database);
  lead = await house.enter('lead');
  atStudio = await house.enterStudio('lead');
});

const read = (invitation: string) => callRoute(readRoute, { params: { invitation } });
const accept = (invitation: string, body: unknown, cookie?: string) =>
  callRoute(acceptRoute, { params: { invitation }, body, cookie });
const reasonOf = async (answer: Response) =>
  ((await answer.json()) as { type: string }).type.replace('/problems/', '');
const memberships = async (email: string) =>
  (
    await database.query<{ role: string }>(
      'select m.role from members m join users u on u.id = m.user_id where u.email = $1',
      [email],
    )
  ).rows;
async function invite(role: 'reviewer' | 'approver' = 'approver', email = newEmail()) {
  const { id } = await inviteToWorkspace(lead, { email, role });
  return { id, email, token: await tokenOf(database, id) };
}
const refusal = (reason: string) => ({ reason });

describe('inviting a client', () => {
  it('writes the invitation, its mail, its audit entry and its live event together', async () => {
    const { id, email, token } = await invite('reviewer');
    const mail = await database.query<{ payload: Record<string, unknown>; workspace_id: string }>(
      'select payload, workspace_id from outbox where dedupe_key = $1',
      [`invitation:${id}`],
    );
    expect(mail.rows).toMatchObject([
      {
        workspace_id: house.workspace.id,
        payload: {
          template: 'invitation',
          to: { email },
          role: 'reviewer',
          workspaceName: house.workspace.name,
          path: `/join/${token}`,
        },
      },
    ]);
    const entry = await database.query(
      `select action, actor_name, detail->>'email' as email from audit_entries where subject_id = $1`,
      [id],
    );
    expect(entry.rows).toEqual([{ action: 'person.invited', actor_name: lead.person.name, email }]);
    const live = await database.query(
      `select 1 from outbox where kind = 'live' and payload->>'name' = 'people.changed' and workspace_id = $1`,
      [house.workspace.id],
    );
    expect(live.rows.length).toBeGreaterThan(0);
    const { rows } = await database.query<{ row: string }>(
      'select i::text as row from invitations i where id = $1',
      [id],
    );
    expect(rows[0].row).not.toContain(token.split('.')[1]);
  });

  it.each(['designer', 'producer', 'reviewer', 'approver'] as const)('is not for a %s', async (role) => {
    const ctx = await house.enter(role);
    const before = await database.query<{ n: number }>('select count(*)::int as n from invitations');
    await expect(inviteToWorkspace(ctx, { email: newEmail(), role: 'reviewer' })).rejects.toMatchObject({
      code: 'forbidden',
    });
    const after = await database.query<{ n: number }>('select count(*)::int as n from invitations');
    expect(after.rows).toEqual(before.rows);
  });

  it.each(['lead', 'designer', 'producer', 'owner', ''])('gives no role %j', async (role) => {
    await expect(inviteToWorkspace(lead, { email: newEmail(), role })).rejects.toMatchObject({
      code: 'invalid',
    });
  });

  it('refuses an address that is here already, also in capitals', async () => {
    const approver = house.people.approver.person.email.toUpperCase();
    await expect(inviteToWorkspace(lead, { email: approver, role: 'reviewer' })).rejects.toMatchObject(
      refusal('already-member'),
    );
  });

  it('refuses the studio’s own staff: they cannot sign for the client', async () => {
    const { email } = house.people.designer.person;
    await expect(inviteToWorkspace(lead, { email, role: 'approver' })).rejects.toMatchObject(
      refusal('studio-staff'),
    );
  });

  it('refuses a second open invitation, and sends another once the first has run out', async () => {
    const { id, email } = await invite();
    await expect(inviteToWorkspace(lead, { email, role: 'approver' })).rejects.toMatchObject(
      refusal('already-invited'),
    );
    await database.query(`update invitations set expires_at = now() - interval '1 minute' where id = $1`, [
      id,
    ]);
    const again = await inviteToWorkspace(lead, { email, role: 'reviewer' });
    const { invitations } = await listPeople(lead);
    expect(invitations.filter((one) => one.email === email).map((one) => one.id)).toEqual([again.id]);
  });

  it('leaves one open invitation when two leads invite at once', async () => {
    const email = newEmail();
    const other = await joinStudio(database, atStudio, 'lead');
    const second = await enterWorkspace(other.person, house.workspace.id);
    const outcomes = await Promise.allSettled([
      inviteToWorkspace(lead, { email, role: 'approver' }),
      inviteToWorkspace(second, { email, role: 'approver' }),
    ]);
    expect(outcomes.map((outcome) => outcome.status).sort()).toEqual(['fulfilled', 'rejected']);
    const { rows } = await database.query(
      `select 1 from invitations where email = $1 and status = 'pending'`,
      [email],
    );
    expect(rows).toHaveLength(1);
  });

  it('shows open invitations to leads alone, and tokens to nobody', async () => {
    const { token } = await invite();
    const seen = await listPeople(lead);
    expect(seen.invitations.length).toBeGreaterThan(0);
    expect(JSON.stringify(seen)).not.toContain(token.split('.')[1]);
    for (const role of ['designer', 'producer', 'reviewer', 'approver'] as const)
      expect((await listPeople(await house.enter(role))).invitations).toEqual([]);
  });
});

describe('reading an invitation', () => {
  it('tells the holder of the link what it is for', async () => {
    const { email, token } = await invite();
    const answer = await read(token);
    expect(answer.headers.get('cache-control')).toBe('private, no-store');
    expect(await answer.json()).toMatchObject({
      workspaceName: house.workspace.name,
      studioName: house.studio.name,
      role: 'approver',
      email,
      state: 'pending',
      hasAccount: false,
    });
  });

  it('answers alike for the bare id, a wrong secret, and no invitation', async () => {
    const { id } = await invite();
    const missing = '01a23182-fb41-7e71-9779-7364af2e607c';
    const wrong = 'A'.repeat(43);
    const answers = await Promise.all([id, `${id}.${wrong}`, `${missing}.${wrong}`, 'x'].map(read));
    expect(answers.map((answer) => answer.status)).toEqual([404, 404, 404, 404]);
    const bodies = await Promise.all(
      answers.map(async (answer) => ({ ...(await answer.json()), reference: '' })),
    );
    expect(new Set(bodies.map((body) => JSON.stringify(body))).size).toBe(1);
  });
});

describe('accepting an invitation', () => {
  it('makes a new person with a proven address, signs them in, and writes it down', async () => {
    const { id, email, token } = await invite('reviewer');
    const answer = await accept(token, newcomer);
    expect(await answer.json()).toEqual({ redirectTo: `/w/${house.workspace.slug}` });
    expect(cookieOf(answer)).toMatch(/^firstpull\.session_token=/);
    expect(await memberships(email)).toEqual([{ role: 'reviewer' }]);
    const { rows } = await database.query(
      `select action, actor_name, detail->>'role' as role from audit_entries where detail->>'invitationId' = $1`,
      [id],
    );
    expect(rows).toEqual([{ action: 'person.joined', actor_name: newcomer.name, role: 'reviewer' }]);
    expect(await (await read(token)).json()).toMatchObject({ state: 'accepted', hasAccount: true });
  });

  it('keeps the zone of a new person’s browser, or universal time', async () => {
    for (const [timeZone, kept] of [
      ['America/Toronto', 'America/Toronto'],
      ['Nowhere/Land', 'UTC'],
      [undefined, 'UTC'],
    ]) {
      const { email, token } = await invite();
      expect((await accept(token, { ...newcomer, timeZone })).status).toBe(200);
      const { rows } = await database.query('select time_zone from users where email = $1', [email]);
      expect(rows).toEqual([{ time_zone: kept }]);
    }
  });

  it('asks a new person for a name and a password', async () => {
    const { email, token } = await invite();
    const answer = await accept(token, {});
    expect(answer.status).toBe(422);
    expect(((await answer.json()) as { errors: { pointer: string }[] }).errors.map((e) => e.pointer)).toEqual(
      ['/name', '/password'],
    );
    for (const password of ['short', 'passwordpassword', `Nora-${email}`]) {
      const weak = await accept(token, { name: 'Nora', password });
      expect(weak.status).toBe(422);
      const { errors } = (await weak.json()) as { errors: { pointer: string }[] };
      expect(errors.map((error) => error.pointer)).toEqual(['/password']);
    }
    expect(await memberships(email)).toEqual([]);
  });

  it('works for a signed-in person whose address it names, who keeps what they have', async () => {
    const known = await makePerson(database, 'Known Person');
    const { token } = await invite('approver', known.person.email);
    expect(await (await read(token)).json()).toMatchObject({ hasAccount: true });
    const answer = await accept(token, {}, known.cookie);
    expect(answer.status).toBe(200);
    expect(answer.headers.getSetCookie()).toEqual([]);
    expect(await memberships(known.person.email)).toEqual([{ role: 'approver' }]);
  });

  it('asks a known person to sign in, and leaves their password alone', async () => {
    const known = await makePerson(database, 'Known Again');
    const { token } = await invite('approver', known.person.email);
    const answer = await accept(token, newcomer);
    expect(answer.status).toBe(401);
    expect(await memberships(known.person.email)).toEqual([]);
    const { rows } = await database.query('select name from users where id = $1', [known.person.id]);
    expect(rows).toEqual([{ name: 'Known Again' }]);
  });

  it('takes over a sign-up that never proved the address: whoever typed it may be somebody else', async () => {
    const email = newEmail();
    const squatter = await makePerson(database, 'Squatter');
    await database.query('update users set email = $1, email_verified = false where id = $2', [
      email,
      squatter.person.id,
    ]);
    const { token } = await invite('approver', email);
    const answer = await accept(token, { name: 'Rightful Owner', password: 'another fine long password' });
    expect(answer.status).toBe(200);
    const { rows } = await database.query(
      `select name, email_verified, (select count(*)::int from accounts a where a.user_id = u.id) as accounts,
         (select count(*)::int from sessions s where s.user_id = u.id) as sessions from users u where email = $1`,
      [email],
    );
    expect(rows).toEqual([{ name: 'Rightful Owner', email_verified: true, accounts: 1, sessions: 1 }]);
    await expect(signIn(email, testPassword)).rejects.toThrow();
  });

  it('is refused to somebody else who holds the link', async () => {
    const { email, token } = await invite();
    const other = await makePerson(database, 'Somebody Else');
    const answer = await accept(token, {}, other.cookie);
    expect(answer.status).toBe(403);
    expect(await reasonOf(answer)).toBe('wrong-address');
    expect(await memberships(email)).toEqual([]);
    expect(await memberships(other.person.email)).toEqual([]);
  });

  it('lets exactly one of twelve clicks at once through', async () => {
    const known = await makePerson(database, 'Many Clicks');
    const { token } = await invite('approver', known.person.email);
    const answers = await Promise.all(Array.from({ length: 12 }, () => accept(token, {}, known.cookie)));
    const statuses = answers.map((answer) => answer.status).sort();
    expect(statuses).toEqual([200, ...Array(11).fill(409)]);
    expect(await memberships(known.person.email)).toHaveLength(1);
    const { rows } = await database.query(
      `select 1 from audit_entries where action = 'person.joined' and subject_id = $1`,
      [known.person.id],
    );
    expect(rows).toHaveLength(1);
  });

  it('is over once it was taken back, ran out, or was used', async () => {
    const cancelled = await invite();
    await cancelInvitation(lead, cancelled.id);
    expect(await reasonOf(await accept(cancelled.token, newcomer))).toBe('invitation-cancelled');
    const late = await invite();
    await database.query(`update invitations set expires_at = now() - interval '1 second' where id = $1`, [
      late.id,
    ]);
    expect(await reasonOf(await accept(late.token, newcomer))).toBe('invitation-expired');
    const used = await invite();
    expect((await accept(used.token, newcomer)).status).toBe(200);
    expect(await reasonOf(await accept(used.token, newcomer))).toBe('invitation-used');
    for (const { email } of [cancelled, late]) expect(await memberships(email)).toEqual([]);
    await expect(cancelInvitation(lead, used.id)).rejects.toMatchObject(refusal('invitation-closed'));
  });

  it('is over when who invited may no longer invite', async () => {
    const other = await joinStudio(database, atStudio, 'lead');
    const ctx = await enterWorkspace(other.person, house.workspace.id);
    const email = newEmail();
    const { id } = await inviteToWorkspace(ctx, { email, role: 'approver' });
    await removeStaff(atStudio, other.person.id);
    const answer = await accept(await tokenOf(database, id), newcomer);
    expect(await reasonOf(answer)).toBe('inviter-left');
    expect(await memberships(email)).toEqual([]);
  });

  it('cannot be raised: what the body says besides name and password changes nothing', async () => {
    const { email, token } = await invite('reviewer');
    const other = await makeHouse(database);
    const answer = await accept(token, {
      ...newcomer,
      role: 'approver',
      workspaceId: other.workspace.id,
      userId: lead.person.id,
      emailVerified: false,
    });
    expect(answer.status).toBe(200);
    const { rows } = await database.query(
      `select m.role, m.workspace_id from members m join users u on u.id = m.user_id where u.email = $1`,
      [email],
    );
    expect(rows).toEqual([{ role: 'reviewer', workspace_id: house.workspace.id }]);
  });
});

describe('what was sent', () => {
  it.each(['appUrl', 'authUrl'] as const)('is changed by no role of the product (%s)', async (url) => {
    const { id } = await invite('reviewer');
    const client = new Client({ connectionString: database[url] });
    await client.connect();
    await client.query(`select set_config('app.person', $1, false), set_config('app.workspace', $2, false)`, [
      lead.person.id,
      house.workspace.id,
    ]);
    const other = newEmail();
    for (const [column, value] of [
      ['role', 'approver'],
      ['email', other],
      ['token_hash', '0'.repeat(64)],
      ['expires_at', '2099-01-01'],
      ['inviter_id', lead.person.id],
    ])
      await expect(
        client.query(`update invitations set ${column} = $1 where id = $2`, [value, id]),
      ).rejects.toMatchObject({ code: '42501' });
    const settled = await client.query(`update invitations set status = 'canceled' where id = $1`, [id]);
    expect(settled.rowCount).toBe(1);
    for (const status of ['pending', 'accepted'])
      await expect(
        client.query('update invitations set status = $1 where id = $2', [status, id]),
      ).rejects.toMatchObject({ code: '23514' });
    await client.end();
  });

  it('does not work again for who joined by it and was removed', async () => {
    const known = await makePerson(database, 'Came And Went');
    const { token } = await invite('approver', known.person.email);
    expect((await accept(token, {}, known.cookie)).status).toBe(200);
    await removeMember(lead, known.person.id);
    const again = await accept(token, {}, known.cookie);
    expect([again.status, await reasonOf(again)]).toEqual([409, 'invitation-used']);
    expect(await memberships(known.person.email)).toEqual([]);
  });

  it('is accepted or taken back, never both', async () => {
    const outcomes = new Set<string>();
    for (let round = 0; round < 10; round++) {
      const known = await makePerson(database, 'Either Or');
      const { id, token } = await invite('approver', known.person.email);
      const [accepted, cancelled] = await Promise.allSettled([
        accept(token, {}, known.cookie).then((answer) => answer.status),
        cancelInvitation(lead, id),
      ]);
      const joined = (await memberships(known.person.email)).length === 1;
      expect(accepted).toEqual({ status: 'fulfilled', value: joined ? 200 : 409 });
      expect(cancelled.status).toBe(joined ? 'rejected' : 'fulfilled');
      const { rows } = await database.query<{ status: string }>(
        'select status from invitations where id = $1',
        [id],
      );
      outcomes.add(rows[0].status);
      expect(rows[0].status).toBe(joined ? 'accepted' : 'canceled');
    }
    expect(outcomes.size).toBeGreaterThan(0);
  });
});

describe('invitations of staff', () => {
  it('refuse a client of the studio, at the invitation and at the click', async () => {
    const { email } = house.people.reviewer.person;
    await expect(inviteToStudio(atStudio, { email, role: 'designer' })).rejects.toMatchObject(
      refusal('client-of-studio'),
    );
    const known = await makePerson(database, 'First Client');
    const staff = await inviteToStudio(atStudio, { email: known.person.email, role: 'designer' });
    const client = await invite('approver', known.person.email);
    expect((await accept(client.token, {}, known.cookie)).status).toBe(200);
    const answer = await accept(await tokenOf(database, staff.id), {}, known.cookie);
    expect(await reasonOf(answer)).toBe('client-of-studio');
    expect(await memberships(known.person.email)).toEqual([{ role: 'approver' }]);
  });

  it('put the new person into every workspace of the studio', async () => {
    await createWorkspace(atStudio, { name: 'Second client', code: 'SEC' });
    const joined = await joinStudio(database, atStudio, 'designer');
    expect(await memberships(joined.person.email)).toEqual([{ role: 'designer' }, { role: 'designer' }]);
  });
});
