import { describe, expect, it } from 'vitest';
import { safePath } from '@/app/_components/safe-path';

const foreign = [
  '//evil.example',
  '///evil.example',
  '////evil.example//',
  '/\\evil.example',
  '\\/evil.example',
  '\\\\evil.example',
  '/\t/evil.example',
  '\t//evil.example',
  '/\n/evil.example',
  '/\r\n/evil.example',
  ' //evil.example',
  '/ /evil.example',
  '\u0000//evil.example',
  '/\u0000/evil.example',
  '/\u00a0/evil.example',
  'https://evil.example',
  'https:evil.example',
  'https:/evil.example',
  'HTTPS://EVIL.EXAMPLE',
  'http://self.invalid@evil.example/',
  '@evil.example',
  'javascript:alert(1)',
  'JaVaScRiPt:alert(1)',
  'java\nscript:alert(1)',
  'data:text/html,x',
  'vbscript:x',
  'mailto:a@evil.example',
  'evil.example',
  'www.evil.example/today',
  '/%2f%2fevil.example',
  '/%2Fevil.example',
  '/%5cevil.example',
  '/%5C%5Cevil.example',
  '/%09/evil.example',
  '/%0a/evil.example',
  '/..//evil.example',
  '/.//evil.example',
  '/a/../..//evil.example',
  '/%2e%2e//evil.example',
  '//xn--vil-8cd.example',
  '//[::1]/',
  '//127.0.0.1:80/',
  '?next=//evil.example',
  '#//evil.example',
  '',
];

describe('safePath', () => {
  it.each(foreign)('refuses %j', (candidate) => {
    expect(safePath(candidate, '/fallback')).toBe('/fallback');
  });

  it.each([undefined, null, 7, {}, ['/today'], '/' + 'a'.repeat(2048)])(
    'refuses what is no short string: %#',
    (candidate) => {
      expect(safePath(candidate, '/fallback')).toBe('/fallback');
    },
  );

  it.each([
    ['/today', '/today'],
    ['/', '/'],
    ['/w/quillon/templates?sort=due&dir=asc#row-3', '/w/quillon/templates?sort=due&dir=asc#row-3'],
    ['/w/quillon/../orrin', '/w/orrin'],
    ['/search?q=https://evil.example', '/search?q=https://evil.example'],
    ['/join/0192f1c4-aa10-7b3e-8000-000000000000', '/join/0192f1c4-aa10-7b3e-8000-000000000000'],
  ])('keeps %s', (candidate, expected) => {
    expect(safePath(candidate)).toBe(expected);
  });

  it('never yields a path that a browser reads as another origin', () => {
    const origin = 'https://firstpull.example';
    for (const candidate of foreign) expect(new URL(safePath(candidate), origin).origin).toBe(origin);
  });
});
