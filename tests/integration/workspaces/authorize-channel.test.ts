import Pusher from 'pusher-js';
import { afterEach, beforeAll, describe, expect, it } from 'vitest';
import { POST as authRoute } from '@/app/api/auth/[...all]/route';
import { POST as authorizeRoute } from '@/app/api/v1/realtime/authorize/route';
import { GET as addressRoute } from '@/app/api/v1/realtime/route';
import { POST as signInRoute } from '@/app/api/v1/realtime/sign-in/route';
import { removeMember } from '@/lib/workspaces/remove-member';
import { personChannel, revisionChannel, workspaceChannel } from '@/realtime/channels';
import { publish } from '@/realtime/publish';
import { callRoute } from '@/tests/support/call-route';
import { freshDatabase, type FreshDatabase } from '@/tests/support/database';
import { joinWorkspace, makeHouse, signIn, type House } from '@/tests/support/make-house';

let database: FreshDatabase;
let house: House;
let other: House;
/** A revision of each house. */
let revision: string;
let foreignRevision: string;

beforeAll(async () => {
  database = await freshDatabase();
  house = await makeHouse(database);
  other = await makeHouse(database);
  revision = await bareRevision(house.workspace.id);
  foreignRevision = await bareRevision(other.workspace.id);
});

/** A revision row alone: only that it exists matters here, so its template and mesh are left out. */
async function bareRevision(workspaceId: string): Promise<string> {
  await database.query('set session_replication_role = replica');
  const { rows } = await database.query<{ id: string }>(
    `insert into revisions (id, workspace_id, template_id, ordinal, letter, mesh_id, recipe_id, gate_plan_id, author_id, author_name)
     values (gen_random_uuid(), $1, gen_random_uuid(), 1, 'A', gen_random_uuid(), gen_random_uuid(), gen_random_uuid(), $2, 'A')
     returning id`,
    [workspaceId, house.people.lead.person.id],
  );
  await database.query('set session_replication_role = default');
  return rows[0].id;
}

const ask = (cookie: string | undefined, channel_name: string, socket_id = '1234.5678') =>
  callRoute(authorizeRoute, { cookie, form: { socket_id, channel_name } });

describe('authorizing a channel', () => {
  it('signs the channels of one’s workspaces, oneself and their revisions', async () => {
    for (const role of ['lead', 'reviewer'] as const) {
      const { cookie, person } = house.people[role];
      for (const channel of [workspaceChannel(house.workspace.id), personChannel(person.id)]) {
        const answer = await ask(cookie, channel);
        expect(answer.status).toBe(200);
        expect(await answer.json()).toEqual({ auth: expect.stringMatching(/^[^:]+:[0-9a-f]{64}$/) });
      }
      const presence = await ask(cookie, revisionChannel(house.workspace.id, revision));
      const { channel_data } = (await presence.json()) as { channel_data: string };
      expect(JSON.parse(channel_data)).toEqual({ user_id: person.id, user_info: { name: person.name } });
    }
  });

  it('refuses everything else with the same answer', async () => {
    const { cookie, person } = house.people.approver;
    const missing = '01a23182-fb41-7e71-9779-7364af2e607c';
    const channels = [
      workspaceChannel(other.workspace.id),
      workspaceChannel(missing),
      personChannel(other.people.lead.person.id),
      personChannel(house.people.lead.person.id),
      revisionChannel(house.workspace.id, foreignRevision),
      revisionChannel(house.workspace.id, missing),
      revisionChannel(other.workspace.id, foreignRevision),
      revisionChannel(other.workspace.id, revision),
      workspaceChannel(house.workspace.id).toUpperCase(),
      `${workspaceChannel(house.workspace.id)}\n`,
      ` ${personChannel(person.id)}`,
      `public-${house.workspace.id}`,
      `private-studio-${house.studio.id}`,
      house.workspace.id,
      '',
    ];
    const answers = await Promise.all(channels.map((channel) => ask(cookie, channel)));
    const bodies = await Promise.all(
      answers.map(async (answer) => ({ ...(await answer.json()), reference: '' })),
    );
    expect(answers.map((answer) => answer.status)).toEqual(channels.map(() => 403));
    expect(new Set(bodies.map((body) => JSON.stringify(body))).size).toBe(1);
  });

  it.each([
    '1.1:private-workspace-x',
    '1.1\n',
    ' 1.1',
    '1.1 ',
    '1',
    '.',
    '1.1.1',
    '{"a":1}',
    '1.1]',
    `${'1'.repeat(60)}.1`,
    '',
  ])('signs nothing for the socket id %j', async (socketId) => {
    const { cookie, person } = house.people.lead;
    expect((await ask(cookie, personChannel(person.id), socketId)).status).toBe(403);
    const signIn = await callRoute(signInRoute, { cookie, form: { socket_id: socketId } });
    expect(signIn.status).toBe(403);
  });

  it('takes one socket and one channel at a time, from our own pages, from somebody', async () => {
    const { cookie, person } = house.people.lead;
    expect((await ask(undefined, personChannel(person.id))).status).toBe(401);
    const body = { socket_id: '1.1', channel_name: personChannel(person.id) };
    const foreign = await callRoute(authorizeRoute, {
      cookie,
      form: body,
      headers: { origin: 'https://evil.example' },
    });
    expect(foreign.status).toBe(403);
    expect((await callRoute(authorizeRoute, { cookie, body })).status).toBe(422);
    const twice = new Request('http://127.0.0.1:3000/api/v1/realtime/authorize', {
      method: 'POST',
      headers: {
        cookie,
        origin: 'http://127.0.0.1:3000',
        'content-type': 'application/x-www-form-urlencoded',
      },
      body: `socket_id=1.1&channel_name=${personChannel(person.id)}&channel_name=${workspaceChannel(other.workspace.id)}`,
    });
    expect((await authorizeRoute(twice, { params: Promise.resolve({}) })).status).toBe(422);
  });

  it('tells who is signed in where the server is, and never the secret', async () => {
    const answer = await callRoute(addressRoute, { cookie: house.people.lead.cookie });
    const text = await answer.text();
    expect(JSON.parse(text)).toEqual({
      key: process.env.PUSHER_KEY,
      host: '127.0.0.1',
      port: Number(process.env.PUSHER_PORT),
      tls: false,
    });
    expect(text).not.toContain(process.env.PUSHER_SECRET);
    expect((await callRoute(addressRoute)).status).toBe(401);
  });
});

describe('on the realtime server', () => {
  const open: Pusher[] = [];
  afterEach(() => {
    for (const pusher of open.splice(0)) pusher.disconnect();
  });

  /** A client as the pages have it, whose requests go to our routes. */
  function connect(cookie: string): Pusher {
    const hand =
      (route: typeof authorizeRoute) =>
      (
        { socketId, channelName }: { socketId: string; channelName?: string },
        done: (e: Error | null, a: unknown) => void,
      ) => {
        const form: Record<string, string> = { socket_id: socketId };
        if (channelName) form.channel_name = channelName;
        void callRoute(route, { cookie, form }).then(async (answer) =>
          answer.ok ? done(null, await answer.json()) : done(new Error(`refused: ${answer.status}`), null),
        );
      };
    const pusher = new Pusher(process.env.PUSHER_KEY!, {
      cluster: '',
      wsHost: '127.0.0.1',
      wsPort: Number(process.env.PUSHER_PORT),
      forceTLS: false,
      enabledTransports: ['ws'],
      disableStats: true,
      channelAuthorization: { customHandler: hand(authorizeRoute) } as never,
      userAuthentication: { customHandler: hand(signInRoute) } as never,
    });
    open.push(pusher);
    return pusher;
  }
  const subscribed = (pusher: Pusher, name: string) =>
    new Promise<string>((resolve) => {
      const channel = pusher.subscribe(name);
      channel.bind('pusher:subscription_succeeded', () => resolve('subscribed'));
      channel.bind('pusher:subscription_error', () => resolve('refused'));
    });
  const signedIn = (pusher: Pusher) =>
    new Promise<void>((resolve) => {
      pusher.bind('pusher:signin_success', () => resolve());
      pusher.signin();
    });

  it('an event of the workspace reaches who may listen, and nobody else can subscribe', async () => {
    const inside = connect(house.people.reviewer.cookie);
    const outside = connect(other.people.lead.cookie);
    const name = workspaceChannel(house.workspace.id);
    expect(await subscribed(inside, name)).toBe('subscribed');
    expect(await subscribed(outside, name)).toBe('refused');
    const arrived = new Promise((resolve) => inside.channel(name).bind('people.changed', resolve));
    const heard: unknown[] = [];
    outside.bind_global((event: string, data: unknown) => event === 'people.changed' && heard.push(data));
    const data = { id: house.workspace.id };
    await publish([{ channel: name, name: 'people.changed', data }]);
    expect(await arrived).toEqual(data);
    expect(heard).toEqual([]);
  });

  it('a forged signature subscribes to nothing', async () => {
    const pusher = connect(other.people.lead.cookie);
    const refused = new Promise((resolve) => pusher.connection.bind('error', resolve));
    await new Promise<void>((resolve) => pusher.connection.bind('connected', () => resolve()));
    const channel = workspaceChannel(house.workspace.id);
    const auth = `${process.env.PUSHER_KEY}:${'0'.repeat(64)}`;
    const gotIn: unknown[] = [];
    pusher.bind_global(
      (event: string) => event === 'pusher_internal:subscription_succeeded' && gotIn.push(event),
    );
    pusher.send_event('pusher:subscribe', { channel, auth });
    const answer = new Promise((resolve) => pusher.bind_global((event: string) => resolve(event)));
    expect(String(await Promise.race([refused.then(() => 'error'), answer]))).toMatch(/error/);
    expect(gotIn).toEqual([]);
  });

  it('the sockets of an ended session end at once, those of the person’s other session go on', async () => {
    const member = await joinWorkspace(database, await house.enter('lead'), 'reviewer');
    const elsewhere = await signIn(member.person.email);
    const [ending, staying] = [connect(member.cookie), connect(elsewhere)];
    const name = workspaceChannel(house.workspace.id);
    for (const pusher of [ending, staying]) {
      await signedIn(pusher);
      expect(await subscribed(pusher, name)).toBe('subscribed');
    }
    const ended = new Promise<void>((resolve) => {
      ending.connection.bind('state_change', ({ current }: { current: string }) => {
        if (current !== 'connected') resolve();
      });
    });
    const answer = await callRoute(authRoute, {
      path: '/api/auth/sign-out',
      cookie: member.cookie,
      body: {},
    });
    expect(answer.status).toBe(200);
    await ended;
    const arrived = new Promise((resolve) => staying.channel(name).bind('people.changed', resolve));
    await publish([{ channel: name, name: 'people.changed', data: { id: house.workspace.id } }]);
    expect(await arrived).toEqual({ id: house.workspace.id });
    expect(staying.connection.state).toBe('connected');
  });

  it('the sockets of a removed member end at once and cannot subscribe again', async () => {
    const member = await joinWorkspace(database, await house.enter('lead'), 'reviewer');
    const pusher = connect(member.cookie);
    const name = workspaceChannel(house.workspace.id);
    await signedIn(pusher);
    expect(await subscribed(pusher, name)).toBe('subscribed');
    const ended = new Promise<void>((resolve) => {
      pusher.connection.bind('state_change', ({ current }: { current: string }) => {
        if (current !== 'connected') resolve();
      });
    });
    await removeMember(await house.enter('lead'), member.person.id);
    await ended;
    const again = connect(member.cookie);
    expect(await subscribed(again, name)).toBe('refused');
  });
});
