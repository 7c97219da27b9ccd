import { describe, expect, it } from 'vitest';
import { findFoot } from '@/lib/formability/sheet/find-foot';
import { formSheet } from '@/lib/formability/sheet/form-sheet';
import { makeObstacle } from '@/lib/formability/sheet/obstacle';
import { roundFoot } from '@/lib/formability/sheet/round-foot';
import { block, field } from './templates';

describe('the foot of a template', () => {
  const ring = field([60, 60], (x, y) => {
    const r = Math.hypot(x, y);
    return r > 12 && r < 25 ? 20 : 0;
  });
  const foot = findFoot(makeObstacle(ring));

  it('is the band along the bed outside, no higher than the disc', () => {
    expect(foot.heightMm).toBe(3);
    expect(foot.holds(27, 0, 0.5)).toBe(true);
    expect(foot.holds(25.2, 0, 2.9)).toBe(true);
    expect(foot.holds(500, 0, 0)).toBe(true);
    expect(foot.holds(25.2, 0, 3.1)).toBe(false);
    expect(foot.holds(20, 0, 20)).toBe(false);
  });

  it('is not the bed that the template encloses: a hole belongs to the part', () => {
    expect(foot.holds(0, 0, 0)).toBe(false);
    expect(foot.holds(11.8, 0, 1)).toBe(false);
  });

  it('takes a third of a low template', () => {
    expect(findFoot(makeObstacle(field([40, 40], block(40, 40, 6, 5)))).heightMm).toBe(2);
  });
});

describe('a rounded foot', () => {
  const field60 = field([60, 40], block(60, 40, 20, 0));
  const rounded = makeObstacle(roundFoot(field60, 4));
  const heightFrom = (wall: number) => {
    const { cell, x0, y0, width, heights } = rounded;
    return heights[Math.round(-y0 / cell) * width + Math.round((30 + wall - x0) / cell)];
  };

  it('follows the quarter circle from wall to bed, and leaves all else', () => {
    for (const d of [0.625, 1.125, 2.125, 3.125]) {
      // 4 − √(4² − (4 − d)²), as far from the wall as a ball of 4 mm touches.
      const circle = 4 - Math.sqrt(16 - (4 - d) ** 2);
      expect(Math.abs(heightFrom(d) - circle)).toBeLessThan(0.35);
    }
    expect(heightFrom(4.125)).toBe(0);
    expect(heightFrom(-1)).toBe(20);
  });

  it('leaves more sheet there', () => {
    const input = { template: field60, frameMm: [100, 80] as const, gaugeMm: 1, minFormedMm: 0.3 };
    const footOf = (template: typeof field60) =>
      formSheet({ ...input, template }, { nodes: 48, single: true }).report.foot!.minMm;
    expect(footOf(roundFoot(field60, 4))).toBeGreaterThan(1.15 * footOf(field60));
  });
});

describe('zones of the formed sheet', () => {
  it('add up to the whole, and each has its own least thickness', () => {
    const { report, formedAreaMm2 } = formSheet(
      { template: field([60, 40], block(60, 40, 18, 3)), frameMm: [100, 80], gaugeMm: 1, minFormedMm: 0.4 },
      { nodes: 48 },
    );
    const { part, foot } = report;
    expect(part!.areaMm2 + foot!.areaMm2).toBeCloseTo(formedAreaMm2, 6);
    expect(part!.belowLimitAreaMm2 + foot!.belowLimitAreaMm2).toBeCloseTo(report.belowLimitAreaMm2, 6);
    expect(Math.min(part!.minMm, foot!.minMm)).toBeLessThan(report.minMm * 1.2);
    expect(part!.meshErrorPercent).toBeGreaterThan(0);
    const single = formSheet(
      { template: field([60, 40], block(60, 40, 18, 3)), frameMm: [100, 80], gaugeMm: 1, minFormedMm: 0.4 },
      { nodes: 48, single: true },
    ).report;
    expect(single.part).toEqual({ ...part, meshErrorPercent: 0 });
    expect(single.minMm).toBe(report.minMm);
  });
});
