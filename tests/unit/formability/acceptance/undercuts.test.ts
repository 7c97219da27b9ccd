import { describe, expect, it } from 'vitest';
import { polygonFactor, totalArea, turnedFacets, turnedVolume } from '../../../fixtures/meshes/answers';
import { carved, rectangle, turnedRing } from '../../../fixtures/meshes/carved';
import { ballOnStem, box, extrude, frustum, lathe } from '../../../fixtures/meshes/solids';
import { flipped, mapPoints, moved, together, type Triangles } from '../../../fixtures/meshes/triangles';
import { abs, hold, holdChecks, rel, tight } from './claims';

type P = [number, number];
const rad = Math.PI / 180;
/** A mesh drawn with its thickness along z, laid so that its y points up. */
const laid = (mesh: Triangles) => mapPoints(mesh, (x, y, z) => [x, -z, y]);

describe('undercuts that lock the part', () => {
  it('a lopsided T: 8 mm of lip on one side, 20 mm on the other', () => {
    const profile: P[] = [[-10, 0], [10, 0], [10, 25], [30, 25], [30, 32], [-18, 32], [-18, 25], [-10, 25]]; // prettier-ignore
    const report = hold(extrude(profile, 70), {
      'mesh.volumeMm3': tight((20 * 25 + 48 * 7) * 70),
      'mesh.bedContactAreaMm2': tight(20 * 70),
      'mesh.watertight': true,
      'draft.minDeg': abs(-90, 0.02),
      'draft.minUpFacingDeg': null,
      'draft.areaByBinMm2.0': tight(28 * 70),
      'draft.verticalAreaMm2': tight(2 * 32 * 70 + 2 * (20 * 25 + 48 * 7)),
      'plan.planAreaMm2': rel(48 * 70, 0.005),
      'plan.formedAreaMm2': rel(108 * 130 + 2 * 32 * (48 + 70), 0.005),
      'plan.linearDrawRatioX': rel((108 + 64) / 108, 0.005),
      'plan.linearDrawRatioY': rel((130 + 64) / 130, 0.005),
      'plan.depthRatio': tight(32 / 108),
      'undercut.overhangAreaMm2': tight(28 * 70),
      'undercut.shadowedAreaMm2': rel(28 * 70 + 2 * 25 * 70, 0.01),
      'undercut.undercutVolumeMm3': rel(28 * 25 * 70, 0.01),
      'undercut.enclosedVolumeMm3': 0,
      'undercut.shadowVolumeMm3': rel(28 * 25 * 70, 0.01),
      'undercut.maxDepthMm': abs(20, 0.1),
      'undercut.regions.length': 2,
      airTraps: [],
      spacing: [],
    });
    expect(report.undercut.regions.map(({ maxDepthMm }) => Math.round(maxDepthMm)).sort((a, b) => a - b)).toEqual([8, 20]); // prettier-ignore
    holdChecks(report, { undercut: 'fail', overhang: 'caution|fail' });
  });

  it.each([2, 5, 10, 15])('every wall leaning out by %s°: a frustum on its head', (deg) => {
    const [w, d, h] = [80, 60, 30];
    const t = Math.tan(deg * rad);
    const [tw, td] = [w + 2 * h * t, d + 2 * h * t];
    const volume = w * d * h + h * h * t * (w + d) + (4 / 3) * t * t * h ** 3;
    const walls = (h / Math.cos(deg * rad)) * (w + d + tw + td);
    const report = hold(frustum(w, d, h, -deg), {
      'mesh.volumeMm3': tight(volume),
      'mesh.bedContactAreaMm2': tight(w * d),
      'draft.minDeg': abs(-deg, 0.02),
      'draft.minUpFacingDeg': null,
      'draft.verticalAreaMm2': 0,
      'plan.planAreaMm2': rel(tw * td, 0.005),
      'plan.formedAreaMm2': rel((tw + 60) * (td + 60) + 2 * h * (tw + td), 0.005),
      'undercut.overhangAreaMm2': tight(walls),
      'undercut.shadowedAreaMm2': rel(walls, 0.005),
      'undercut.undercutVolumeMm3': rel(tw * td * h - volume, 0.015),
      'undercut.enclosedVolumeMm3': 0,
      'undercut.maxDepthMm': abs(h * t, 0.05),
    });
    holdChecks(report, { undercut: 'fail', draft: 'fail' });
  });

  it('one wall at −2° among walls of 8°', () => {
    const t = Math.tan(2 * rad);
    const [h, foot, s] = [40, 90, Math.tan(8 * rad)];
    // Below the leaning wall, at height z and as wide there as the wall: t ∫ z (foot − 2 s z) dz.
    const wedge = t * ((foot * h * h) / 2 - (2 * s * h ** 3) / 3);
    hold(frustum(120, foot, h, [-2, 8, 8, 8]), {
      'undercut.overhangAreaMm2': tight((h / Math.cos(2 * rad)) * (foot - h * s)),
      'undercut.undercutVolumeMm3': rel(wedge, 0.015),
      'undercut.maxDepthMm': abs(h * t, 0.05),
    });
  });

  it('a dovetail groove of 5 mm lip in a block', () => {
    const groove: P[] = [[-40, 0], [40, 0], [40, 24], [6, 24], [11, 12], [-11, 12], [-6, 24], [-40, 24]]; // prettier-ignore
    const wall = Math.hypot(5, 12) * 60;
    const report = hold(extrude(groove, 60), {
      'mesh.volumeMm3': tight((80 * 24 - (12 + 22) * 6) * 60),
      'draft.minDeg': abs(-Math.atan(5 / 12) / rad, 0.02),
      'undercut.overhangAreaMm2': tight(2 * wall),
      'undercut.shadowedAreaMm2': rel(2 * wall + 2 * 5 * 60, 0.01),
      'undercut.undercutVolumeMm3': rel(2 * 30 * 60, 0.015),
      'undercut.enclosedVolumeMm3': 0,
      'undercut.maxDepthMm': abs(5, 0.1),
      'plan.planAreaMm2': rel(80 * 60, 0.005),
      airTraps: [],
    });
    holdChecks(report, { undercut: 'fail' });
  });

  it.each([64, 16])('a blind round hole of %s sides in a side wall, 15 mm deep', (sides) => {
    const [r, depth] = [5, 15];
    // Block 60 wide, 30 high; drawn standing on its back with the hole from above, 40 through.
    const hole = turnedRing(r, sides, 0, 15);
    const mesh = laid(carved(rectangle(60, 30, 0, 15), 40, [{ ring: hole, z: 40 - depth }]));
    const walls = 2 * sides * r * Math.sin(Math.PI / sides) * depth;
    const floor = polygonFactor(sides) * r * r;
    const report = hold(mesh, {
      'mesh.boundsMm.min': [-30, -40, 0],
      'mesh.boundsMm.max': [30, 0, 30],
      'mesh.volumeMm3': tight(60 * 30 * 40 - floor * depth),
      'mesh.watertight': true,
      'mesh.warnings': [],
      // Its upper half; the two facets at mid height stand upright.
      'undercut.overhangAreaMm2': tight((walls * (sides / 2 - 1)) / sides),
      'undercut.shadowedAreaMm2': rel(walls + floor, 0.01),
      'undercut.undercutVolumeMm3': rel(floor * depth, 0.015),
      'undercut.enclosedVolumeMm3': 0,
      'undercut.maxDepthMm': abs(depth, 0.1),
      'plan.planAreaMm2': rel(2400, 0.005),
      'plan.formedAreaMm2': rel(120 * 100 + 200 * 30, 0.005),
      airTraps: [],
      vents: [],
    });
    holdChecks(report, { undercut: 'fail' });
  });

  it('a round tunnel through a block is undercut to its middle', () => {
    const hole = turnedRing(6, 48, 4, 14);
    const mesh = laid(carved(rectangle(60, 30, 0, 15), 44, [{ ring: hole, z: 0 }]));
    const section = polygonFactor(48) * 36;
    hold(mesh, {
      'mesh.volumeMm3': tight(60 * 30 * 44 - section * 44),
      'undercut.overhangAreaMm2': tight(2 * 23 * 6 * Math.sin(Math.PI / 48) * 44),
      'undercut.shadowedAreaMm2': rel(2 * 48 * 6 * Math.sin(Math.PI / 48) * 44, 0.01),
      'undercut.undercutVolumeMm3': rel(section * 44, 0.015),
      'undercut.maxDepthMm': abs(22, 0.1),
    });
  });

  it.each([
    [30, 8, 50, 96, 48],
    [20, 12, 26, 64, 40],
  ])('a sphere r %s on a stem r %s, centre at %s', (radius, stem, centre, sides, rings) => {
    const start = -Math.acos(stem / radius);
    const profile: P[] = [[0, 0], [stem, 0]]; // prettier-ignore
    for (let i = 0; i < rings; i++) {
      const angle = start + ((Math.PI / 2 - start) * i) / rings;
      profile.push([radius * Math.cos(angle), centre + radius * Math.sin(angle)]);
    }
    profile.push([0, centre + radius]);
    const facets = turnedFacets(profile, sides);
    const under = facets.filter(({ draftDeg }, i) => i > 1 && i < profile.length - 1 && draftDeg < -0.25);
    const neck = facets[1].areaMm2;
    const widest = profile.reduce((a, b) => (b[0] > a[0] ? b : a));
    const above: P[] = [[0, widest[1]], ...profile.filter(([, z]) => z >= widest[1])]; // prettier-ignore
    const volume = turnedVolume(profile, sides);
    const covered = polygonFactor(sides) * widest[0] ** 2;
    const shadow = covered * widest[1] + turnedVolume(above, sides) - volume;
    const report = hold(ballOnStem(radius, stem, centre, sides, rings), {
      'mesh.volumeMm3': tight(volume),
      'mesh.shells': 1,
      'undercut.overhangAreaMm2': rel(totalArea(under), 1e-4),
      'undercut.shadowedAreaMm2': rel(totalArea(under) + neck, 0.01),
      'undercut.undercutVolumeMm3': rel(shadow, 0.01),
      'undercut.enclosedVolumeMm3': 0,
      'undercut.maxDepthMm': abs(widest[0] - stem, 0.15),
      'plan.planAreaMm2': rel(covered, 0.005),
      airTraps: [],
    });
    holdChecks(report, { undercut: 'fail', mesh: 'pass' });
  });

  it('a mushroom: 10 mm of lip all round', () => {
    const sides = 128;
    const profile: P[] = [[0, 0], [10, 0], [10, 22], [20, 22], [20, 30], [0, 30]]; // prettier-ignore
    const ring = polygonFactor(sides) * (400 - 100);
    const neck = 2 * sides * 10 * Math.sin(Math.PI / sides) * 22;
    hold(lathe(profile, sides), {
      'undercut.overhangAreaMm2': tight(ring),
      'undercut.shadowedAreaMm2': rel(ring + neck, 0.01),
      'undercut.undercutVolumeMm3': rel(ring * 22, 0.01),
      'undercut.maxDepthMm': abs(10, 0.1),
      'undercut.regions.length': 1,
    });
  });
});

describe('a bottle: a wide chamber below a narrow neck', () => {
  it('locks the part by the shoulder; the pit is the column under the neck', () => {
    const profile: P[] = [[0, 0], [30, 0], [30, 30], [5, 30], [5, 25], [20, 25], [20, 5], [0, 5]]; // prettier-ignore
    const sides = 96;
    const k = polygonFactor(sides);
    const wall = (r: number, h: number) => 2 * sides * r * Math.sin(Math.PI / sides) * h;
    hold(lathe(profile, sides), {
      'mesh.volumeMm3': tight(turnedVolume(profile, sides)),
      'undercut.overhangAreaMm2': tight(k * 375),
      'undercut.shadowedAreaMm2': rel(2 * k * 375 + wall(20, 20), 0.01),
      'undercut.undercutVolumeMm3': rel(k * 375 * 20, 0.01),
      'undercut.enclosedVolumeMm3': 0,
      'undercut.maxDepthMm': abs(15, 0.15),
      'airTraps.length': 1,
      'airTraps.0.spillZMm': abs(30, 1e-4),
      'airTraps.0.volumeMm3': rel(k * 25 * 25, 0.015),
      'airTraps.0.trapsAir': true,
      'plan.planAreaMm2': rel(k * 900, 0.005),
      'plan.formedAreaMm2': rel(14_400 + wall(30, 30) + wall(5, 25), 0.005),
    });
  });
});

describe('texture and real undercuts', () => {
  /** A block whose +x wall has `count` ribs of 1 mm, 1 mm apart, standing out by `depth`. */
  const ribbed = (depth: number, count: number): P[] => {
    const wall: P[] = [[-30, 0], [30, 0]]; // prettier-ignore
    for (let k = 0; k < count; k++) {
      const z = 2 + 2 * k;
      wall.push([30, z], [30 + depth, z], [30 + depth, z + 1], [30, z + 1]);
    }
    return [...wall, [30, 2 * count + 4], [-30, 2 * count + 4]];
  };

  it.each([
    [0.1, 'pass'],
    [0.15, 'pass'],
    [0.3, 'caution|fail'],
    [0.6, 'fail'],
  ] as const)('ribs %s mm deep: %s', (depth, status) => {
    const report = hold(extrude(ribbed(depth, 10), 50), {
      'mesh.volumeMm3': tight((60 * 24 + 10 * depth) * 50),
      'undercut.overhangAreaMm2': tight(10 * depth * 50),
      'undercut.maxDepthMm': abs(depth, 0.05),
      // Known to a fraction of a cell only: 20 faces of 50 mm, 1 mm high.
      'undercut.undercutVolumeMm3': abs(depth * 50 * (21 - 10), 0.04 * 50 * 11),
      'undercut.enclosedVolumeMm3': 0,
    });
    holdChecks(report, { undercut: status === 'fail' ? 'caution|fail' : status });
  });

  it.each([
    [0.1, 'pass'],
    [0.3, 'caution|fail'],
  ] as const)('ribs %s mm deep on a template of 250 mm: %s', (depth, status) => {
    const profile = ribbed(depth, 10).map(([x, z]): P => [x < 0 ? x - 190 : x, z]);
    const report = hold(extrude(profile, 180), {
      'undercut.overhangAreaMm2': tight(10 * depth * 180),
      'undercut.maxDepthMm': abs(depth, 0.05),
      // Ten ribs hang over 21 mm of height less their own ten.
      ...(depth < 0.2 ? { 'undercut.undercutVolumeMm3': rel(depth * 180 * (21 - 10), 0.02) } : {}),
    });
    holdChecks(report, { undercut: status });
  });
});

describe('air that no sheet can enter', () => {
  it('a sealed void with an island in it', () => {
    const mesh = together(
      box(80, 60, 40),
      flipped(moved(box(60, 40, 20), 0, 0, 10)),
      moved(box(20, 10, 6), 5, 3, 15),
    );
    hold(mesh, {
      'mesh.shells': 3,
      'mesh.volumeMm3': tight(80 * 60 * 40 - 60 * 40 * 20 + 20 * 10 * 6),
      'mesh.unionVolumeMm3': rel(80 * 60 * 40 - 60 * 40 * 20 + 20 * 10 * 6, 1e-4),
      'undercut.enclosedVolumeMm3': rel(60 * 40 * 20 - 1200, 0.01),
      'undercut.undercutVolumeMm3': 0,
      'undercut.overhangAreaMm2': 0,
      'undercut.shadowedAreaMm2': 0,
      'undercut.maxDepthMm': 0,
      'walls.hollow': true,
      'walls.minMm': abs(10, 0.1),
      'walls.topMm': abs(10, 0.1),
    });
  });

  it('a shell open at the bed with a wall of 5° and a T cap outside: only the lip counts', () => {
    const profile: P[] = [[30, 0], [34, 0], [34, 30], [44, 30], [44, 40], [0, 40], [0, 36], [30, 36]]; // prettier-ignore
    const k = polygonFactor(96);
    hold(lathe(profile, 96), {
      'mesh.volumeMm3': tight(turnedVolume(profile, 96)),
      'mesh.bedContactAreaMm2': tight(k * (34 ** 2 - 900)),
      'undercut.overhangAreaMm2': tight(k * (44 ** 2 - 34 ** 2)),
      'undercut.undercutVolumeMm3': rel(k * (44 ** 2 - 34 ** 2) * 30, 0.01),
      'undercut.enclosedVolumeMm3': rel(k * 900 * 36, 0.01),
      'undercut.maxDepthMm': abs(10, 0.1),
      'walls.hollow': true,
      'walls.topMm': abs(4, 0.05),
      'walls.minMm': abs(4, 0.05),
    });
  });

  it('a cavity with a small side hole is not enclosed: air gets in', () => {
    // A hollow box 60 × 60 × 40 lying: walls 5, a bore of 4 mm through one side wall at half height.
    const outer = rectangle(60, 40, 0, 20);
    const inner = rectangle(50, 30, 0, 20);
    // Stacked along the thickness: back 5 (closed), middle 50 (frame), front 5 with the bore.
    const front = carved(outer, 60, [{ ring: turnedRing(2, 24, 0, 20), z: 55, pockets: [] }]);
    const mesh = laid(together(front, flipped(moved(carved(inner, 49, []), 0, 0, 5.5))));
    // The bore ends 0.5 mm short of the void: still enclosed.
    hold(mesh, {
      'undercut.enclosedVolumeMm3': rel(50 * 30 * 49, 0.01),
      'undercut.undercutVolumeMm3': rel(polygonFactor(24) * 4 * 5, 0.04),
    });
  });
});
