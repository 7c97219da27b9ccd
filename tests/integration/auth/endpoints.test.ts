import { beforeAll, describe, expect, it } from 'vitest';
import { GET, POST } from '@/app/api/auth/[...all]/route';
import { auth } from '@/lib/auth/auth';
import { closedPaths, openPaths } from '@/lib/auth/endpoints';
import { callRoute } from '@/tests/support/call-route';
import { freshDatabase } from '@/tests/support/database';
import { makePerson, type SignedIn } from '@/tests/support/make-house';

type Endpoint = { path?: string; options?: { method?: string | string[] } };
let person: SignedIn;
let endpoints: { path: string; methods: string[] }[];

beforeAll(async () => {
  person = await makePerson(await freshDatabase(), 'Pia');
  endpoints = Object.values(auth().api as unknown as Record<string, Endpoint>)
    .filter((endpoint) => endpoint.path)
    .map(({ path, options }) => ({ path: path!, methods: [options?.method ?? 'GET'].flat() }));
});

describe('endpoints of the identity service', () => {
  it('are each either open or closed by name', () => {
    const paths = [...new Set(endpoints.map((endpoint) => endpoint.path))].sort();
    expect(paths).toEqual([...openPaths, ...closedPaths].sort());
  });

  it.each(closedPaths)('%s is closed for everybody, signed in or not', async (path) => {
    const { methods } = endpoints.find((endpoint) => endpoint.path === path)!;
    const address = `/api/auth${path.replace(':id', 'google')}`;
    for (const method of methods)
      for (const cookie of [undefined, person.cookie]) {
        const handler = method === 'GET' ? GET : POST;
        const answer = await callRoute(handler, {
          path: address,
          method,
          cookie,
          body: method === 'POST' ? {} : undefined,
        });
        expect(answer.status).toBe(404);
      }
  });

  it.each(['/get-session/', '//get-session', '/organization/create/', '/organization/list/x', '/nothing'])(
    '%s is not taken for an open one',
    async (path) => {
      const answer = await callRoute(GET, { path: `/api/auth${path}`, cookie: person.cookie });
      expect(answer.status).toBe(404);
    },
  );

  it('list the workspaces of the person alone, without the columns that are ours', async () => {
    const answer = await callRoute(GET, { path: '/api/auth/organization/list', cookie: person.cookie });
    expect(await answer.json()).toEqual([]);
  });

  it.each([
    ['a foreign origin', { origin: 'https://evil.example' }],
    ['no origin from another site', { origin: '', 'sec-fetch-site': 'cross-site' }],
    ['the origin null', { origin: 'null' }],
  ])('refuse a change with %s', async (_what, headers) => {
    const answer = await callRoute(POST, {
      path: '/api/auth/sign-out',
      cookie: person.cookie,
      body: {},
      headers,
    });
    expect(answer.status).toBe(403);
    const session = await callRoute(GET, { path: '/api/auth/get-session', cookie: person.cookie });
    expect(await session.json()).toMatchObject({ user: { id: person.person.id } });
  });

  it('are kept by no cache', async () => {
    const answer = await callRoute(GET, { path: '/api/auth/get-session', cookie: person.cookie });
    expect(answer.headers.get('cache-control')).toBe('private, no-store');
  });
});
