import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { parseNumber, readDecimal } from '@/lib/formability/parse/decimal';

const read = (text: string) => {
  const bytes = new TextEncoder().encode(`#${text}#`);
  return readDecimal(bytes, 1, bytes.length - 1);
};

describe('a number in its bytes', () => {
  it.each([
    '0',
    '-0',
    '7',
    '+7',
    '.5',
    '5.',
    '-12.25',
    '1e3',
    '1E-3',
    '2.5e+2',
    '0.000001',
    '123456789.012345',
    '00012.50',
    '1e22',
    '0e5',
  ])(
    // prettier-ignore
    '%s is what the language reads',
    (text) => expect(Object.is(read(text), Number(text))).toBe(true),
  );

  it.each([
    '',
    '+',
    '.',
    '-.',
    'e5',
    '1e',
    '1e+',
    '1.2.3',
    '1,5',
    ' 1',
    '1 ',
    'nan',
    'inf',
    '0x10',
    '--1',
    '1e400',
    '1e-30',
  ])(
    // prettier-ignore
    '"%s" is none, or takes the slow way',
    (text) => expect(read(text)).toBeNaN(),
  );

  it('of up to 15 digits is exact, of any length the same float32 (fast-check, seed 31)', () => {
    fc.assert(
      fc.property(fc.double({ min: 1e-5, max: 1e7, noNaN: true }), fc.boolean(), (size, minus) => {
        const value = minus ? -size : size;
        const short = Number(value.toPrecision(15)).toFixed(9);
        if (short.replace(/\D/g, '').replace(/^0+/, '').length <= 15) expect(read(short)).toBe(Number(short));
        const single = Math.fround(value);
        expect(Math.fround(read(String(single)))).toBe(single);
        expect(Math.abs(read(String(value)) / value - 1)).toBeLessThan(1e-15);
        expect(Math.abs(read(`${value.toFixed(20)}98765`) / value - 1)).toBeLessThan(2e-15);
      }),
      { seed: 31, numRuns: 3000 },
    );
  });

  it('the slow way knows what is not finite, and what is no number', () => {
    expect([parseNumber('NaN'), parseNumber('-inf'), parseNumber('1e400'), parseNumber('x'), parseNumber('')]).toEqual([NaN, -Infinity, Infinity, null, null]); // prettier-ignore
  });
});
