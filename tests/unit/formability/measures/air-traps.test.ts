import { describe, expect, it } from 'vitest';
import { carved, rectangle, turnedRing } from '../../../fixtures/meshes/carved';
import { lathe, plate, ring } from '../../../fixtures/meshes/solids';
import { moved, together } from '../../../fixtures/meshes/triangles';
import type { RecipeInput } from '@/lib/formability/recipe';
import { checkOf, polygonArea, reportOn as reportOnGrid } from '../run-engine';

type P = [number, number];
const sides = 96;
/** Cells of 0.2 mm, as wide as the narrowest bores: these are found on the mesh. */
const reportOn = (mesh: number[], recipe: RecipeInput = {}) =>
  reportOnGrid(mesh, { grid: { cellMm: 0.2 }, ...recipe });
const near = (value: number, expected: number, share: number) =>
  expect(Math.abs(value / expected - 1), `${value} against ${expected}`).toBeLessThan(share);
const cup = (bore: number, floor = 10): P[] => [
  [bore, 0],
  [40, 0],
  [40, 30],
  [15, 30],
  [15, floor],
  [bore, floor],
];

describe('pits (priority flood, bed closed)', () => {
  it('a cup without a vent traps its volume up to the rim', () => {
    const report = reportOn(lathe([[0, 0], ...cup(0).slice(1)] as P[], sides)); // prettier-ignore
    expect(report.airTraps).toHaveLength(1);
    const [trap] = report.airTraps;
    expect(trap).toMatchObject({ spillZMm: 30, trapsAir: true, parent: null, vents: [] });
    near(trap.volumeMm3, 20 * polygonArea(15, sides), 0.01);
    expect(Math.hypot(trap.floor[0], trap.floor[1])).toBeLessThan(0.2);
    expect(trap.floor[2]).toBeCloseTo(10, 6);
    expect(checkOf(report, 'air').status).toBe('fail');
    expect(checkOf(report, 'air').remedy).toMatch(
      /^Add 2 vents of 0.6 mm as drawn, 0.4 mm as printed, through to the bed, at x /,
    );
  });

  it('a moat down to the bed is a pit too', () => {
    const outer = lathe([[30, 0], [40, 0], [40, 20], [30, 20]], sides); // prettier-ignore
    const inner = lathe([[0, 0], [10, 0], [10, 25], [0, 25]], sides); // prettier-ignore
    const { airTraps } = reportOn(together(outer, inner));
    expect(airTraps).toHaveLength(1);
    near(airTraps[0].volumeMm3, 20 * (polygonArea(30, sides) - polygonArea(10, sides)), 0.01);
    expect(airTraps[0].floor[2]).toBe(0);
  });

  it('nested pits: two basins below a ridge at 20 in a basin that spills at 30', () => {
    const profile: P[] = [[0, 0], [40, 0], [40, 30], [36, 30], [36, 8], [14, 8], [14, 20], [8, 20], [8, 5], [0, 5]]; // prettier-ignore
    const { airTraps } = reportOn(lathe(profile, sides));
    const area = (r: number) => polygonArea(r, sides);
    expect(airTraps.map((trap) => trap.parent)).toEqual([null, 0, 0]);
    expect(airTraps.map((trap) => trap.spillZMm)).toEqual([30, 20, 20]);
    expect(airTraps.map((trap) => trap.trapsAir)).toEqual([false, true, true]);
    const ringBasin = 12 * (area(36) - area(14));
    near(airTraps[1].volumeMm3, ringBasin, 0.01);
    near(airTraps[2].volumeMm3, 15 * area(8), 0.01);
    near(airTraps[0].volumeMm3, 10 * area(36) + ringBasin + 15 * area(8), 0.01);
  });

  it('three pockets that meet at one level lie side by side in their basin', () => {
    const outline: P[] = [[-40, -20], [40, -20], [40, 20], [-40, 20]]; // prettier-ignore
    const pocket = (x: number) => [[x - 8, -8], [x + 8, -8], [x + 8, 8], [x - 8, 8]] as P[]; // prettier-ignore
    const tray: P[] = [[-36, -16], [36, -16], [36, 16], [-36, 16]]; // prettier-ignore
    const mesh = together(
      plate(outline, [], 0, 5),
      plate(outline, [pocket(-22), pocket(0), pocket(22)], 5, 15),
      plate(outline, [tray], 15, 20),
    );
    const { airTraps } = reportOn(mesh);
    expect(airTraps.map((trap) => [trap.parent, trap.spillZMm])).toEqual([[null, 20], [0, 15], [0, 15], [0, 15]]); // prettier-ignore
    near(airTraps[0].volumeMm3, 72 * 32 * 5 + 3 * 16 * 16 * 10, 0.01);
    for (const child of airTraps.slice(1)) near(child.volumeMm3, 2560, 0.01);
  });

  it('a hollow shallower than 0.05 mm is surface', () => {
    const dish = (depth: number): P[] => [[0, 0], [40, 0], [40, 30], [15, 30], [15, 30 - depth], [0, 30 - depth]]; // prettier-ignore
    expect(reportOn(lathe(dish(0.04), 48)).airTraps).toEqual([]);
    expect(reportOn(lathe(dish(0.06), 48)).airTraps).toHaveLength(1);
  });
});

describe('vents, found as bores on the mesh', () => {
  it.each([0.4, 0.5, 0.6, 1, 2, 3])('a bore of %s mm: diameter to 0.001, length to the floor', (diameter) => {
    const report = reportOn(lathe(cup(diameter / 2), 24));
    expect(report.vents).toHaveLength(1);
    const [vent] = report.vents;
    expect(vent.diameterMm).toBeCloseTo(diameter, 3);
    expect(vent.lengthMm).toBeCloseTo(10, 6);
    vent.at.forEach((value, k) => expect(value).toBeCloseTo([0, 0, 10][k], 6));
    expect(report.airTraps).toHaveLength(1);
    expect(report.airTraps[0].vents).toEqual([0]);
  });

  it('is open from the size on that this printer leaves open: 0.6 − 0.2 = 0.4 mm', () => {
    const open = (d: number) => reportOn(lathe(cup(d / 2), 24)).airTraps[0].trapsAir === false;
    expect([0.4, 0.55, 0.6, 1].map(open)).toEqual([false, false, true, true]);
    const better = { print: { holeModel: { slope: 1, offsetMm: 0, minOpenMm: 0.4 } } };
    expect(reportOn(lathe(cup(0.2), 24), better).airTraps[0].trapsAir).toBe(false);
  });

  it('a wider hole is no vent: it is a pit down to the bed', () => {
    const report = reportOn(lathe(cup(1.6), 48));
    expect(report.vents).toEqual([]);
    expect(report.airTraps[0].floor[2]).toBe(0);
    near(report.airTraps[0].volumeMm3, 20 * polygonArea(15, 48) + 10 * polygonArea(1.6, 48), 0.01);
  });

  it('a 0.4 mm bore in a 300 mm template, far narrower than a cell of 0.375 mm is sure to see', () => {
    const outline: P[] = [[-150, -100], [150, -100], [150, 100], [-150, 100]]; // prettier-ignore
    const bores = [[-100.03, 20.07], [0.11, -60.2], [77.7, 33.3]].map(([x, y]) => ring(0.2, 12, x, y)); // prettier-ignore
    const { vents, recipe } = reportOnGrid(plate(outline, bores, 0, 20));
    expect(recipe.grid.cellMm).toBeCloseTo(0.375, 6);
    expect(vents.map((vent) => vent.diameterMm.toFixed(2))).toEqual(['0.40', '0.40', '0.40']);
    expect(vents[2].at[0]).toBeCloseTo(77.7, 3);
  });

  it('takes the narrow part of a counter-bored vent', () => {
    const profile: P[] = [[2, 0], [40, 0], [40, 30], [15, 30], [15, 10], [0.4, 10], [0.4, 6], [2, 6]]; // prettier-ignore
    const { vents } = reportOn(lathe(profile, 32));
    expect(vents).toHaveLength(1);
    expect(vents[0].diameterMm).toBeCloseTo(0.8, 2);
  });

  it('three bores in a row, between which a triangulation leaves facets without area', () => {
    const bores = [-10, 0, 10].map((x) => ({ ring: turnedRing(0.5, 32, x, 0), z: 0 }));
    const mesh = carved(rectangle(80, 60), 30, [{ ring: rectangle(40, 30), z: 10, pockets: bores }]);
    const { vents } = reportOn(mesh, { grid: { cellMm: 0.4 } });
    expect(vents.map(({ at }) => Number(at[0].toFixed(3)))).toEqual([-10, 0, 10]);
    for (const vent of vents) expect(vent.diameterMm).toBeCloseTo(1, 4);
  });

  it('a bore that leans by 15°: as wide in level section as it was drawn', () => {
    const shift = 10 * Math.tan((15 * Math.PI) / 180);
    const bore = { ring: turnedRing(0.5, 24, 2, 1), foot: turnedRing(0.5, 24, 2 + shift, 1), z: 0 };
    const { vents, airTraps } = reportOn(carved(rectangle(60, 60), 30, [{ ring: rectangle(24, 24), z: 10, pockets: [bore] }])); // prettier-ignore
    expect(vents).toHaveLength(1);
    expect(vents[0].diameterMm).toBeCloseTo(1, 3);
    expect(vents[0].at[0]).toBeCloseTo(2, 3);
    expect(airTraps[0]).toMatchObject({ trapsAir: false, vents: [0] });
  });

  it('a blind hole from below is no vent', () => {
    const blind: P[] = [[0, 6], [1, 6], [1, 0], [40, 0], [40, 30], [15, 30], [15, 10], [0, 10]]; // prettier-ignore
    const report = reportOn(lathe(blind, 32));
    expect(report.vents).toEqual([]);
    expect(report.airTraps[0].trapsAir).toBe(true);
    near(report.undercut.enclosedVolumeMm3, 6 * polygonArea(1, 32), 0.05);
  });

  it('finds a hole through the skin of a hollow template, to 0.05 mm', () => {
    const shell: P[] = [[36, 0], [40, 0], [40, 30], [15, 30], [15, 20], [0.75, 20], [0.75, 17], [36, 17]]; // prettier-ignore
    const { vents, airTraps } = reportOn(moved(lathe(shell, 48), 3, 4, 0));
    expect(vents).toHaveLength(1);
    expect(Math.abs(vents[0].diameterMm - 1.5)).toBeLessThan(0.05);
    expect(vents[0].at[0]).toBeCloseTo(3, 1);
    expect(airTraps[0]).toMatchObject({ trapsAir: false, vents: [0] });
  });
});
