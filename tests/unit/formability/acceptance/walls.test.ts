import { describe, expect, it } from 'vitest';
import type { RecipeInput } from '@/lib/formability/recipe';
import { frustumAnswer, polygonFactor, turnedVolume } from '../../../fixtures/meshes/answers';
import { openFrustum, sealedFrustum } from '../../../fixtures/meshes/hollow';
import { box, lathe } from '../../../fixtures/meshes/solids';
import { moved, turned, type Triangles } from '../../../fixtures/meshes/triangles';
import { abs, analysed, hold, holdChecks, rel, tight, type Claims } from './claims';

/** Coarser cells than the default: what is held here needs no finer ones. */
const quick = (mesh: Triangles, claims: Claims, recipe: RecipeInput = {}) =>
  hold(mesh, claims, { grid: { cellMm: 0.25 }, ...recipe });

const rad = Math.PI / 180;

function cavity(
  w: number,
  d: number,
  h: number,
  deg: number,
  wall: number,
  top: number,
  floor: number,
): number {
  const inset = 2 * (floor * Math.tan(deg * rad) + wall / Math.cos(deg * rad));
  return frustumAnswer(w - inset, d - inset, h - top - floor, [deg, deg, deg, deg]).volumeMm3;
}

describe('hollow templates', () => {
  it.each([
    [0, 3, 4],
    [5, 3, 4],
    [10, 4, 4],
    [20, 2, 5],
    [5, 1.2, 1.6],
  ])('open at the bed, walls at %s°, %s mm along the normal, top %s mm', (deg, wall, top) => {
    const outer = frustumAnswer(120, 90, 40, [deg, deg, deg, deg]);
    const inner = cavity(120, 90, 40, deg, wall, top, 0);
    const inset = (2 * wall) / Math.cos(deg * rad);
    quick(openFrustum(120, 90, 40, deg, wall, top), {
      'mesh.shells': 1,
      'mesh.watertight': true,
      'mesh.warnings': [],
      'mesh.volumeMm3': tight(outer.volumeMm3 - inner),
      'mesh.unionVolumeMm3': tight(outer.volumeMm3 - inner),
      'mesh.bedContactAreaMm2': tight(10_800 - (120 - inset) * (90 - inset)),
      'undercut.enclosedVolumeMm3': rel(inner, 0.01),
      'undercut.undercutVolumeMm3': 0,
      'undercut.overhangAreaMm2': 0,
      'undercut.shadowedAreaMm2': 0,
      'undercut.maxDepthMm': 0,
      'plan.planAreaMm2': rel(10_800, 0.005),
      'walls.hollow': true,
      'walls.minMm': abs(wall, 0.05),
      'walls.topMm': abs(top, 0.05),
      airTraps: [],
    });
  });

  it.each([
    [0, 5, 5, 5],
    [5, 3, 3, 3],
    [15, 4, 6, 5],
  ])('sealed, walls at %s°, %s mm, top %s, floor %s', (deg, wall, top, floor) => {
    const inner = cavity(120, 90, 40, deg, wall, top, floor);
    const outer = frustumAnswer(120, 90, 40, [deg, deg, deg, deg]);
    quick(sealedFrustum(120, 90, 40, deg, wall, top, floor), {
      'mesh.shells': 2,
      'mesh.warnings': [],
      'mesh.volumeMm3': tight(outer.volumeMm3 - inner),
      'mesh.bedContactAreaMm2': tight(10_800),
      'undercut.enclosedVolumeMm3': rel(inner, 0.01),
      'undercut.undercutVolumeMm3': 0,
      'walls.hollow': true,
      'walls.minMm': abs(Math.min(wall, top, floor), 0.05),
      'walls.topMm': abs(top, 0.05),
    });
  });

  it('a void 1 mm off the middle: the thinner side counts', () => {
    quick(sealedFrustum(120, 90, 40, 5, 4, 6, 6, 1), {
      'walls.minMm': abs(4 - Math.cos(5 * rad), 0.05),
      'walls.topMm': abs(6, 0.05),
    });
  });

  it('turned out of the grid, walls are as thick', () => {
    quick(turned(openFrustum(120, 90, 40, 8, 2.5, 4), 29), {
      'walls.minMm': abs(2.5, 0.05),
      'walls.topMm': abs(4, 0.05),
    });
  });

  it.each([1.2, 3.5])('a large one, 300 × 200 mm, walls %s mm', (wall) => {
    const report = quick(openFrustum(300, 200, 80, 6, wall, 3.5), {
      'walls.hollow': true,
      'walls.minMm': abs(wall, 0.05),
      'walls.topMm': abs(3.5, 0.05),
    });
    holdChecks(report, { shell: wall < 3 ? 'caution|fail' : 'pass' });
  });

  it('a round one, thickness across the flats', () => {
    const profile: [number, number][] = [[36, 0], [40, 0], [37, 40], [0, 40], [0, 36], [33.3, 36]]; // prettier-ignore
    const across = Math.cos(Math.PI / 64);
    const slope = Math.atan((3 * across) / 40);
    quick(lathe(profile, 64), {
      'mesh.volumeMm3': tight(turnedVolume(profile, 64)),
      'undercut.enclosedVolumeMm3': rel(
        (polygonFactor(64) * 36 * (36 ** 2 + 36 * 33.3 + 33.3 ** 2)) / 3,
        0.01,
      ),
      'walls.minMm': abs(4 * across * Math.cos(slope), 0.05),
      'walls.topMm': abs(4, 0.05),
    });
  });

  it('solid bodies have no walls, whatever their pits', () => {
    expect(analysed(box(60, 40, 20)).walls.hollow).toBe(false);
    const cup = lathe([[0, 0], [40, 0], [40, 30], [30, 30], [30, 10], [0, 10]], 48); // prettier-ignore
    expect(analysed(moved(cup, 7, 7, 0)).walls.hollow).toBe(false);
  });
});
