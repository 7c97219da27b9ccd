import { describe, expect, it } from 'vitest';
import {
  figureOf,
  measureOf,
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
    ['an endless figure', Infinity, 5],
    ['a breach of nothing', 5, 5],
  ])('draws no bar for %s', (_what, measured, limit) => {
    expect(measure('draft', 'fail', measured, limit)).toBeNull();
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
