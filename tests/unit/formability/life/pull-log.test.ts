import { describe, expect, it } from 'vitest';
import { fitWeibull, weibullMean, weibullQuantile } from '@/lib/formability/life/fit-weibull';
import { judgePullLog } from '@/lib/formability/life/judge-pull-log';
import { readPullLog, type LoggedTemplate } from '@/lib/formability/life/pull-log';
import { meanAtLeast, provenReliability, successRun, survival } from '@/lib/formability/life/survival';

/** '12' failed after 12, '25+' was put away still good. */
const log = (text: string): LoggedTemplate[] =>
  text.split(' ').map((one) => ({ pulls: parseInt(one, 10), failed: !one.endsWith('+') }));

const NIST = log(`54 187 216 240 244 335 361 373 375 386 ${Array(10).fill('500+').join(' ')}`);
const REMISSION = log('6 6 6 6+ 7 9+ 10 10+ 11+ 13 16 17+ 19+ 20+ 22 23 25+ 32+ 32+ 34+ 35+');
/** Invented. */
const PULLS = log('12 18 25+ 27 31 40+ 40+ 44 52 60+');

describe('Weibull with right censoring: NIST/SEMATECH e-Handbook of Statistical Methods, §8.4.1.3', () => {
  it('scale, shape, likelihood and mean as published (L1 to L4)', () => {
    const fit = fitWeibull(NIST);
    expect(fit.scalePulls).toBeCloseTo(606.528, 2);
    expect(fit.shape).toBeCloseTo(1.7208, 4);
    expect(fit.logLikelihood).toBeCloseTo(-75.135, 3);
    expect(weibullMean(fit)).toBeCloseTo(540.737, 2);
    expect(weibullQuantile(fit, 0.1)).toBeCloseTo(164.0224, 2);
  });

  it('the 6-MP data (L8) and an invented log of pulls with its B10 (L9)', () => {
    const six = fitWeibull(REMISSION);
    expect(six.shape).toBeCloseTo(1.3537345, 5);
    expect(six.scalePulls).toBeCloseTo(33.765151, 4);
    expect(six.logLikelihood).toBeCloseTo(-41.658678, 5);
    const pulls = fitWeibull(PULLS);
    expect(pulls.shape).toBeCloseTo(2.1220168, 5);
    expect(pulls.scalePulls).toBeCloseTo(48.371355, 4);
    expect(weibullQuantile(pulls, 0.1)).toBeCloseTo(16.750408, 4);
    expect(weibullQuantile(pulls, 0.5)).toBeCloseTo(40.698395, 4);
  });

  it('is greatest where it says, and goes with the unit', () => {
    const fit = fitWeibull(PULLS);
    const likelihood = (shape: number, scale: number) =>
      PULLS.reduce(
        (sum, { pulls, failed }) =>
          sum +
          (failed ? Math.log(shape / scale) + (shape - 1) * Math.log(pulls / scale) : 0) -
          (pulls / scale) ** shape,
        0,
      );
    for (const [a, b] of [
      [1.01, 1],
      [0.99, 1],
      [1, 1.01],
      [1, 0.99],
    ])
      // prettier-ignore
      expect(likelihood(a * fit.shape, b * fit.scalePulls)).toBeLessThan(fit.logLikelihood);
    const tenfold = fitWeibull(PULLS.map((one) => ({ ...one, pulls: 10 * one.pulls })));
    expect(tenfold.shape).toBeCloseTo(fit.shape, 9);
    expect(tenfold.scalePulls).toBeCloseTo(10 * fit.scalePulls, 6);
  });

  it('refuses a log that has no greatest likelihood', () => {
    expect(() => fitWeibull(log('10 20+ 30+'))).toThrow(/two failures/);
    expect(() => fitWeibull(log('30 30 12+'))).toThrow(/before the longest run/);
    expect(() => weibullQuantile({ shape: 1, scalePulls: 1, logLikelihood: 0 }, 1)).toThrow(
      /between 0 and 1/,
    );
  });
});

describe('survival: Kaplan and Meier, Greenwood; data of Freireich 1963, from memory', () => {
  it.each([
    [6, 0.857143, 0.07636],
    [7, 0.806723, 0.086935],
    [10, 0.752941, 0.09635],
    [13, 0.690196, 0.106815],
    [16, 0.627451, 0.114054],
    [22, 0.537815, 0.128234],
    [23, 0.448179, 0.134591],
  ])('after %i weeks (L5, L6, L7)', (pulls, share, error) => {
    const step = survival(REMISSION).find((one) => one.pulls === pulls);
    expect(step?.share).toBeCloseTo(share, 6);
    expect(step?.standardError).toBeCloseTo(error, 6);
  });

  it('half of the templates outlive 386 hours; the order of the log is nothing', () => {
    expect(survival(NIST).at(-1)).toMatchObject({ pulls: 386, share: expect.closeTo(0.5, 12) });
    expect(survival([...PULLS].reverse())).toEqual(survival(PULLS));
    expect(survival(log('10 10'))).toEqual([{ pulls: 10, share: 0, standardError: 0 }]);
    expect(survival(log('10+ 12+'))).toEqual([]);
  });
});

describe('what a log without failures shows', () => {
  it('22 templates for 90 % at 90 % (L10), 59 for 95 % at 95 %, and back', () => {
    expect(successRun(0.9, 0.9)).toBe(22);
    expect(successRun(0.95, 0.95)).toBe(59);
    expect(provenReliability(22, 0.9)).toBeGreaterThanOrEqual(0.9);
    expect(provenReliability(21, 0.9)).toBeLessThan(0.9);
    expect(() => successRun(1, 0.9)).toThrow(/share between 0 and 1/);
  });

  it('mean life of an even rate: ln 10 of the pulls without a failure, less with each', () => {
    expect(meanAtLeast(1000, 0, 0.9)).toBeCloseTo(1000 / Math.log(10), 6);
    // 90 % point of chi-square with 4 degrees of freedom, 7.7794, halved.
    expect(meanAtLeast(1000, 1, 0.9)).toBeCloseTo(1000 / 3.8897, 1);
    expect(meanAtLeast(1000, 4, 0.9)).toBeLessThan(meanAtLeast(1000, 3, 0.9));
  });

  it('fewer than 5 failures: survival and a bound only, no curve', () => {
    expect(judgePullLog(log('20 31 40 44+ 60+'), 30)).toMatchObject({
      failures: 3,
      weibull: null,
      provenShare: null,
    });
    const good = judgePullLog(log('60+ 60+ 60+'), 50);
    expect(good).toMatchObject({ failures: 0, meanBetweenPulls: null, survival: [] });
    expect(good.provenShare).toBeCloseTo(0.1 ** (1 / 3), 9);
    const many = judgePullLog(PULLS, 50);
    expect(many.weibull?.b10Pulls).toBeCloseTo(16.7504, 3);
    expect(many.meanBetweenPulls).toBeCloseTo(349 / 6, 9);
  });
});

describe('reading a log', () => {
  it.each([
    ['no list', {}, /not a list/],
    ['none', [], /empty/],
    ['a part of a pull', [{ pulls: 3.5, failed: true }], /entry 1 has pulls 3.5/],
    ['no verdict', [{ pulls: 3, failed: true }, { pulls: 4 }], /entry 2 has no "failed"/],
    ['a word', ['12'], /entry 1 has no "pulls"/],
  ])('refuses %s', (_, given, message) => {
    expect(() => readPullLog(given)).toThrow(message);
  });

  it('takes what is right, and nothing beside', () => {
    expect(readPullLog([{ pulls: 3, failed: false, note: 'x' }])).toEqual([{ pulls: 3, failed: false }]);
  });
});
