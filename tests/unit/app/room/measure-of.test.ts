import { describe, expect, it } from 'vitest';
import {
  figureOf,
  measureOf,
  pairMark,
  pairWords,
} from '@/app/w/[workspace]/templates/[template]/[letter]/_components/measure-of';

const measure = (
  checkId: string,
  status: 'pass' | 'caution' | 'fail' | 'not-run',
  measured: number | null,
  limit: number | null,
) => measureOf({ checkId, status, measured, limit, unit: 'mm' }, 'mm');

describe('measureOf', () => {
  it('knows which side of its limit a check wants', () => {
    expect(measure('sheet', 'fail', 0.31, 0.35)?.sense).toBe('at-least');
    expect(measure('undercut', 'fail', 0.31, 0.2)?.sense).toBe('at-most');
    expect(measure('draft', 'pass', 6, 5)?.sense).toBe('at-least');
  });

  it('reads it from the finding for a check that it does not know', () => {
    expect(measure('other', 'fail', 0.31, 0.35)?.sense).toBe('at-least');
    expect(measure('other', 'pass', 1.2, 2)?.sense).toBe('at-most');
  });

  it('draws no bar where the figures would show no breach: a pocket without a vent beside wide vents', () => {
    expect(measure('vents', 'fail', 0.8, 0.4)).toBeNull();
  });

  it.each([
    ['nothing measured', null, 5],
    ['no limit', 3, null],
    ['a limit of nothing', 2, 0],
    ['a negative figure', -2, 5],
    ['a sharp edge, a radius of nothing', 0, 0.8],
    ['an endless figure', Infinity, 5],
    ['a breach of nothing', 5, 5],
  ])('draws no bar for %s', (_what, measured, limit) => {
    expect(measure('draft', 'fail', measured, limit)).toBeNull();
  });
});

describe('measured against limit in words', () => {
  const pair = (
    checkId: string,
    status: 'pass' | 'caution' | 'fail' | 'not-run',
    [measured, limit]: [number | null, number | null],
    unit = 'mm',
  ) => pairWords({ checkId, status, measured, limit, unit }, 'mm');

  it('gives both figures and the side that is wanted', () => {
    expect(pair('draft', 'caution', [4.21, 6.81], 'deg')).toBe('measured 4.2°, at least 6.8° wanted');
    expect(pair('edges', 'caution', [0, 0.8])).toBe('measured 0\u202fmm, at least 0.80\u202fmm wanted');
    expect(pair('spacing', 'fail', [1.62, 1], 'height/gap')).toBe('measured 1.62, at most 1 wanted');
    expect(pair('draw', 'pass', [1.8, 3], 'ratio')).toBe('measured 1.80, at most 3 wanted');
    expect(pair('draw', 'fail', [0.31, 0.35])).toBe('measured 0.31\u202fmm, at least 0.35\u202fmm wanted');
  });

  it('fits on a mark', () => {
    const mark = (checkId: string, measured: number, limit: number) =>
      pairMark({ checkId, status: 'fail', measured, limit, unit: 'mm' }, 'mm');
    expect(mark('undercut', 0.43, 0.2)).toBe('0.43, most 0.20\u202fmm');
    expect(mark('edges', 0, 0.8)).toBe('0, least 0.80\u202fmm');
    expect(mark('vents', 0.8, 0.4)).toBeNull();
  });

  it('says nothing where one is missing, nothing was run, or the two do not show the breach', () => {
    expect(pair('draft', 'caution', [null, 5], 'deg')).toBeNull();
    expect(pair('print', 'pass', [50_400, null], 's')).toBeNull();
    expect(pair('heat', 'not-run', [60, 70], '°C')).toBeNull();
    expect(pair('vents', 'fail', [0.8, 0.4])).toBeNull();
    expect(pair('release', 'caution', [9, 7], 'deg')).toBeNull();
    expect(pair('mesh', 'caution', [2, 0], 'warnings')).toBeNull();
  });
});

describe('figureOf', () => {
  it('turns lengths, areas and volumes into inches by the exact inch', () => {
    expect(figureOf(25.4, 'mm', 'in')).toMatchObject({ value: 1, unit: 'in' });
    expect(figureOf(645.16, 'mm²', 'in').value).toBeCloseTo(1, 12);
    expect(figureOf(16387.064, 'mm3', 'in').value).toBeCloseTo(1, 12);
  });

  it('leaves angles, shares and counts as they are', () => {
    expect(figureOf(4.25, 'deg', 'in')).toEqual({ value: 4.25, unit: '°', digits: 1 });
    expect(figureOf(3, '', 'in')).toEqual({ value: 3, unit: '', digits: 0 });
    expect(figureOf(1.62, 'height/gap', 'mm')).toEqual({ value: 1.62, unit: '', digits: 2 });
    expect(figureOf(50_400, 's', 'mm')).toEqual({ value: 14, unit: 'h', digits: 1 });
    expect(figureOf(12.5, '%', 'in')).toEqual({ value: 12.5, unit: '%', digits: 1 });
  });
});
