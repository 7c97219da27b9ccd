import { beforeAll, describe, expect, it } from 'vitest';
import { GET as liveRoute } from '@/app/api/live/route';
import { GET as readyRoute } from '@/app/api/ready/route';
import { freshDatabase } from '@/tests/support/database';
import { setEnvironment } from '@/tests/support/test-environment';

beforeAll(async () => {
  await freshDatabase();
  // Nobody listens there: one of the two roles cannot connect.
  setEnvironment({ AUTH_DATABASE_URL: 'postgres://firstpull_auth:x@127.0.0.1:1/none' });
});

describe('health', () => {
  it('lives whatever else is down', async () => {
    const answer = liveRoute();
    expect(answer.status).toBe(200);
    expect(await answer.json()).toEqual({ live: true });
  });

  it('is not ready while something that every request needs is down, and names it without its address', async () => {
    const answer = await readyRoute();
    expect(answer.status).toBe(503);
    expect(answer.headers.get('cache-control')).toBe('private, no-store');
    const text = await answer.text();
    expect(JSON.parse(text)).toEqual({
      ready: false,
      checks: { environment: 'ok', database: 'ok', identity: 'failing' },
    });
    expect(text).not.toMatch(/postgres|127\.0\.0\.1/);
  });
});
