import { afterAll, beforeAll, describe, expect, it, vi } from 'vitest';
import { POST } from '@/app/api/auth/[...all]/route';
import { POST as signRoute } from '@/app/api/v1/workspaces/[workspace]/gates/[gate]/sign/route';
import { authenticator } from '@/tests/support/authenticator';
import { callRoute, cookieOf } from '@/tests/support/call-route';
import { freshDatabase, type FreshDatabase } from '@/tests/support/database';
import { gateOf, postChecked, shown } from '@/tests/support/factory';
import { makeHouse, testPassword, type House } from '@/tests/support/make-house';

let database: FreshDatabase;
let house: House;
let device: ReturnType<typeof authenticator>;
let cookie: string;

/** The lead has a second factor. */
beforeAll(async () => {
  database = await freshDatabase();
  house = await makeHouse(database);
  // The middle of a step, and it stays there, so that the clock overtakes no code.
  vi.useFakeTimers({ toFake: ['Date'], now: Math.floor(Date.now() / 30_000) * 30_000 + 15_000 });
  const post = (path: string, body: unknown, as: string) =>
    callRoute(POST, { path: `/api/auth${path}`, body, cookie: as });
  const before = house.people.lead.cookie;
  const enabled = await post('/two-factor/enable', { password: testPassword }, before);
  device = authenticator(((await enabled.json()) as { totpURI: string }).totpURI);
  cookie = cookieOf(await post('/two-factor/verify-totp', { code: await device.code() }, before));
  expect(cookie).toMatch(/session_token/);
});

afterAll(() => vi.useRealTimers());

let key = 0;
async function sign(revisionId: string, body: Record<string, unknown>) {
  const lead = await house.enter('lead');
  const { id } = await gateOf(lead, revisionId, 'studio');
  const { digest } = await shown(lead, revisionId);
  const answer = await callRoute(signRoute, {
    params: { workspace: house.workspace.slug, gate: id },
    cookie,
    headers: { 'idempotency-key': `signing-with-code-${++key}` },
    body: { digest, password: testPassword, ...body },
  });
  const told = (await answer.json()) as { type?: string };
  return { status: answer.status, reason: told.type?.replace('/problems/', '') };
}
const signatures = async (revisionId: string) =>
  (
    await database.query<{ method: string }>(
      `select s.method from signatures s where s.revision_id = $1
       union all select detail->>'method' from audit_entries where action = 'gate.signed' and subject_id = $1`,
      [revisionId],
    )
  ).rows;

describe('signing with a second factor', () => {
  it('needs a fresh code besides the password, writes down that both were given, and takes the code once', async () => {
    const one = await postChecked(house);
    const two = await postChecked(house);
    const clock = await device.code(1);
    expect(await sign(one.revisionId, {})).toEqual({ status: 403, reason: 'code-needed' });
    expect(await sign(one.revisionId, { code: '000000' })).toEqual({ status: 403, reason: 'wrong-code' });
    expect(await sign(one.revisionId, { code: 'abc' })).toMatchObject({ status: 422 });
    expect(await sign(one.revisionId, { code: clock, password: 'wrong' })).toEqual({
      status: 403,
      reason: 'wrong-password',
    });
    expect(await signatures(one.revisionId)).toEqual([]);
    expect((await sign(one.revisionId, { code: ` ${clock.slice(0, 3)} ${clock.slice(3)}` })).status).toBe(
      201,
    );
    const both = { method: 'password+totp' };
    expect(await signatures(one.revisionId)).toEqual([both, both]);
    // The proof served that one act: it signs nothing else.
    expect(await sign(two.revisionId, { code: clock })).toEqual({ status: 403, reason: 'wrong-code' });
    expect(await signatures(two.revisionId)).toEqual([]);
    const { rows } = await database.query<{ text: string }>(
      `select string_agg(t::text, ' ') as text from idempotency_keys t`,
    );
    expect(rows[0].text).not.toContain(clock);
  });
});
