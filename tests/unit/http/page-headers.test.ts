import { beforeAll, describe, expect, it } from 'vitest';
import { newNonce, pageHeaders, apiHeaders } from '@/lib/http/page-headers';
import { setEnvironment } from '@/tests/support/test-environment';

beforeAll(() => {
  setEnvironment({
    NODE_ENV: 'production',
    APP_URL: 'https://proofs.example.test',
    S3_ENDPOINT: 'http://store.internal:9000',
    S3_PUBLIC_ENDPOINT: 'https://s3.example.test',
    S3_BUCKET: 'templates',
    S3_ACCESS_KEY_ID: 'a',
    S3_SECRET_ACCESS_KEY: 'b',
    PUSHER_APP_ID: 'p',
    PUSHER_KEY: 'k',
    PUSHER_SECRET: 'not-for-browsers',
    PUSHER_HOST: 'live.internal',
    PUSHER_PORT: '6001',
    PUSHER_PUBLIC_HOST: 'live.example.test',
    PUSHER_PUBLIC_PORT: '443',
  });
});

describe('headers of a page', () => {
  it('name the store’s public origin with its bucket, and the public socket, over TLS', () => {
    const policy = pageHeaders('n')['content-security-policy'];
    expect(policy).toContain(
      "connect-src 'self' wss://live.example.test:443 https://templates.s3.example.test;",
    );
    expect(policy).not.toMatch(/internal|not-for-browsers|'unsafe-eval'/);
  });

  it('are strict about https, types, frames, referrers and openers', () => {
    expect(pageHeaders('n')).toMatchObject({
      'strict-transport-security': 'max-age=63072000; includeSubDomains',
      'x-content-type-options': 'nosniff',
      'x-frame-options': 'DENY',
      'referrer-policy': 'same-origin',
      'cross-origin-opener-policy': 'same-origin',
    });
  });

  it('of an answer that is no page let nothing run', () => {
    expect(apiHeaders()['content-security-policy']).toMatch(/^default-src 'none'/);
  });

  it('carry a nonce of at least 128 random bits, another each time', () => {
    const nonces = Array.from({ length: 50 }, newNonce);
    expect(new Set(nonces).size).toBe(50);
    for (const nonce of nonces) expect(Buffer.from(nonce, 'base64').length).toBeGreaterThanOrEqual(16);
  });
});
