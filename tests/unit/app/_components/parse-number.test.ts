import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { parseNumber } from '@/app/_components/parse-number';

describe('parseNumber', () => {
  it.each([
    ['0.8', 0.8],
    ['0,8', 0.8],
    ['0,125', 0.125],
    [' 12 ', 12],
    ['-3.5', -3.5],
    ['\u22123.5', -3.5],
    ['.5', 0.5],
    ['5.', 5],
    ['1.234', 1.234],
    ['1,25', 1.25],
    ['1234,5678', 1234.5678],
  ])('reads %j', (text, value) => {
    expect(parseNumber(text)).toEqual({ ok: true, value });
  });

  it('reads empty text as no number', () => {
    expect(parseNumber('   ')).toEqual({ ok: true, value: null });
  });

  it.each(['1,234', '12,500', '999,000'])('asks about %j instead of guessing', (text) => {
    const result = parseNumber(text);
    expect(result.ok).toBe(false);
    expect(result).toMatchObject({ problem: expect.stringContaining(text.replace(',', '.')) });
  });

  it.each(['abc', '1.2.3', '1,2,3', '1.234,5', '1,234.5', '--1', '1e3', '0x10', 'Infinity', 'NaN', '1 2'])(
    'refuses %j and says how to write it',
    (text) => {
      const result = parseNumber(text);
      expect(result.ok).toBe(false);
      expect(result).toMatchObject({ problem: expect.stringContaining('0.8') });
    },
  );

  it('gives back every number written with up to 6 decimals, point or comma (seed 20260712)', () => {
    fc.assert(
      fc.property(fc.integer({ min: -1e9, max: 1e9 }), fc.integer({ min: 0, max: 6 }), (whole, decimals) => {
        const value = Number((whole / 1e6).toFixed(decimals));
        const text = value.toFixed(decimals);
        expect(parseNumber(text)).toEqual({ ok: true, value: Number(text) });
        const comma = parseNumber(text.replace('.', ','));
        if (comma.ok) expect(comma.value).toBe(Number(text));
        else expect(decimals).toBe(3);
      }),
      { seed: 20260712, numRuns: 500 },
    );
  });
});
