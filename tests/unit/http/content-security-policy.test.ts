import { describe, expect, it } from 'vitest';
import { contentSecurityPolicy } from '@/lib/http/content-security-policy';

const places = {
  nonce: 'bm9uY2U=',
  storeOrigin: 'https://s3.example.test',
  realtimeOrigin: 'wss://live.example.test:443',
  secure: true,
  development: false,
};

function directivesOf(policy: string): Map<string, string[]> {
  return new Map(
    policy.split('; ').map((directive) => {
      const [name, ...sources] = directive.split(' ');
      return [name, sources];
    }),
  );
}

describe('contentSecurityPolicy', () => {
  it('lets scripts run by nonce only', () => {
    const scripts = directivesOf(contentSecurityPolicy(places)).get('script-src');
    expect(scripts).toContain("'nonce-bm9uY2U='");
    expect(scripts).toContain("'strict-dynamic'");
    expect(scripts).toContain("'wasm-unsafe-eval'");
    expect(scripts).not.toContain("'unsafe-inline'");
    expect(scripts).not.toContain("'unsafe-eval'");
  });

  it('lets pages fetch from this host, the store and the realtime server alone', () => {
    const policy = directivesOf(contentSecurityPolicy(places));
    expect(policy.get('connect-src')).toEqual(["'self'", places.realtimeOrigin, places.storeOrigin]);
    expect(policy.get('img-src')).toEqual(["'self'", 'data:', 'blob:', places.storeOrigin]);
    expect(policy.get('default-src')).toEqual(["'self'"]);
  });

  it('closes embedding, plugins, foreign forms and base addresses', () => {
    const policy = directivesOf(contentSecurityPolicy(places));
    expect(policy.get('frame-ancestors')).toEqual(["'none'"]);
    expect(policy.get('object-src')).toEqual(["'none'"]);
    expect(policy.get('base-uri')).toEqual(["'none'"]);
    expect(policy.get('form-action')).toEqual(["'self'"]);
  });

  it('upgrades requests only where the product itself is served over https', () => {
    expect(contentSecurityPolicy(places)).toContain('upgrade-insecure-requests');
    expect(contentSecurityPolicy({ ...places, secure: false })).not.toContain('upgrade-insecure-requests');
  });

  it('allows evaluation in development, where the renderer needs it', () => {
    const scripts = directivesOf(contentSecurityPolicy({ ...places, development: true })).get('script-src');
    expect(scripts).toContain("'unsafe-eval'");
  });
});
