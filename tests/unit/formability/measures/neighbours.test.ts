import { describe, expect, it } from 'vitest';
import { box, frustum, lathe } from '../../../fixtures/meshes/solids';
import { moved, together, turned } from '../../../fixtures/meshes/triangles';
import { checkOf, reportOn } from '../run-engine';

const rad = Math.PI / 180;

describe('spacing: height of the lower neighbour over the gap at the bed', () => {
  it('two boxes, 45 and 30 high, 26 apart', () => {
    const report = reportOn(together(box(30, 40, 45), moved(box(30, 40, 30), 56, 0, 0)));
    expect(report.spacing).toHaveLength(1);
    const [pair] = report.spacing;
    expect(Math.abs(pair.gapAtBedMm - 26)).toBeLessThan(0.15);
    expect(pair.heightMm).toBeCloseTo(30, 6);
    expect(pair.heightOverGap).toBeCloseTo(30 / 26, 1);
    expect(checkOf(report, 'spacing')).toMatchObject({ status: 'caution', limit: 1 });
    expect(checkOf(report, 'spacing').remedy).toMatch(/^Widen the gap to 30 mm/);
  });

  it('passes when its remedy is followed, turned out of the grid as well', () => {
    const mesh = turned(together(box(30, 40, 45), moved(box(30, 40, 30), 60.5, 0, 0)), 30);
    expect(checkOf(reportOn(mesh), 'spacing').status).toBe('pass');
  });

  it('drafted neighbours are wider apart at the top', () => {
    const tower = frustum(30, 40, 30, 8);
    const { spacing } = reportOn(together(tower, moved(tower, 40, 0, 0)));
    expect(Math.abs(spacing[0].gapAtBedMm - 10)).toBeLessThan(0.25);
    expect(Math.abs(spacing[0].gapMm - (10 + 60 * Math.tan(8 * rad)))).toBeLessThan(0.6);
    expect(spacing[0].heightOverGap).toBeGreaterThan(2.9);
  });

  it('a tower inside a ring has the ring all round; a lone part has no neighbour', () => {
    const ringAndTower = together(
      lathe([[30, 0], [40, 0], [40, 20], [30, 20]], 96),
      lathe([[0, 0], [10, 0], [10, 25], [0, 25]], 96),
    ); // prettier-ignore
    const { spacing } = reportOn(ringAndTower);
    expect(spacing).toHaveLength(1);
    expect(Math.abs(spacing[0].gapAtBedMm - 20)).toBeLessThan(0.2);
    expect(spacing[0].heightMm).toBeCloseTo(20, 6);
    expect(reportOn(box(30, 40, 45)).spacing).toEqual([]);
  });

  it('towers on a common plate stand over the plate, not over the bed', () => {
    const plateAndTowers = together(
      box(120, 60, 10),
      moved(box(20, 20, 40), -25, 0, 0),
      moved(box(20, 20, 40), 25, 0, 0),
    );
    const { spacing } = reportOn(plateAndTowers);
    expect(Math.abs(spacing[0].heightMm - 30)).toBeLessThan(0.2);
    expect(Math.abs(spacing[0].gapAtBedMm - 30)).toBeLessThan(0.3);
  });
});

describe('edges: radius against the gauge', () => {
  it('a box has four upright edges and four round its top, all sharp; the foot is on the bed', () => {
    const { edges } = reportOn(box(60, 40, 20), { grid: { cellMm: 0.5 } });
    expect(edges.sharpConvexMm).toBeCloseTo(4 * 20 + 2 * 100, 6);
    expect(edges).toMatchObject({ sharpConcaveMm: 0, minConvexRadiusMm: 0, minConcaveRadiusMm: null });
  });

  it('a rounded rim of radius 3 in twelve strips reads 3', () => {
    const rim: [number, number][] = [[0, 0], [40, 0]]; // prettier-ignore
    for (let i = 0; i <= 12; i++) rim.push([37 + 3 * Math.cos((i * 7.5 * Math.PI) / 180), 17 + 3 * Math.sin((i * 7.5 * Math.PI) / 180)]); // prettier-ignore
    rim.push([0, 20]);
    const report = reportOn(lathe(rim, 180), { grid: { cellMm: 0.5 } });
    expect(report.edges.sharpConvexMm).toBe(0);
    expect(report.edges.minConvexRadiusMm).toBeCloseTo(3, 1);
    expect(checkOf(report, 'edges')).toMatchObject({ status: 'pass', limit: 0.8 });
  });

  it('an inside corner is concave', () => {
    const step: [number, number][] = [[0, 0], [40, 0], [40, 10], [20, 10], [20, 30], [0, 30]]; // prettier-ignore
    const { edges } = reportOn(lathe(step, 180), { grid: { cellMm: 0.5 } });
    expect(edges.sharpConcaveMm / (2 * Math.PI * 20)).toBeCloseTo(1, 2);
    expect(edges.sharpConvexMm / (2 * Math.PI * 60)).toBeCloseTo(1, 2);
  });
});
