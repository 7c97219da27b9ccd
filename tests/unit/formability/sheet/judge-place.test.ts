import { describe, expect, it } from 'vitest';
import { judgePlace, marginPercent } from '@/lib/formability/sheet/judge-place';
import { makeObstacle } from '@/lib/formability/sheet/obstacle';
import { block, field } from './templates';

const REACH = 3;

describe('what sort of place a point of the sheet is', () => {
  const wall = makeObstacle(field([60, 60], block(60, 60, 30, 5)));
  const pit = makeObstacle(field([60, 60], (x, y) => (Math.hypot(x, y) < 2 ? 4 : 30)));
  const pocket = makeObstacle(field([60, 60], (x, y) => (Math.hypot(x, y) < 9 ? 18 : 30)));
  const dish = makeObstacle(field([60, 60], (x, y) => (Math.hypot(x, y) < 13 ? 27 : 30)));
  const slope = makeObstacle(field([60, 60], (x) => Math.max(0, 30 - Math.abs(x))));
  const wallX = (z: number) => 30 - z * Math.tan((5 * Math.PI) / 180);

  it.each([
    ['flat', wall, [0, 0, 30]],
    ['flat', wall, [50, 0, 0]],
    ['wall', wall, [wallX(15), 0, 15]],
    ['wall', wall, [wallX(29.5), 0, 29.5]],
    ['wall', slope, [14, 0, 16]],
    ['inner-corner', wall, [30.5, 0, 0]],
    ['inner-corner', wall, [wallX(1), 4, 1]],
    ['inner-corner', wall, [31, 2, 2.5]],
    ['inner-corner', wall, [30.6, 30.6, 1]],
    ['pit', pit, [0, 0, 4]],
    ['pit', pit, [0.8, 0.3, 5]],
    ['pit', pocket, [0, 0, 18]],
    ['flat', dish, [0, 0, 27]],
  ] as const)('%s', (kind, template, at) => {
    expect(judgePlace(template, [...at], REACH)).toBe(kind);
  });

  it('has a margin of 30 % where two laws of the sheet differ most, 20 % elsewhere', () => {
    expect((['flat', 'wall', 'inner-corner', 'pit', 'web'] as const).map(marginPercent)).toEqual([
      20, 20, 30, 30, 30,
    ]);
  });
});
