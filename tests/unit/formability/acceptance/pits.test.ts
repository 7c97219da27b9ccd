import { describe, expect, it } from 'vitest';
import type { RecipeInput } from '@/lib/formability/recipe';
import { polygonFactor } from '../../../fixtures/meshes/answers';
import { carved, rectangle, turnedRing, type Pocket } from '../../../fixtures/meshes/carved';
import { extrude, lathe, ring } from '../../../fixtures/meshes/solids';
import { moved, together, turned, type Triangles } from '../../../fixtures/meshes/triangles';
import { abs, analysed, hold, holdChecks, missesOf, rel, tight, type Claims } from './claims';

/** Coarser cells than the default in small templates: a vent is found on the mesh, not on the grid. */
const cells = (mesh: Triangles, recipe: RecipeInput): RecipeInput => {
  const wide =
    Math.max(...mesh.filter((_, i) => i % 3 === 0)) - Math.min(...mesh.filter((_, i) => i % 3 === 0));
  return wide < 200 ? { grid: { cellMm: 0.2 }, ...recipe } : recipe;
};
const quick = (mesh: Triangles, claims: Claims, recipe: RecipeInput = {}) =>
  hold(mesh, claims, cells(mesh, recipe));
const looked = (mesh: Triangles) => analysed(mesh, cells(mesh, {}));

type P = [number, number];
const bore = (d: number, sides: number) => polygonFactor(sides) * (d / 2) ** 2;

/** A block 30 high with a square pit of 20 mm, its floor at 10, off its middle, with vents through the floor. */
function ventedPit(size: number, vents: Pocket[]) {
  const at: P = [size / 6, -size / 10];
  const pit: Pocket = { ring: rectangle(20, 20, ...at), z: 10, pockets: vents };
  return { mesh: carved(rectangle(size, size * 0.8), 30, [pit]), at };
}

describe.each([60, 300])('a square pit in a template of %s mm', (size) => {
  const walls = 2 * (size + size * 0.8) * 30;
  const frame = (size + 60) * (size * 0.8 + 60);

  it('without a vent traps 8000 mm³', () => {
    const { mesh } = ventedPit(size, []);
    quick(mesh, {
      'mesh.volumeMm3': tight(size * size * 0.8 * 30 - 8000),
      'airTraps.length': 1,
      'airTraps.0.spillZMm': abs(30, 1e-4),
      'airTraps.0.floor.2': abs(10, 1e-4),
      'airTraps.0.volumeMm3': rel(8000, 0.015),
      'airTraps.0.trapsAir': true,
      'airTraps.0.parent': null,
      'airTraps.0.vents': [],
      vents: [],
      'plan.formedAreaMm2': rel(frame + walls + 80 * 20, 0.005),
      'undercut.undercutVolumeMm3': 0,
    });
    holdChecks(analysed(mesh, cells(mesh, {}), true), { air: 'caution|fail' });
  });

  it.each([
    [0.4, 8, false],
    [0.4, 16, false],
    [0.6, 12, true],
    [0.8, 6, true],
    [1, 16, true],
    [2, 24, true],
    [3, 32, true],
  ])('with one vent of %s mm in %s sides, which the printer leaves open: %s', (diameter, sides, open) => {
    const centre: P = [size / 6 + 4.37, -size / 10 - 3.21];
    const { mesh } = ventedPit(size, [{ ring: ring(diameter / 2, sides, ...centre), z: 0 }]);
    const report = quick(mesh, {
      'mesh.volumeMm3': tight(size * size * 0.8 * 30 - 8000 - bore(diameter, sides) * 10),
      'mesh.watertight': true,
      'vents.length': 1,
      'vents.0.diameterMm': abs(diameter, 0.05),
      'vents.0.lengthMm': abs(10, 0.01),
      'vents.0.printable': open,
      'vents.0.at.0': abs(centre[0], 0.05),
      'vents.0.at.1': abs(centre[1], 0.05),
      'vents.0.at.2': abs(10, 0.01),
      'airTraps.length': 1,
      'airTraps.0.volumeMm3': rel(8000, 0.015),
      'airTraps.0.spillZMm': abs(30, 1e-4),
      'airTraps.0.trapsAir': !open,
      'airTraps.0.vents': [0],
      'plan.planAreaMm2': rel(size * size * 0.8 - bore(diameter, sides), 0.003),
      'plan.formedAreaMm2': rel(frame + walls + 80 * 20, 0.005),
      'undercut.shadowVolumeMm3': 0,
    });
    // From 0.8 mm on a vent may be said to mark.
    if (diameter < 0.7) holdChecks(report, { vents: open ? 'pass' : 'caution|fail' });
    holdChecks(report, { undercut: 'pass' });
  });

  it('a hole of 3.5 mm is no vent but part of the pit, down to the bed', () => {
    const { mesh, at } = ventedPit(size, []);
    expect(mesh.length).toBeGreaterThan(0);
    const holed = ventedPit(size, [{ ring: ring(1.75, 32, at[0] + 2, at[1] + 1), z: 0 }]);
    quick(holed.mesh, {
      vents: [],
      'airTraps.length': 1,
      'airTraps.0.floor.2': abs(0, 1e-4),
      'airTraps.0.volumeMm3': rel(8000 + bore(3.5, 32) * 10, 0.015),
      'airTraps.0.trapsAir': true,
    });
  });

  it('several vents of several sizes in one pit', () => {
    const sizes = [0.4, 0.5, 0.7, 1.2, 2.5];
    const at: P = [size / 6, -size / 10];
    const vents = sizes.map((d, i): Pocket => ({ ring: turnedRing(d / 2, 16, at[0] - 7 + 3.3 * i, at[1] + (i % 2) * 4.1), z: 0 })); // prettier-ignore
    const report = looked(ventedPit(size, vents).mesh);
    expect(report.vents.map((vent) => vent.diameterMm).sort((a, b) => a - b)).toHaveLength(5);
    const found = report.vents.map((vent) => vent.diameterMm).sort((a, b) => a - b);
    expect(missesOf({ found }, { found: sizes.map((d) => abs(d, 0.05)) })).toEqual([]);
    expect(report.airTraps[0].vents).toHaveLength(5);
    expect(report.airTraps[0].trapsAir).toBe(false);
  });
});

describe('vents of other shapes', () => {
  const block = (vent: Pocket) => ventedPit(60, [vent]).mesh;

  it('turned and moved, a vent is found all the same', () => {
    const mesh = moved(turned(block({ ring: ring(0.3, 12, 11, -5), z: 0 }), 33), 140, -60, 0);
    const report = looked(mesh);
    const angle = (33 * Math.PI) / 180;
    const [x, y] = [11 * Math.cos(angle) + 5 * Math.sin(angle) + 140, 11 * Math.sin(angle) - 5 * Math.cos(angle) - 60]; // prettier-ignore
    expect(missesOf(report, { 'vents.length': 1, 'vents.0.diameterMm': abs(0.6, 0.05), 'vents.0.at.0': abs(x, 0.05), 'vents.0.at.1': abs(y, 0.05), 'airTraps.0.trapsAir': false })).toEqual([]); // prettier-ignore
  });

  it('a square bore of 1 × 1 mm: the circle through its corners', () => {
    quick(block({ ring: rectangle(1, 1, 9, -4), z: 0 }), {
      'vents.length': 1,
      'vents.0.diameterMm': abs(Math.SQRT2, 0.05),
      'airTraps.0.trapsAir': false,
    });
  });

  it('a bore that widens towards the bed is as wide as its narrow end', () => {
    quick(block({ ring: ring(0.5, 24, 9, -4), foot: ring(1.2, 24, 9, -4), z: 0 }), {
      'vents.length': 1,
      'vents.0.diameterMm': abs(1, 0.05),
      'vents.0.lengthMm': abs(10, 0.01),
      'airTraps.0.trapsAir': false,
    });
  });

  it('a vent in a tapered pit, at its wall', () => {
    const pit: Pocket = {
      ring: rectangle(24, 24),
      foot: rectangle(16, 16),
      z: 6,
      pockets: [{ ring: ring(0.4, 12, 7.5, 7.5), z: 0 }],
    };
    quick(carved(rectangle(60, 60), 30, [pit]), {
      'vents.length': 1,
      'vents.0.diameterMm': abs(0.8, 0.05),
      'vents.0.lengthMm': abs(6, 0.01),
      'airTraps.length': 1,
      // Prismoid: h/3 (A + B + √AB).
      'airTraps.0.volumeMm3': rel((24 / 3) * (576 + 256 + 384), 0.015),
    });
  });

  it('two hundred vents in a tray of 280 × 180 mm', () => {
    const pockets: Pocket[] = [];
    for (let i = 0; i < 20; i++) {
      for (let j = 0; j < 10; j++) pockets.push({ ring: turnedRing(0.4, 10, -123.5 + 13 * i, -76.5 + 17 * j), z: 0 }); // prettier-ignore
    }
    const tray: Pocket = { ring: rectangle(280, 180), z: 8, pockets };
    const report = quick(carved(rectangle(300, 200), 20, [tray]), {
      'vents.length': 200,
      'airTraps.length': 1,
      'airTraps.0.vents.length': 200,
      'airTraps.0.trapsAir': false,
      'airTraps.0.volumeMm3': rel(280 * 180 * 12, 0.01),
    });
    for (const vent of report.vents) expect(Math.abs(vent.diameterMm - 0.8)).toBeLessThan(0.05);
  });
});

describe('pits in pits, moats and channels', () => {
  it('a basin with two wells: the wells are its children, its volume holds theirs', () => {
    const basin: Pocket = {
      ring: rectangle(70, 40),
      z: 20,
      pockets: [
        { ring: rectangle(20, 20, -20, 0), z: 12 },
        { ring: turnedRing(8, 64, 18, 2), z: 5 },
      ],
    };
    const well = polygonFactor(64) * 64 * 15;
    const report = looked(carved(rectangle(90, 60), 30, [basin]));
    const byVolume = [...report.airTraps].sort((a, b) => b.volumeMm3 - a.volumeMm3);
    expect(
      missesOf(
        { traps: byVolume },
        {
          'traps.length': 3,
          'traps.0.volumeMm3': rel(70 * 40 * 10 + 3200 + well, 0.01),
          'traps.0.spillZMm': abs(30, 1e-4),
          'traps.0.parent': null,
          'traps.0.trapsAir': false,
          'traps.1.volumeMm3': rel(3200, 0.015),
          'traps.1.spillZMm': abs(20, 1e-4),
          'traps.1.trapsAir': true,
          'traps.1.floor.2': abs(12, 1e-4),
          'traps.2.volumeMm3': rel(well, 0.015),
          'traps.2.spillZMm': abs(20, 1e-4),
          'traps.2.trapsAir': true,
          'traps.2.floor.2': abs(5, 1e-4),
        },
      ),
    ).toEqual([]);
    expect(report.airTraps.indexOf(byVolume[0])).toBe(byVolume[1].parent);
    expect(byVolume[2].parent).toBe(byVolume[1].parent);
  });

  it('the same with a vent in one well: only the other traps air', () => {
    const basin: Pocket = {
      ring: rectangle(70, 40),
      z: 20,
      pockets: [
        { ring: rectangle(20, 20, -20, 0), z: 12, pockets: [{ ring: ring(0.5, 12, -22, 3), z: 0 }] },
        { ring: rectangle(14, 14, 18, 2), z: 5 },
      ],
    };
    const { airTraps, vents } = looked(carved(rectangle(90, 60), 30, [basin]));
    expect(vents).toHaveLength(1);
    const open = airTraps.filter((trap) => trap.vents.length > 0 && trap.spillZMm < 25);
    expect(open.map((trap) => [Math.round(trap.floor[2]), trap.trapsAir])).toEqual([[12, false]]);
    const shut = airTraps.filter((trap) => trap.trapsAir);
    expect(shut.map((trap) => Math.round(trap.floor[2]))).toEqual([5]);
  });

  it('three levels: wells in a well in a basin', () => {
    const inner: Pocket[] = [
      { ring: rectangle(8, 8, -22, 0), z: 4 },
      { ring: rectangle(8, 8, -8, 0), z: 6 },
    ];
    const basin: Pocket = {
      ring: rectangle(80, 40),
      z: 24,
      pockets: [
        { ring: rectangle(34, 24, -15, 0), z: 14, pockets: inner },
        { ring: rectangle(20, 20, 22, 0), z: 10 },
      ],
    };
    const report = looked(carved(rectangle(100, 60), 30, [basin]));
    const middle = 34 * 24 * 10;
    const found = [...report.airTraps].sort((a, b) => b.volumeMm3 - a.volumeMm3);
    expect(
      missesOf(
        { found },
        {
          'found.length': 5,
          'found.0.volumeMm3': rel(80 * 40 * 6 + middle + 640 + 512 + 5600, 0.01),
          'found.1.volumeMm3': rel(middle + 640 + 512, 0.01),
          'found.2.volumeMm3': rel(5600, 0.01),
          'found.3.volumeMm3': rel(640, 0.02),
          'found.4.volumeMm3': rel(512, 0.02),
        },
      ),
    ).toEqual([]);
    const parents = found.map((trap) =>
      trap.parent === null ? null : found.indexOf(report.airTraps[trap.parent]),
    );
    expect(parents).toEqual([null, 0, 0, 1, 1]);
    expect(found.map((trap) => trap.trapsAir)).toEqual([false, false, true, true, true]);
  });

  const moat = (island: number): Claims => {
    const floor = 50 * 40 - 20 * 16;
    const drowned = Math.max(0, 25 - island) * 20 * 16;
    return {
      'airTraps.length': 1,
      'airTraps.0.spillZMm': abs(25, 1e-4),
      'airTraps.0.volumeMm3': rel(floor * 17 + drowned, 0.01),
      'airTraps.0.floor.2': abs(8, 1e-4),
      'airTraps.0.trapsAir': true,
      'mesh.volumeMm3': tight(70 * 60 * 25 - floor * 17 + (island - 25) * 20 * 16),
      'plan.formedAreaMm2': rel(130 * 120 + 2 * 130 * 25 + 2 * 90 * 17 + 2 * 36 * (island - 8), 0.005),
    };
  };
  it.each([40, 25, 18])('a moat round an island %s mm high in a rim of 25', (island) => {
    const pocket: Pocket = { ring: rectangle(50, 40), z: 8, islands: [{ ring: rectangle(20, 16, 3, 2), z: island }] }; // prettier-ignore
    quick(carved(rectangle(70, 60), 25, [pocket]), moat(island));
  });

  it('a round moat between two bodies on the bed', () => {
    const k = polygonFactor(96);
    const outer = lathe([[30, 0], [40, 0], [40, 20], [30, 20]], 96); // prettier-ignore
    quick(
      together(
        outer,
        lathe(
          [
            [0, 0],
            [12, 0],
            [12, 35],
            [0, 35],
          ],
          96,
        ),
      ),
      {
        'airTraps.length': 1,
        'airTraps.0.volumeMm3': rel(k * (900 - 144) * 20, 0.01),
        'airTraps.0.spillZMm': abs(20, 1e-4),
        'mesh.shells': 2,
        'mesh.warnings': [],
      },
    );
  });

  it('a channel open at its ends holds nothing; closed at one end neither', () => {
    const u: P[] = [[-30, 0], [30, 0], [30, 25], [10, 25], [10, 8], [-10, 8], [-10, 25], [-30, 25]]; // prettier-ignore
    quick(extrude(u, 60), { airTraps: [], 'undercut.shadowVolumeMm3': 0, vents: [] });
  });

  it('a rim with a low side spills there: a trough between slopes', () => {
    // Ends of the trough are plates of 18 and 22 mm, its walls 25: it spills over the lower end.
    const u: P[] = [[-30, 0], [30, 0], [30, 25], [10, 25], [10, 8], [-10, 8], [-10, 25], [-30, 25]]; // prettier-ignore
    const end = (height: number): P[] => [[-30, 0], [30, 0], [30, height], [-30, height]]; // prettier-ignore
    const mesh = together(
      extrude(u, 50),
      moved(extrude(end(18), 5), 0, -27.4, 0),
      moved(extrude(end(22), 5), 0, 27.4, 0),
    );
    quick(mesh, {
      'airTraps.length': 1,
      'airTraps.0.spillZMm': abs(18, 1e-3),
      'airTraps.0.volumeMm3': rel(20 * 49.8 * 10, 0.015),
    });
  });

  it('two hollows of 0.04 and 0.06 mm: the shallower is surface', () => {
    const pockets: Pocket[] = [
      { ring: rectangle(15, 15, -15, 0), z: 19.96 },
      { ring: rectangle(15, 15, 15, 0), z: 19.94 },
    ];
    quick(carved(rectangle(70, 40), 20, pockets), {
      'airTraps.length': 1,
      'airTraps.0.volumeMm3': rel(225 * 0.06, 0.02),
    });
  });
});
