import { describe, expect, it } from 'vitest';
import { judgePullLog } from '@/lib/formability/life/judge-pull-log';
import { readPullLog } from '@/lib/formability/life/pull-log';

const worn = (count: number) => Array.from({ length: count }, (_, k) => ({ pulls: 20 + k, failed: true }));

describe('a pull log', () => {
  it('has a fitted curve from five failures on (common practice, no source)', () => {
    expect([4, 5].map((failures) => judgePullLog(worn(failures), 10).weibull !== null)).toEqual([
      false,
      true,
    ]);
  });

  it('bounds its mean by counting up to 99 failures; beyond, the bound is the mean', () => {
    expect([99, 100].map((failures) => judgePullLog(worn(failures), 10).meanAtLeastPulls !== null)).toEqual([true, false]); // prettier-ignore
  });

  it('has 10,000 templates of 10,000,000 pulls at most', () => {
    const log = (entries: number, pulls: number) => () => readPullLog(Array.from({ length: entries }, () => ({ pulls, failed: false }))); // prettier-ignore
    expect(log(10_000, 1)).not.toThrow();
    expect(log(10_001, 1)).toThrow('it has 10001 entries, more than 10000');
    expect(log(1, 10_000_000)).not.toThrow();
    expect(log(1, 10_000_001)).toThrow('entry 1 has pulls 10000001');
  });
});
