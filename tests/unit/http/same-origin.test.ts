import { beforeAll, describe, expect, it } from 'vitest';
import { requireSameOrigin } from '@/lib/http/same-origin';
import { setEnvironment } from '@/tests/support/test-environment';

beforeAll(() => {
  setEnvironment({ APP_URL: 'https://proofs.example.test' });
});

const outcome = (headers: Record<string, string>) => {
  try {
    requireSameOrigin(new Request('https://proofs.example.test/api', { method: 'POST', headers }));
    return 'taken';
  } catch (error) {
    return (error as { reason: string }).reason;
  }
};

describe('requireSameOrigin', () => {
  it.each<Record<string, string>>([
    { origin: 'https://proofs.example.test' },
    { origin: 'https://proofs.example.test', 'sec-fetch-site': 'same-origin' },
    { 'sec-fetch-site': 'same-origin' },
  ])('takes a change that our own page asked for: %j', (headers) => {
    expect(outcome(headers)).toBe('taken');
  });

  it.each<Record<string, string>>([
    {},
    { origin: 'null' },
    { origin: 'https://evil.example' },
    { origin: 'http://proofs.example.test' },
    { origin: 'https://proofs.example.test:8443' },
    { origin: 'https://proofs.example.test.evil.example' },
    { origin: 'https://evil.example/https://proofs.example.test' },
    { 'sec-fetch-site': 'cross-site' },
    { 'sec-fetch-site': 'same-site' },
    { origin: 'https://proofs.example.test', 'sec-fetch-site': 'cross-site' },
    { origin: 'https://evil.example', 'sec-fetch-site': 'same-origin' },
    { 'x-forwarded-host': 'proofs.example.test', origin: 'https://evil.example' },
  ])('refuses one that another page, or nobody we know, asked for: %j', (headers) => {
    expect(outcome(headers)).toBe('cross-site');
  });
});
