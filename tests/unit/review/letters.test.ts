import { describe, expect, it } from 'vitest';
import { revisionLetter } from '@/lib/review/letters';

describe('revision letters', () => {
  it('skip I, O, Q, S, X and Z, and go on with two letters after Y', () => {
    const first = Array.from({ length: 22 }, (_, n) => revisionLetter(n)).join(' ');
    expect(first).toBe('A B C D E F G H J K L M N P R T U V W Y AA AB');
    expect(revisionLetter(20 + 20 * 20 - 1)).toBe('YY');
    expect(revisionLetter(20 + 20 * 20)).toBe('AAA');
  });

  it('are never given twice, and never hold a letter that is skipped', () => {
    const all = Array.from({ length: 3000 }, (_, n) => revisionLetter(n));
    expect(new Set(all).size).toBe(3000);
    expect(all.join('')).not.toMatch(/[IOQSXZ]/);
  });

  it.each([-1, 0.5, NaN, Infinity])('refuse %d', (n) => {
    expect(() => revisionLetter(n)).toThrow(RangeError);
  });
});
