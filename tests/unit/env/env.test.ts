import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';

const url = (role: string) => `postgres://${role}:pw@127.0.0.1:5499/firstpull`;
const complete: Record<string, string> = {
  APP_URL: 'http://127.0.0.1:3000/',
  DATABASE_URL: url('firstpull_app'),
  AUTH_DATABASE_URL: url('firstpull_auth'),
  BETTER_AUTH_SECRET: 'b'.repeat(64),
  S3_ENDPOINT: 'http://127.0.0.1:9191',
  S3_PUBLIC_ENDPOINT: 'http://127.0.0.1:9191',
  S3_BUCKET: 'firstpull',
  S3_ACCESS_KEY_ID: 'key',
  S3_SECRET_ACCESS_KEY: 'secret',
  S3_FORCE_PATH_STYLE: 'true',
  SMTP_URL: 'smtp://127.0.0.1:1025',
  MAIL_FROM: 'Firstpull <proofs@firstpull.example>',
  PUSHER_APP_ID: 'firstpull',
  PUSHER_KEY: 'key',
  PUSHER_SECRET: 'secret',
  PUSHER_HOST: '127.0.0.1',
  PUSHER_PORT: '6011',
  PUSHER_PUBLIC_HOST: '127.0.0.1',
  PUSHER_PUBLIC_PORT: '6011',
};

async function withEnvironment(source: Record<string, string>) {
  for (const name of [
    ...Object.keys(complete),
    'RELAY_DATABASE_URL',
    'OWNER_DATABASE_URL',
    'WORKER_THREADS',
    'TRUSTED_PROXY',
  ]) {
    vi.stubEnv(name, source[name]);
  }
  vi.resetModules();
  return import('@/lib/env/env');
}

describe('env', () => {
  beforeEach(() => void vi.stubEnv('NODE_ENV', 'production'));
  afterEach(() => void vi.unstubAllEnvs());

  it('parses types: flags, ports, and the address without its last slash', async () => {
    const { env } = await withEnvironment(complete);
    expect(env()).toMatchObject({
      APP_URL: 'http://127.0.0.1:3000',
      S3_FORCE_PATH_STYLE: true,
      PUSHER_PORT: 6011,
      PUSHER_TLS: false,
      LOG_LEVEL: 'info',
    });
  });

  it.each(Object.keys(complete).filter((name) => name !== 'S3_FORCE_PATH_STYLE'))(
    'names %s when it is missing',
    async (name) => {
      const { env } = await withEnvironment({ ...complete, [name]: '' });
      expect(() => env()).toThrow(`${name}: is missing`);
    },
  );

  it('lets a script ask only for what it uses', async () => {
    const { databaseEnv, storageEnv } = await withEnvironment({ DATABASE_URL: url('firstpull_app') });
    expect(databaseEnv().DATABASE_URL).toBe(url('firstpull_app'));
    expect(() => storageEnv()).toThrow('S3_ENDPOINT: is missing');
  });

  it('keeps the owner and the relay out of the web process', async () => {
    const { env, workerEnv, ownerEnv } = await withEnvironment({
      ...complete,
      RELAY_DATABASE_URL: url('firstpull_relay'),
      OWNER_DATABASE_URL: url('firstpull_owner'),
      WORKER_THREADS: '3',
    });
    expect(env()).not.toHaveProperty('OWNER_DATABASE_URL');
    expect(env()).not.toHaveProperty('RELAY_DATABASE_URL');
    expect(workerEnv()).toMatchObject({ RELAY_DATABASE_URL: url('firstpull_relay'), WORKER_THREADS: 3 });
    expect(ownerEnv().OWNER_DATABASE_URL).toBe(url('firstpull_owner'));
  });

  it('trusts a proxy by its address or range alone: a name would trust everybody', async () => {
    for (const proxy of ['192.0.2.1', '10.0.0.0/8', '2001:db8::1', 'fd00::/8']) {
      const { authEnv } = await withEnvironment({ ...complete, TRUSTED_PROXY: proxy });
      expect(authEnv().TRUSTED_PROXY).toBe(proxy);
    }
    for (const proxy of ['nginx', '10.0.0.0/99', '192.0.2.1, 192.0.2.2', 'true']) {
      const { authEnv } = await withEnvironment({ ...complete, TRUSTED_PROXY: proxy });
      expect(() => authEnv()).toThrow(/TRUSTED_PROXY: must be an IP address or a range/);
    }
  });

  it('refuses an address of the wrong kind', async () => {
    const { databaseEnv } = await withEnvironment({ DATABASE_URL: 'mysql://somewhere/firstpull' });
    expect(() => databaseEnv()).toThrow('DATABASE_URL: must be an address such as postgres://');
  });
});
