import { describe, expect, it } from 'vitest';
import { carved, rectangle, turnedRing } from '../../../fixtures/meshes/carved';
import { turned } from '../../../fixtures/meshes/triangles';
import { analysed } from '../acceptance/claims';
import { checkOf, polygonArea } from '../run-engine';

describe('grooves closed at both ends: their long sides are neighbours', () => {
  it.each([0, 30])('10 wide, 50 long, 18 deep, turned by %s°: 18 over 10', (deg) => {
    const mesh = turned(carved(rectangle(100, 80), 30, [{ ring: rectangle(10, 50), z: 12 }]), deg);
    const report = analysed(mesh, { grid: { cellMm: 0.5 } });
    expect(report.spacing).toHaveLength(1);
    const [pair] = report.spacing;
    expect(pair.gapAtBedMm).toBeCloseTo(10, 3);
    expect(pair.gapMm).toBeCloseTo(10, 3);
    expect(pair.heightMm).toBeCloseTo(18, 6);
    expect(pair.heightOverGap).toBeCloseTo(1.8, 4);
    const [a, b] = pair.between;
    expect(Math.hypot(a[0] - b[0], a[1] - b[1])).toBeCloseTo(10, 3);
    expect(checkOf(report, 'spacing').status).toBe('fail');
  });

  it('drafted sides are wider apart at the top', () => {
    const mesh = carved(rectangle(100, 80), 30, [
      { ring: rectangle(14, 54), foot: rectangle(10, 50), z: 12 },
    ]);
    const [pair] = analysed(mesh, { grid: { cellMm: 0.5 } }).spacing;
    expect(pair.gapAtBedMm).toBeCloseTo(10, 1);
    expect(pair.gapMm).toBeCloseTo(14, 1);
  });

  it('a pit less than three times as long as wide is a hole, not a pair of walls', () => {
    const pit = (long: number) => carved(rectangle(100, 80), 30, [{ ring: rectangle(10, long), z: 12 }]);
    expect(analysed(pit(28), { grid: { cellMm: 0.5 } }).spacing).toEqual([]);
    expect(analysed(pit(32), { grid: { cellMm: 0.5 } }).spacing).toHaveLength(1);
  });
});

describe('pits of a few cells, on a template of 300 mm', () => {
  it('1.2 × 1.2 × 5 and a round one of 2 mm, 8 deep, in cells of 0.5 mm: volumes within 1 %', () => {
    const pits = [{ ring: rectangle(1.2, 1.2, 10, 10), z: 15 }, { ring: turnedRing(1, 24, -30, 20), z: 12 }]; // prettier-ignore
    const { airTraps } = analysed(carved(rectangle(300, 200), 20, pits), { grid: { cellMm: 0.5 } });
    expect(airTraps.map(({ spillZMm }) => spillZMm)).toEqual([20, 20]);
    expect(Math.abs(airTraps[0].volumeMm3 / (8 * polygonArea(1, 24)) - 1)).toBeLessThan(0.01);
    expect(Math.abs(airTraps[1].volumeMm3 / (1.44 * 5) - 1)).toBeLessThan(0.01);
    expect(Math.abs(airTraps[1].planAreaMm2 / 1.44 - 1)).toBeLessThan(0.01);
  });

  it('a vent in a small pit adds nothing to its volume', () => {
    const pit = {
      ring: rectangle(4, 4, 10, 10),
      z: 15,
      pockets: [{ ring: turnedRing(0.5, 24, 10, 10), z: 0 }],
    };
    const { airTraps, vents } = analysed(carved(rectangle(300, 200), 20, [pit]), { grid: { cellMm: 0.5 } });
    expect(vents).toHaveLength(1);
    expect(airTraps).toHaveLength(1);
    expect(Math.abs(airTraps[0].volumeMm3 / 80 - 1)).toBeLessThan(0.01);
  });

  it('a floor with noise of 0.03 mm (seed 5) is one pit, as large as its mean depth makes it', () => {
    // Blocks of 2 mm on the floor, 0 to 0.03 high: 0.05 mm and less is surface.
    let state = 5;
    const next = () => (state = (state * 1103515245 + 12345) % 2 ** 31) / 2 ** 31;
    const islands = [];
    let filled = 0;
    for (let i = 0; i < 5; i++) {
      for (let j = 0; j < 5; j++) {
        const high = 0.001 + 0.029 * next();
        islands.push({ ring: rectangle(2, 2, 3 * i - 6, 3 * j - 6), z: 10 + high });
        filled += 4 * high;
      }
    }
    const mesh = carved(rectangle(60, 60), 20, [{ ring: rectangle(20, 20), z: 10, islands }]);
    const { airTraps } = analysed(mesh, { grid: { cellMm: 0.25 } });
    expect(airTraps).toHaveLength(1);
    expect(airTraps[0]).toMatchObject({ spillZMm: 20, trapsAir: true, parent: null });
    expect(Math.abs(airTraps[0].volumeMm3 / (4000 - filled) - 1)).toBeLessThan(0.01);
  });
});
