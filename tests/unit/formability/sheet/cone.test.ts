import { describe, expect, it } from 'vitest';
import { drapeAndPress } from '@/lib/formability/sheet/drape-and-press';
import { measureElements } from '@/lib/formability/sheet/measure-elements';
import { makeObstacle } from '@/lib/formability/sheet/obstacle';
import { planDrape } from '@/lib/formability/sheet/plan-drape';
import { snapToPlateau } from '@/lib/formability/sheet/snap-to-plateau';
import { drapeRound, type Ring } from './round-drape';
import { field, frustum } from './templates';
import { makeDisc } from './make-disc';

type Where = (r: number, z: number) => boolean;

/** Thickness of a round sheet, mean over what lies in a band. */
function formRound(clampRadius: number, high: number, profile: (r: number) => number, cells: number) {
  const side = 2 * clampRadius * 0.8;
  const template = makeObstacle(field([side, side], (x, y) => profile(Math.hypot(x, y))));
  const sheet = makeDisc(clampRadius, cells, template.highest);
  snapToPlateau(sheet, template);
  const input = { frameMm: [2 * clampRadius, 2 * clampRadius] as const, gaugeMm: 1, minFormedMm: 0.3 };
  const plan = planDrape({ ...input, template: field([1, 1], () => 0) }, template, sheet, false);
  const drape = drapeAndPress(sheet, template, plan, () => true);
  const { area } = measureElements(sheet, 1);
  const mean = (where: Where) => {
    let rest = 0;
    let formed = 0;
    for (let e = 0; e < sheet.elements; e++) {
      const middle = [0, 1, 2].map((axis) =>
        [0, 1, 2].reduce((sum, c) => sum + sheet.at[3 * sheet.corners[3 * e + c] + axis] / 3, 0),
      );
      if (!where(Math.hypot(middle[0], middle[1]), middle[2])) continue;
      rest += sheet.restArea[e];
      formed += area[e];
    }
    expect(formed).toBeGreaterThan(0);
    return rest / formed;
  };
  return { drape, mean };
}

function ringMean(rings: Ring[], where: Where): number {
  let rest = 0;
  let formed = 0;
  for (const { r, z, thickness } of rings) {
    if (!where(r, z)) continue;
    // Rings of equal width at rest: area as formed follows from thickness, area at rest from the number of the ring.
    const own = 2 * rings.indexOf(rings.find((one) => one.r === r && one.z === z)!) + 1;
    rest += own;
    formed += own / thickness;
  }
  return rest / formed;
}

const onWall =
  (z: number): Where =>
  (r, at) =>
    Math.abs(at - z) < 2 && at > 0.5;
const onBed =
  (radius: number): Where =>
  (r, z) =>
    Math.abs(r - radius) < 2 && z < 0.5;

describe('male round frustum: membrane of triangles against rings', () => {
  // One-dimensional axisymmetric run of a feasibility study, 400 rings: top radius 30, height 40, draft 10°, clamp 100.
  const printed: [string, Where, number][] = [
    ['wall z = 30', onWall(30), 0.686],
    ['wall z = 20', onWall(20), 0.727],
    ['wall z = 10', onWall(10), 0.718],
    ['bed r = 45', onBed(45), 0.71],
    ['bed r = 55', onBed(55), 0.803],
    ['bed r = 65', onBed(65), 0.848],
    ['bed r = 75', onBed(75), 0.872],
    ['bed r = 85', onBed(85), 0.886],
  ];
  const profile = frustum(30, 40, 10);
  const formed = formRound(100, 40, profile, 96);
  const rings = drapeRound({ clampRadius: 100, height: 40, profile });

  it('settles, and leaves nothing open', () => {
    expect(formed.drape.residual).toBeLessThan(5e-3);
    expect(formed.drape.leftFree).toBe(0);
  });

  it.each(printed)('%s within 3 %% of the table and of rings computed here', (_, where, thickness) => {
    expect(Math.abs(ringMean(rings, where) / thickness - 1)).toBeLessThan(0.02);
    expect(Math.abs(formed.mean(where) / thickness - 1)).toBeLessThan(0.03);
    expect(Math.abs(formed.mean(where) / ringMean(rings, where) - 1)).toBeLessThan(0.03);
  });

  it('tells the real membrane from the rule of a uniform free sheet, 21 % too thick high on the wall', () => {
    // 0.832 at z = 30 by that rule (straight skirt, then a tangent arc, integrated numerically in the same study).
    expect(formed.mean(onWall(30))).toBeLessThan(0.9 * 0.832);
  });
});

describe('other round frusta against rings', () => {
  it.each([
    [20, 30, 5, 60],
    [25, 15, 30, 55],
  ])('top radius %d, height %d, draft %d°, clamp %d', (top, high, draft, clamp) => {
    const profile = frustum(top, high, draft);
    const formed = formRound(clamp, high, profile, 80);
    const rings = drapeRound({ clampRadius: clamp, height: high, profile, rings: 240 });
    const foot = top + high * Math.tan((draft * Math.PI) / 180);
    const where = [onWall(0.75 * high), onWall(0.5 * high), onBed(foot + 0.4 * (clamp - foot)), onBed(foot + 0.7 * (clamp - foot))]; // prettier-ignore
    for (const place of where)
      expect(Math.abs(formed.mean(place) / ringMean(rings, place) - 1)).toBeLessThan(0.03);
  });
});
