import { describe, expect, it } from 'vitest';
import { carved, rectangle, turnedRing, type Loop } from '../../../fixtures/meshes/carved';
import { hollowDish } from '../../../fixtures/meshes/hollow';
import { reordered, turned, type Triangles } from '../../../fixtures/meshes/triangles';
import { analysed } from '../acceptance/claims';

/** Cells of 1 mm: every bore here is narrower. */
const exact = { grid: { cellMm: 1 }, print: { holeModel: { slope: 1, offsetMm: 0, minOpenMm: 0.4 } } };
const report = (mesh: Triangles) => analysed(mesh, exact);
const places: [number, number][] = [[-20, -12], [20, -12], [-20, 12], [20.2, 12.1]]; // prettier-ignore
const rings = (diameter: number, sides: number, at = places): Loop[] =>
  at.map(([x, y]) => turnedRing(diameter / 2, sides, x, y));
const without = (mesh: Triangles, gone: (corners: number[]) => boolean) =>
  reordered(
    mesh,
    Array.from({ length: mesh.length / 9 }, (_, t) => t).filter((t) => !gone(mesh.slice(9 * t, 9 * t + 9))),
  );
const found = (mesh: Triangles) =>
  report(mesh).vents.map(({ at, diameterMm, lengthMm, printable }) => [...at, diameterMm, lengthMm].map((value) => Math.round(value * 1000) / 1000).concat(Number(printable))); // prettier-ignore
const wanted = (diameter: number, floor: number) =>
  [...places].sort((a, b) => a[0] - b[0] || a[1] - b[1]).map(([x, y]) => [x, y, floor, diameter, floor, 1]);

describe('bores through the skin of a hollow template, 300 × 200, narrower than a cell', () => {
  it.each([
    [0.4, 16],
    [0.4, 6],
    [1, 24],
  ])('%s mm across in %s sides: vents from the dish to the open bed', (diameter, sides) => {
    const mesh = hollowDish(300, 200, 40, 4, rings(diameter, sides));
    expect(found(mesh)).toEqual(wanted(diameter, 30));
    const { airTraps, mesh: facts, walls } = report(mesh);
    expect(facts.watertight).toBe(true);
    expect(walls).toMatchObject({ hollow: true, openAtBed: true });
    expect(airTraps).toMatchObject([{ trapsAir: false, vents: [0, 1, 2, 3] }]);
    // The dish: 150 × 100, 10 deep.
    expect(Math.abs(airTraps[0].volumeMm3 / 150_000 - 1)).toBeLessThan(0.01);
  });

  it('into a cavity that has a floor they lead nowhere: no vents by definition, and the dish traps air', () => {
    const { vents, airTraps, mesh } = report(hollowDish(300, 200, 40, 4, rings(0.4, 16), 3));
    expect(mesh.watertight).toBe(true);
    expect(vents).toEqual([]);
    expect(airTraps).toMatchObject([{ trapsAir: true, vents: [] }]);
  });

  it('a bore from the bed into a cavity is none either', () => {
    const drains = rings(1, 16, [[0, 0], [60, 40]]); // prettier-ignore
    const { vents, mesh } = report(hollowDish(300, 200, 40, 4, [], 3, drains));
    expect(mesh.watertight).toBe(true);
    expect(vents).toEqual([]);
  });
});

describe('bores of 0.4 mm in a solid template of 300 mm', () => {
  const solid = (sides = 16) => {
    const pockets = rings(0.4, sides).map((ring) => ({ ring, z: 0 }));
    return carved(rectangle(300, 200), 40, [{ ring: rectangle(150, 100), z: 27, pockets }]);
  };

  it('are found, turned out of the grid too', () => {
    expect(found(solid())).toEqual(wanted(0.4, 27));
    const { vents } = report(turned(solid(), 30));
    expect(vents.map(({ diameterMm }) => Math.abs(diameterMm - 0.4) < 1e-3)).toEqual([
      true,
      true,
      true,
      true,
    ]);
  });

  it.each([
    ['a facet of an outer wall', ([x, , z]: number[]) => x === 150 && z === 40],
    ['two facets of a bore', (c: number[]) => Math.hypot(c[0] + 20, c[1] + 12) < 0.3 && Math.hypot(c[3] + 20, c[4] + 12) < 0.3 && Math.hypot(c[6] + 20, c[7] + 12) < 0.3 && c[1] > -11.85], // prettier-ignore
    ['the whole bed face', (c: number[]) => c[2] === 0 && c[5] === 0 && c[8] === 0],
  ] as [string, (corners: number[]) => boolean][])('are found without %s', (_, gone) => {
    const mesh = without(solid(), gone);
    expect(mesh.length).toBeLessThan(solid().length);
    expect(report(mesh).mesh.watertight).toBe(false);
    expect(found(mesh)).toEqual(wanted(0.4, 27));
  });
});
