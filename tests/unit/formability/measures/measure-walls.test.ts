import { describe, expect, it } from 'vitest';
import { analyse } from '@/lib/formability/analyse';
import { binaryStl } from '../../../fixtures/meshes/write-stl';
import { box, dome, frustum, lathe } from '../../../fixtures/meshes/solids';
import { flipped, moved, scaled, together, turned, type Triangles } from '../../../fixtures/meshes/triangles';
import { reportOn } from '../run-engine';

const rad = Math.PI / 180;
const wallsOf = (mesh: Triangles) => reportOn(mesh, { grid: { cellMm: 0.5 } }).walls;
const close = (found: number | null, wanted: number, within = 0.02) =>
  expect(Math.abs((found ?? NaN) - wanted), `${found} against ${wanted}`).toBeLessThan(within);

/**
 * A hollow frustum: outer foot 120 × 80, every wall leaning by `deg`, 40 high; the cavity's walls are moved in by `wall`
 * along their normal (so by wall / cos deg in plan), its ceiling lies `top` below, its floor at `floor` (0: open).
 */
function shell(wall: number, top: number, deg: number, floor = 0): Triangles {
  const inset = 2 * (wall / Math.cos(deg * rad) + floor * Math.tan(deg * rad));
  const cavity = frustum(120 - inset, 80 - inset, 40 - top - floor, deg);
  return together(frustum(120, 80, 40, deg), flipped(moved(cavity, 0, 0, floor)));
}

describe('walls: solid along the inward normal', () => {
  it.each([
    [1.2, 0.8, 0],
    [3, 4, 0],
    [3, 4, 5],
    [2, 1.5, 12],
    [4, 3, 25],
  ])('a shell open at the bed, wall %s and top %s at %s°', (wall, top, deg) => {
    for (const mesh of [shell(wall, top, deg), turned(shell(wall, top, deg), 33)]) {
      const walls = wallsOf(mesh);
      close(walls.minMm, wall);
      close(walls.p05Mm, wall);
      close(walls.topMm, top);
      expect(walls).toMatchObject({ hollow: true, sealed: false, openAtBed: true, floorMm: null });
    }
  });

  it('a sealed cavity: walls 3, top 4, floor 2', () => {
    const walls = wallsOf(shell(3, 4, 5, 2));
    close(walls.minMm, 3);
    close(walls.topMm, 4);
    close(walls.floorMm, 2);
    expect(walls).toMatchObject({ hollow: true, sealed: true, openAtBed: false });
  });

  it('a cylinder of 96 sides in another: the flats are 40·cos(π/96) − 36·cos(π/96) apart', () => {
    const cup = lathe([[36, 0], [40, 0], [40, 30], [0, 30], [0, 25], [36, 25]], 96); // prettier-ignore
    const walls = wallsOf(cup);
    close(walls.minMm, 4 * Math.cos(Math.PI / 96));
    close(walls.medianMm, 4 * Math.cos(Math.PI / 96));
    close(walls.topMm, 5);
  });

  it('concentric cones of 20°: horizontal distance 3 is 3·cos 20° along the normal', () => {
    // The flats of a lathe of 180 sides stand back by cos(π/180) in plan.
    const tan = Math.tan(20 * rad);
    const cone = lathe([[47, 0], [50, 0], [50 - 60 * tan, 60], [0, 60], [0, 57], [47 - 57 * tan, 57]], 180); // prettier-ignore
    const walls = wallsOf(cone);
    close(walls.minMm, 3 * Math.cos(Math.PI / 180) * Math.cos(20 * rad));
    close(walls.topMm, 3);
  });

  it('a half sphere 40 in a half sphere 37: 3 along the radius', () => {
    const hollow = together(dome(40, 120, 60), flipped(dome(37, 120, 60)));
    const walls = wallsOf(hollow);
    close(walls.medianMm, 3);
    // Inscribed facets: the sagitta of one 1.5° strip is 40·(1 − cos 0.75°)·2 = 0.007 at most, in both directions.
    close(walls.minMm, 3, 0.03);
    close(walls.topMm, 3, 0.03);
  });

  it('a wall that tapers from 4 at the foot to 1 at the head is thinnest at its end', () => {
    // Outer wall leaning in by 3 mm over 30 mm of height; inner wall upright at 36, up to the ceiling at 28. A ray from
    // (40 − z/10, z) goes in and down at the draft, so it is (4 − z/10) / cos long and lands (4 − z/10)·tan lower: the
    // last one that lands on the wall starts at z with z − (4 − z/10) / 10 = 28, so z = 28.4 / 1.01.
    const draft = Math.atan(0.1);
    const z = 28.4 / 1.01;
    const walls = wallsOf(together(frustum(80, 80, 30, draft / rad), flipped(box(72, 72, 28))));
    close(walls.minMm, (4 - z / 10) / Math.cos(draft), 0.005);
    expect(walls.minAt?.[2]).toBeCloseTo(z, 1);
  });

  it.each([
    ['box', box(60, 40, 20), 40],
    ['frustum', frustum(60, 40, 20, 5), null],
    ['cylinder', lathe([[0, 0], [30, 0], [30, 50], [0, 50]], 64), 60 * Math.cos(Math.PI / 64)], // prettier-ignore
  ] as [string, Triangles, number | null][])('a solid %s is as thick as it is wide', (_, mesh, wanted) => {
    const walls = wallsOf(mesh);
    expect(walls).toMatchObject({ hollow: false, topMm: null, floorMm: null });
    if (wanted !== null) close(walls.minMm, wanted);
    else expect(walls.minMm).toBeGreaterThan(35);
  });

  it('corners, feet and tips are no thin walls: a cone of 30° and a wedge of 50°', () => {
    const cone = wallsOf(lathe([[0, 0], [40, 0], [0, 40 / Math.tan(30 * rad)]], 90)); // prettier-ignore
    expect(cone.minMm).toBeNull();
    expect(wallsOf(frustum(60, 40, 20, [50, 0, 0, 0])).minMm).toBeGreaterThan(20);
  });

  it('overlapping and touching bodies are one solid', () => {
    close(wallsOf(together(box(60, 40, 20), moved(box(60, 40, 20), 50, 0, 0))).minMm, 40);
    close(wallsOf(together(box(40, 40, 20), moved(box(40, 40, 20), 40, 0, 0))).minMm, 40);
    const pin = together(box(60, 40, 20), moved(box(3, 20, 20), 0, 0, 20));
    close(wallsOf(pin).minMm, 3);
  });

  it('does not hang on size: the same shell a thousand times larger or smaller with its unit', () => {
    const mesh = shell(3, 4, 5);
    const inMetres = reportOn(scaled(mesh, 1e-3), { mesh: { unit: 'm' } }).walls;
    close(inMetres.minMm, 3);
    close(inMetres.topMm, 4);
  });

  it('gives each facet that the sheet meets its thickness', () => {
    const mesh = shell(3, 4, 5);
    const { geometry } = analyse(binaryStl(mesh), {});
    const { facetWallMm, facetDraftDeg, positions } = geometry;
    let seen = 0;
    facetWallMm.forEach((wall, t) => {
      const z = positions.subarray(9 * t, 9 * t + 9).filter((_, k) => k % 3 === 2);
      const outer = Math.max(...z) > 36.5 && facetDraftDeg[t] > 0;
      if (!outer) return;
      seen++;
      close(wall, facetDraftDeg[t] > 80 ? 4 : 3);
    });
    expect(seen).toBe(10);
  });
});
