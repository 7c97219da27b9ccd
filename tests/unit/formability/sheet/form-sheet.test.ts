import { describe, expect, it } from 'vitest';
import { formSheet, gridCells, type FormedSheet } from '@/lib/formability/sheet/form-sheet';
import type { SheetInput } from '@/lib/formability/sheet/sheet-input';
import { UnusableInput } from '@/lib/formability/unusable-input';
import { block, field, frustum } from './templates';

const GAUGE = 0.8;

function input(over: Partial<SheetInput> = {}): SheetInput {
  return {
    template: field([60, 40], block(60, 40, 20, 5)),
    frameMm: [104, 80],
    gaugeMm: GAUGE,
    minFormedMm: 0.35,
    ...over,
  };
}

/** Area of the surface as drawn, and of its triangles times thickness between the nodes. */
function measure({ surface }: FormedSheet): { area: number; volume: number } {
  const { positions: p, indices, thicknessMm } = surface;
  let [area, volume] = [0, 0];
  for (let t = 0; t < indices.length; t += 3) {
    const [a, b, c] = [indices[t], indices[t + 1], indices[t + 2]];
    const [u, v] = [b, c].map((n) => [0, 1, 2].map((axis) => p[3 * n + axis] - p[3 * a + axis]));
    const cross = [u[1] * v[2] - u[2] * v[1], u[2] * v[0] - u[0] * v[2], u[0] * v[1] - u[1] * v[0]];
    const own = Math.hypot(...cross) / 2;
    area += own;
    volume += (own * (thicknessMm[a] + thicknessMm[b] + thicknessMm[c])) / 3;
  }
  return { area, volume };
}

const usual = formSheet(input(), { nodes: 64 });

describe('a drafted block', () => {
  it('keeps the sheet’s volume, and says how much of it is where', () => {
    const { report, surface } = usual;
    expect(Math.abs(report.volumeErrorPercent)).toBeLessThan(1e-4);
    const { area, volume } = measure(usual);
    expect(report.meanMm).toBeCloseTo((104 * 80 * GAUGE) / area, 5);
    // Nodal thickness, volume-true at each node, gives the volume again but for folds, which count as one layer.
    expect(Math.abs(volume / (104 * 80 * GAUGE) - 1)).toBeLessThan(0.03);
    // The formed surface cannot be less than top, bed and walls in the open part of the frame.
    const tan = Math.tan((5 * Math.PI) / 180);
    const plain = 104 * 80 + (2 * (60 + 40) - 8 * 10 * tan) * 20 * (1 / Math.cos(Math.atan(tan)) - tan);
    expect(Math.abs(area / plain - 1)).toBeLessThan(0.03);
    expect(surface.nodes).toEqual([65, 49]);
    expect(report.nodes).toEqual([65, 49]);
    expect(surface.indices.length).toBe(3 * 2 * 64 * 48);
    expect(surface.contact.length).toBe(65 * 49);
  });

  it('lies on template and bed, never below either', () => {
    const { positions, contact } = usual.surface;
    const height = block(60, 40, 20, 5);
    for (let n = 0; n < contact.length; n++) {
      const [x, y, z] = positions.subarray(3 * n, 3 * n + 3);
      expect(z).toBeGreaterThan(-1e-6);
      // As far as cells blur a 5° wall: half a cell over the wall's tangent.
      if (Math.abs(x) < 29.5 && Math.abs(y) < 19.5) expect(z).toBeGreaterThan(height(x, y) - 0.13 / Math.tan((5 * Math.PI) / 180) - 0.01); // prettier-ignore
    }
  });

  it('orders its figures: least disc, 1 %, 5 %, mean; top thick, foot thin', () => {
    const { report, thicknessAt } = usual;
    expect(report.q01Mm).toBeLessThanOrEqual(report.q05Mm);
    expect(report.q05Mm).toBeLessThan(report.meanMm);
    expect(report.minMm).toBeLessThan(report.q05Mm * 1.1);
    expect(report.minMm).toBeGreaterThan(0.1 * GAUGE);
    expect(thicknessAt(0, 0)).toBeCloseTo(GAUGE, 6);
    expect(thicknessAt(30 - 10 * Math.tan((5 * Math.PI) / 180), 0, 10)).toBeLessThan(0.8 * GAUGE);
    expect(thicknessAt(200, 0)).toBeNaN();
    expect(report.converged).toBe(true);
    expect(usual.outcome).toBe('converged');
    expect(report.marginPercent).toBe(['flat', 'wall'].includes(usual.minPlace) ? 20 : 30);
    const [x, y] = report.minAt;
    expect(Math.abs(x)).toBeLessThan(52);
    expect(Math.abs(y)).toBeLessThan(40);
  });

  it('is the same in each quarter of the template', () => {
    const { thicknessAt } = usual;
    let most = 0;
    for (const [x, y, z] of [
      [29.2, 6, 9],
      [12, 19.2, 9],
      [38, 5, 0],
      [10, 28, 0],
      [40, 27, 0],
      [27, 17, 18],
    ]) {
      // prettier-ignore
      const here = thicknessAt(x, y, z);
      for (const [sx, sy] of [[-1, 1], [1, -1], [-1, -1]]) most = Math.max(most, Math.abs(thicknessAt(sx * x, sy * y, z) / here - 1)); // prettier-ignore
    }
    expect(most).toBeLessThan(1e-5);
  });

  it('gives the same bits twice, and runs that take turns do not disturb each other', () => {
    let inner: FormedSheet | undefined;
    let asked = 0;
    const outer = formSheet(input(), {
      nodes: 64,
      shouldStop: () => {
        if (++asked === 70) inner = formSheet(input({ template: field([50, 50], block(50, 50, 15, 10)) }), { nodes: 32 }); // prettier-ignore
        return false;
      },
    });
    const alone = formSheet(input({ template: field([50, 50], block(50, 50, 15, 10)) }), { nodes: 32 });
    expect(outer.report).toEqual(usual.report);
    expect(outer.surface).toEqual(usual.surface);
    expect(inner?.report).toEqual(alone.report);
    expect(inner?.surface).toEqual(alone.surface);
  });
});

describe('what must not change the answer, or change it by a known factor', () => {
  it('a template turned by 90° in a frame turned with it', () => {
    const turned = formSheet(input({ template: field([40, 60], block(40, 60, 20, 5)), frameMm: [80, 104] }), {
      nodes: 64,
    });
    expect(turned.report.nodes).toEqual([49, 65]);
    for (const key of ['q01Mm', 'q05Mm', 'meanMm'] as const) {
      expect(Math.abs(turned.report[key] / usual.report[key] - 1)).toBeLessThan(1e-4);
    }
    expect(turned.thicknessAt(6, 29.2, 9)).toBeCloseTo(usual.thicknessAt(29.2, 6, 9), 4);
  });

  it('a template elsewhere on the bed', () => {
    const template = { ...input().template, originX: 512 - 30, originY: -256 - 20 };
    const away = formSheet(input({ template }), { nodes: 64 });
    for (const key of ['q01Mm', 'q05Mm', 'meanMm'] as const) {
      expect(Math.abs(away.report[key] / usual.report[key] - 1)).toBeLessThan(1e-4);
    }
    expect(away.thicknessAt(512 + 29.2, -256 + 6, 9)).toBeCloseTo(usual.thicknessAt(29.2, 6, 9), 4);
  });

  it('doubled gauge doubles every thickness, to the bit, while p/(μ t0) is held', () => {
    const thick = formSheet(input({ gaugeMm: 2 * GAUGE, minFormedMm: 0.7 }), { nodes: 64 });
    for (const key of ['minMm', 'q01Mm', 'q05Mm', 'meanMm'] as const) {
      expect(thick.report[key]).toBe(2 * usual.report[key]);
    }
    expect(thick.report.belowLimitAreaMm2).toBe(usual.report.belowLimitAreaMm2);
    expect(thick.surface.positions).toEqual(usual.surface.positions);
  });

  it('doubled pressure with doubled modulus changes nothing; less pressure leaves corners open', () => {
    const press = (pressureMPa: number, modulusMPa: number) =>
      formSheet(input({ load: { pressureMPa, modulusMPa } }), { nodes: 48 });
    const one = press(0.05, 1);
    const two = press(0.1, 2);
    expect(two.report).toEqual(one.report);
    const weak = press(0.01, 1);
    expect(weak.report.unclosedAreaMm2).toBeGreaterThan(one.report.unclosedAreaMm2);
    expect(weak.report.minMm).toBeGreaterThan(one.report.minMm);
    expect(weak.pressureRatio).toBeCloseTo(0.01 / GAUGE, 12);
  });
});

describe('refinement', () => {
  it('on a smooth hill the figures settle at second order', () => {
    const hill = field([60, 60], (x, y) => {
      const r = Math.hypot(x, y) / 30;
      return r < 1 ? 18 * Math.cos((r * Math.PI) / 2) ** 2 : 0;
    });
    const runs = [32, 64, 128].map((nodes) =>
      formSheet(input({ template: hill, frameMm: [100, 100] }), { nodes }),
    );
    const means = runs.map((one) => one.report.meanMm);
    const q05 = runs.map((one) => one.report.q05Mm);
    expect(Math.abs(means[2] / means[1] - 1)).toBeLessThan(0.5 * Math.abs(means[1] / means[0] - 1));
    expect(Math.abs(q05[2] / q05[1] - 1)).toBeLessThan(0.01);
    expect(runs[2].report.meshErrorPercent).toBeCloseTo((100 * Math.abs(q05[2] - q05[1])) / q05[2], 9);
    expect(runs[2].report.webAreaMm2).toBe(0);
    expect(runs[2].report.marginPercent).toBe(20);
  });
});

describe('pits, towers and undercuts', () => {
  it('a deep round pit is thinnest at its foot, and has the greater margin', () => {
    const pit = field([80, 80], (x, y) => {
      const r = Math.hypot(x, y);
      return r > 40 ? 0 : r > 16 ? 18 : 3;
    });
    const { report, minPlace } = formSheet(input({ template: pit, frameMm: [120, 120] }), { nodes: 64 });
    expect(Math.hypot(report.minAt[0], report.minAt[1])).toBeLessThan(17.5);
    expect(report.minAt[2]).toBeLessThan(8);
    expect(['inner-corner', 'pit']).toContain(minPlace);
    expect(report.marginPercent).toBe(30);
    expect(report.minMm).toBeLessThan(0.4 * GAUGE);
  });

  it('between near neighbours the sheet stays open; at 2.4 times their height apart it closes', () => {
    const towers = (gap: number) => {
      const one = block(24, 24, 18, 5);
      const apart = (24 + gap) / 2;
      return formSheet(
        input({
          template: field([48 + gap, 24], (x, y) => Math.max(one(x - apart, y), one(x + apart, y))),
          frameMm: [150, 100],
        }),
        { nodes: 64 },
      ).report;
    };
    const near = towers(12);
    const far = towers(44);
    expect(far.unclosedAreaMm2).toBe(0);
    expect(near.unclosedAreaMm2).toBeGreaterThan(300);
  });

  it('a flat bed leaves the sheet as it was', () => {
    const flat = formSheet(input({ template: field([20, 20], () => 0) }), { nodes: 16 });
    for (const key of ['minMm', 'q01Mm', 'q05Mm', 'meanMm'] as const)
      expect(flat.report[key]).toBeCloseTo(GAUGE, 12);
    expect(flat.report).toMatchObject({
      unclosedAreaMm2: 0,
      webAreaMm2: 0,
      belowLimitAreaMm2: 0,
      marginPercent: 20,
    });
    expect(flat.report.converged).toBe(true);
  });
});

describe('asking and refusing', () => {
  it('tells how far it is, never backwards, to the end', () => {
    const shares: number[] = [];
    formSheet(input(), { nodes: 32, preview: true, onProgress: (share) => shares.push(share) });
    expect(shares.length).toBeGreaterThan(60);
    shares.reduce((before, share) => {
      expect(share).toBeGreaterThanOrEqual(before);
      return share;
    }, 0);
    expect(shares.at(-1)).toBe(1);
  });

  it('stops at the next step when asked', () => {
    let steps = 0;
    const stopped = () =>
      formSheet(input(), { nodes: 64, shouldStop: () => ++steps > 5, onProgress: () => undefined });
    expect(stopped).toThrow(expect.objectContaining({ code: 'stopped' }));
    expect(steps).toBe(6);
  });

  it.each<[string, Partial<SheetInput>, RegExp]>([
    ['a frame inside the template', { frameMm: [58, 80] }, /past the frame opening along x/],
    ['no gauge', { gaugeMm: 0 }, /sheet gauge \(mm\) is 0/],
    ['a limit that is no number', { minFormedMm: NaN }, /least formed thickness/],
    ['a height that is no number', { template: field([10, 10], () => NaN) }, /negative or no number/],
    [
      'too few heights',
      { template: { ...field([10, 10], () => 1), nx: 3 } },
      /1600 heights for 3 × 40 cells/,
    ],
    ['a load without strength', { load: { pressureMPa: 1, modulusMPa: -1 } }, /shear modulus/],
  ])('%s is refused in words', (_, over, words) => {
    const form = () => formSheet(input(over));
    expect(form).toThrow(UnusableInput);
    expect(form).toThrow(words);
  });

  it('refuses a number of nodes that it cannot honour', () => {
    expect(() => formSheet(input(), { nodes: 4096 })).toThrow(/16 to 512/);
  });

  it('has square elements as nearly as eights allow', () => {
    expect(gridCells([180, 150], 128)).toEqual([128, 104]);
    expect(gridCells([100, 300], 128)).toEqual([40, 128]);
    expect(gridCells([300, 20], 32)).toEqual([32, 8]);
  });

  it('takes a round template as well, symmetric about both diagonals', () => {
    const profile = frustum(12, 15, 10);
    const round = formSheet(
      input({ template: field([40, 40], (x, y) => profile(Math.hypot(x, y))), frameMm: [72, 72] }),
      { nodes: 32 },
    );
    expect(round.thicknessAt(20, 3)).toBeCloseTo(round.thicknessAt(3, 20), 3);
    expect(round.report.unclosedAreaMm2).toBe(0);
  });
});
