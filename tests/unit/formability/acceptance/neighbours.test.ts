import { describe, expect, it } from 'vitest';
import { carved, rectangle } from '../../../fixtures/meshes/carved';
import { box, extrude, frustum, lathe, plate } from '../../../fixtures/meshes/solids';
import { moved, together, turned } from '../../../fixtures/meshes/triangles';
import { abs, analysed, hold, holdChecks, missesOf, rel } from './claims';

const rad = Math.PI / 180;
const cylinder = (r: number, h: number, x: number, y: number) =>
  moved(lathe([[0, 0], [r, 0], [r, h], [0, h]], 96), x, y, 0); // prettier-ignore

describe('towers and the gaps between them', () => {
  it.each([
    [12, 25, 0],
    [30, 25, 5],
    [8, 40, 3],
    [60, 20, 10],
  ])('a gap of %s mm, the lower tower %s mm high, drafts of %s°', (gap, low, deg) => {
    const mesh = together(frustum(30, 40, 45, deg), moved(frustum(30, 40, low, deg), 30 + gap, 0, 0));
    const report = hold(mesh, {
      'mesh.shells': 2,
      'spacing.length': 1,
      'spacing.0.gapAtBedMm': abs(gap, 0.15),
      'spacing.0.gapMm': abs(gap + 2 * low * Math.tan(deg * rad), 0.3),
      'spacing.0.heightMm': abs(low, 0.01),
      'spacing.0.heightOverGap': rel(low / gap, 0.015),
      'plan.formedAreaMm2': (value: unknown) => ((value as number) > 0 ? null : 'a positive area'),
    });
    holdChecks(report, { spacing: low / gap > 1 ? 'caution|fail' : 'pass' });
  });

  it('turned by 30° the gap is the same', () => {
    const mesh = turned(together(box(30, 40, 45), moved(box(30, 40, 30), 48, 0, 0)), 30);
    hold(mesh, { 'spacing.length': 1, 'spacing.0.gapAtBedMm': abs(18, 0.2), 'spacing.0.heightOverGap': rel(30 / 18, 0.015) }); // prettier-ignore
  });

  it('three in a row, the middle one the highest: the outer two do not face each other', () => {
    const mesh = together(
      box(20, 30, 45),
      moved(box(30, 30, 50), 37, 0, 0),
      moved(box(20, 30, 40), 82, 0, 0),
    );
    const { spacing } = analysed(mesh);
    const found = [...spacing].sort((a, b) => a.gapAtBedMm - b.gapAtBedMm);
    expect(
      missesOf(
        { found },
        {
          'found.length': 2,
          'found.0.gapAtBedMm': abs(12, 0.15),
          'found.0.heightOverGap': rel(45 / 12, 0.015),
          'found.1.gapAtBedMm': abs(20, 0.15),
          'found.1.heightOverGap': rel(40 / 20, 0.015),
        },
      ),
    ).toEqual([]);
  });

  it('three cylinders at the corners of a triangle: three gaps of 15 mm', () => {
    const mesh = together(cylinder(10, 30, 0, 0), cylinder(10, 20, 35, 0), cylinder(10, 40, 17.5, 35 * Math.sin(60 * rad))); // prettier-ignore
    const { spacing } = analysed(mesh);
    expect(spacing).toHaveLength(3);
    for (const pair of spacing) {
      expect(missesOf(pair, { gapAtBedMm: abs(15, 0.15), gapMm: abs(15, 0.3) })).toEqual([]);
      expect(pair.heightOverGap / (pair.heightMm / 15)).toBeCloseTo(1, 1);
    }
    expect(spacing.map((pair) => Math.round(pair.heightMm)).sort((a, b) => a - b)).toEqual([20, 20, 30]);
  });

  it('the points between which the gap is stand on the two towers, as far apart as it says', () => {
    const { spacing } = analysed(together(box(30, 40, 45), moved(box(30, 40, 30), 48, 0, 0)));
    const [a, b] = spacing[0].between;
    expect(Math.abs(Math.hypot(a[0] - b[0], a[1] - b[1]) - 18)).toBeLessThan(0.4);
    expect([a[0], b[0]].map((x) => Math.min(Math.abs(x - 15), Math.abs(x - 33)) < 0.3)).toEqual([true, true]);
  });

  it('a lone body has no neighbour; one on another has none either', () => {
    hold(frustum(60, 40, 20, 5), { spacing: [] });
    hold(together(box(60, 60, 10), moved(frustum(30, 30, 20, 5), 0, 0, 10)), { spacing: [] });
  });
});

describe('edges, to the length', () => {
  const sharp = (mesh: number[]) => analysed(mesh, { grid: { cellMm: 0.5 } }).edges;

  it('a block with a pit: rim and outline convex, floor and corners of the pit concave', () => {
    const block = carved(rectangle(60, 48), 30, [{ ring: rectangle(20, 20, 5, 4), z: 10 }]);
    expect(missesOf(sharp(block), { sharpConvexMm: abs(216 + 120 + 80, 0.01), sharpConcaveMm: abs(160, 0.01), minConvexRadiusMm: 0, minConcaveRadiusMm: 0 })).toEqual([]); // prettier-ignore
  });

  it('an L: one inside corner', () => {
    const l: [number, number][] = [[-30, 0], [30, 0], [30, 10], [0, 10], [0, 30], [-30, 30]]; // prettier-ignore
    const { sharpConcaveMm, sharpConvexMm } = sharp(extrude(l, 40));
    expect(sharpConcaveMm).toBeCloseTo(40, 3);
    // Along y: three edges above the bed; round both ends: everything above the bed but none on it.
    expect(sharpConvexMm).toBeCloseTo(3 * 40 + 2 * (10 + 30 + 20 + 30 + 30), 3);
  });

  it.each([1, 2, 5])('rounded corners of %s mm in twelve strips', (radius) => {
    const outline: [number, number][] = [];
    [[1, 1], [-1, 1], [-1, -1], [1, -1]].forEach(([sx, sy], k) => {
      for (let i = 0; i <= 12; i++) {
        const angle = (k * 90 + i * 7.5) * rad;
        outline.push([sx * (30 - radius) + radius * Math.cos(angle), sy * (20 - radius) + radius * Math.sin(angle)]);
      }
    }); // prettier-ignore
    const { sharpConvexMm, minConvexRadiusMm } = sharp(plate(outline, [], 0, 20));
    const rim = 4 * (30 + 20 - 2 * radius) + 4 * 12 * 2 * radius * Math.sin(3.75 * rad);
    // The rim is sharp; the upright corners are not, unless tighter than the sheet.
    expect(sharpConvexMm).toBeCloseTo(rim, 2);
    expect(minConvexRadiusMm).toBe(0);
  });
});
