import { describe, expect, it } from 'vitest';
import { box, extrude, frustum, lathe, plate, ring } from '../../../fixtures/meshes/solids';
import { flipped, moved, together } from '../../../fixtures/meshes/triangles';
import { checkOf, polygonArea, polygonPerimeter, reportOn } from '../run-engine';

type P = [number, number];
const near = (value: number, expected: number, share: number) =>
  expect(Math.abs(value - expected), `${value} against ${expected}`).toBeLessThanOrEqual(
    share * Math.abs(expected),
  );

describe('undercut (closed forms; layered depth intervals at cell centres)', () => {
  it('row D4: a mushroom r 20 on a stem r 10 has 942.48 mm² of underside, 10 mm deep', () => {
    const sides = 128;
    const mushroom = lathe([[0, 0], [10, 0], [10, 20], [20, 20], [20, 30], [0, 30]], sides); // prettier-ignore
    const { undercut } = reportOn(mushroom);
    const underside = polygonArea(20, sides) - polygonArea(10, sides);
    near(undercut.overhangAreaMm2, underside, 1e-5);
    near(undercut.overhangAreaMm2, 942.4778, 0.005);
    near(undercut.shadowedAreaMm2, underside + 20 * polygonPerimeter(10, sides), 0.005);
    near(undercut.undercutVolumeMm3, 20 * underside, 0.01);
    expect(undercut.enclosedVolumeMm3).toBe(0);
    near(undercut.maxDepthMm, 10, 0.02);
    expect(undercut.regions).toHaveLength(1);
  });

  it('a T has one undercut on each side, 20 mm deep', () => {
    const profile: P[] = [[-10, 0], [10, 0], [10, 20], [30, 20], [30, 30], [-30, 30], [-30, 20], [-10, 20]]; // prettier-ignore
    const { undercut } = reportOn(extrude(profile, 60));
    near(undercut.overhangAreaMm2, 2400, 1e-6);
    near(undercut.shadowedAreaMm2, 4800, 0.005);
    near(undercut.undercutVolumeMm3, 48_000, 0.005);
    expect(undercut.regions.map((region) => Math.round(region.maxDepthMm))).toEqual([20, 20]);
  });

  it('a dovetail groove hides its walls and the outer parts of its floor', () => {
    const groove: P[] = [[-30, 0], [30, 0], [30, 20], [5, 20], [10, 10], [-10, 10], [-5, 20], [-30, 20]]; // prettier-ignore
    const { undercut } = reportOn(extrude(groove, 50));
    near(undercut.overhangAreaMm2, 2 * Math.sqrt(125) * 50, 1e-5);
    near(undercut.shadowedAreaMm2, (2 * Math.sqrt(125) + 2 * 5) * 50, 0.01);
    near(undercut.undercutVolumeMm3, 2 * 25 * 50, 0.015);
    near(undercut.maxDepthMm, 5, 0.03);
  });

  it('a tunnel from side to side is undercut to its middle', () => {
    const outline: P[] = [[-30, 0], [30, 0], [30, 30], [-30, 30]]; // prettier-ignore
    const hole: P[] = [[-5, 10], [5, 10], [5, 20], [-5, 20]]; // prettier-ignore
    // Drawn lying: its y is up, its thickness runs along z.
    const { undercut, mesh } = reportOn(plate(outline, [hole], -20, 20), { mesh: { up: [0, 1, 0] } });
    expect(mesh.watertight).toBe(true);
    near(undercut.undercutVolumeMm3, 10 * 10 * 40, 0.01);
    near(undercut.overhangAreaMm2, 400, 1e-5);
    near(undercut.shadowedAreaMm2, 4 * 400, 0.01);
    near(undercut.maxDepthMm, 20, 0.02);
  });

  it('a wall that leans out by 2° is undercut by h tan 2°, found to a tenth of a cell', () => {
    const { undercut, recipe } = reportOn(frustum(120, 90, 40, [-2, 8, 8, 8]));
    const depth = 40 * Math.tan((2 * Math.PI) / 180);
    near(undercut.maxDepthMm, depth, 0.12);
    expect(recipe.grid.cellMm).toBeLessThan(0.16);
  });

  it('a lean of 0.05 mm in all is texture, though a cell is 0.2 mm wide', () => {
    const deg = (Math.atan(0.05 / 20) * 180) / Math.PI;
    const report = reportOn(frustum(200, 150, 20, [-deg, -deg, -deg, -deg]));
    expect(report.recipe.grid.cellMm).toBeGreaterThan(0.19);
    expect(report.undercut.maxDepthMm).toBeLessThan(0.2);
    expect(checkOf(report, 'undercut').status).toBe('pass');
  });
});

describe('enclosed air is no undercut', () => {
  it('a sealed void', () => {
    const { undercut, walls } = reportOn(together(box(60, 40, 30), flipped(moved(box(50, 30, 20), 0, 0, 5))));
    near(undercut.enclosedVolumeMm3, 50 * 30 * 20, 0.01);
    expect(undercut).toMatchObject({
      undercutVolumeMm3: 0,
      overhangAreaMm2: 0,
      shadowedAreaMm2: 0,
      maxDepthMm: 0,
    });
    expect(walls.hollow).toBe(true);
    near(walls.minMm ?? 0, 5, 0.03);
    near(walls.topMm ?? 0, 5, 0.03);
  });

  it('a shell open at the bed, which is closed', () => {
    const sides = 64;
    const shell = lathe([[36, 0], [40, 0], [40, 30], [0, 30], [0, 27], [36, 27]], sides); // prettier-ignore
    const { undercut, walls, mesh } = reportOn(shell);
    near(undercut.enclosedVolumeMm3, 27 * polygonArea(36, sides), 0.01);
    expect(undercut.undercutVolumeMm3).toBe(0);
    near(mesh.bedContactAreaMm2, polygonArea(40, sides) - polygonArea(36, sides), 1e-5);
    near(walls.minMm ?? 0, 4 * Math.cos(Math.PI / sides), 0.04);
    near(walls.topMm ?? 0, 3, 0.03);
  });

  it('shadow volume is the sum of both', () => {
    const open: P[] = [[-30, 0], [30, 0], [30, 20], [5, 20], [10, 10], [-10, 10], [-5, 20], [-30, 20]]; // prettier-ignore
    const { undercut } = reportOn(together(extrude(open, 50), flipped(moved(box(10, 10, 5), 20, 0, 2))));
    near(undercut.enclosedVolumeMm3, 500, 0.02);
    expect(undercut.shadowVolumeMm3).toBeCloseTo(undercut.undercutVolumeMm3 + undercut.enclosedVolumeMm3, 6);
  });
});

describe('a through vent is no cover', () => {
  it('plan area leaves a 10 mm hole out', () => {
    const outline: P[] = [[-30, -20], [30, -20], [30, 20], [-30, 20]]; // prettier-ignore
    const { plan, undercut } = reportOn(plate(outline, [ring(5, 48)], 0, 15));
    near(plan.planAreaMm2, 2400 - polygonArea(5, 48), 0.005);
    expect(undercut.shadowVolumeMm3).toBe(0);
  });
});
