import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { backoffS } from '@/lib/jobs/relay/backoff';

describe('pauses between tries', () => {
  const limits = { firstS: 5, mostS: 180 };

  it('double up to the longest, without jitter', () => {
    expect([1, 2, 3, 6, 7, 100].map((attempt) => backoffS(attempt, limits, 1))).toEqual([
      5, 10, 20, 160, 180, 180,
    ]);
  });

  it('are shortened by at most half (seed 11)', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 1, max: 1000 }),
        fc.double({ min: 0, max: 1, noNaN: true }),
        (attempt, random) => {
          const full = backoffS(attempt, limits, 1);
          const pause = backoffS(attempt, limits, random);
          expect(pause).toBeGreaterThanOrEqual(full / 2);
          expect(pause).toBeLessThanOrEqual(full);
        },
      ),
      { seed: 11 },
    );
  });
});
