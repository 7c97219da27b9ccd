import { describe, expect, it } from 'vitest';
import type { RecipeInput } from '@/lib/formability/recipe';
import { polygonFactor, turnedVolume } from '../../../fixtures/meshes/answers';
import { carved, rectangle, type Pocket } from '../../../fixtures/meshes/carved';
import { box, extrude, frustum, lathe, plate, ring } from '../../../fixtures/meshes/solids';
import { addFacet, mapPoints, moved, reordered, together, turned, type Triangles } from '../../../fixtures/meshes/triangles'; // prettier-ignore
import { abs, analysed, has, hold, holdChecks, lacks, missesOf, rel, tight, type Claims } from './claims';

/** Coarser cells than the default: what is held here needs no finer ones. */
const quick = (mesh: Triangles, claims: Claims, recipe: RecipeInput = {}) =>
  hold(mesh, claims, { grid: { cellMm: 0.15 }, ...recipe });

type P = [number, number];
const rad = Math.PI / 180;

/** Plan box of w × d turned by an angle, and the default frame round it. */
function turnedFrame(w: number, d: number, deg: number): number {
  const [c, s] = [Math.abs(Math.cos(deg * rad)), Math.abs(Math.sin(deg * rad))];
  return (w * c + d * s + 60) * (w * s + d * c + 60);
}

describe('upright walls out of the grid keep their length', () => {
  it.each([10, 27, 45, 71])('a box turned by %s°', (deg) => {
    quick(turned(box(60, 40, 30), deg), {
      'plan.frameAreaMm2': rel(turnedFrame(60, 40, deg), 1e-5),
      'plan.planAreaMm2': rel(2400, 0.005),
      'plan.formedAreaMm2': rel(turnedFrame(60, 40, deg) + 200 * 30, 0.005),
      'draft.verticalAreaMm2': tight(6000),
      'draft.minUpFacingDeg': null,
    });
  });

  it.each([20, 45])('a T turned by %s°', (deg) => {
    const t: P[] = [[-10, 0], [10, 0], [10, 20], [30, 20], [30, 30], [-30, 30], [-30, 20], [-10, 20]]; // prettier-ignore
    quick(turned(extrude(t, 60), deg), {
      'plan.formedAreaMm2': rel(turnedFrame(60, 60, deg) + 240 * 30, 0.01),
      'undercut.overhangAreaMm2': tight(2400),
      'undercut.shadowedAreaMm2': rel(4800, 0.01),
      'undercut.undercutVolumeMm3': rel(48_000, 0.01),
      'undercut.maxDepthMm': abs(20, 0.2),
    });
  });

  it('a pit in a block turned by 33°: sections run through its walls', () => {
    const block = carved(rectangle(60, 60), 30, [{ ring: rectangle(20, 20), z: 10 }]);
    quick(block, {
      'plan.linearDrawRatioX': rel((120 + 60 + 40) / 120, 0.005),
      'plan.linearDrawRatioY': rel((120 + 60 + 40) / 120, 0.005),
      'plan.formedAreaMm2': rel(120 * 120 + 240 * 30 + 80 * 20, 0.005),
    });
    quick(turned(block, 33), {
      'plan.formedAreaMm2': rel(turnedFrame(60, 60, 33) + 240 * 30 + 80 * 20, 0.01),
      'airTraps.0.volumeMm3': rel(8000, 0.015),
    });
  });
});

describe('round bodies', () => {
  it('a bowl: a hemisphere sunk into a block is one pit', () => {
    const bowl: P[] = [[0, 0], [40, 0], [40, 40], [30, 40]]; // prettier-ignore
    for (let i = 1; i <= 24; i++) bowl.push([30 * Math.cos((i * Math.PI) / 48), 40 - 30 * Math.sin((i * Math.PI) / 48)]); // prettier-ignore
    bowl[bowl.length - 1][0] = 0;
    const air = polygonFactor(96) * 1600 * 40 - turnedVolume(bowl, 96);
    quick(lathe(bowl, 96), {
      'mesh.volumeMm3': tight(turnedVolume(bowl, 96)),
      'airTraps.length': 1,
      'airTraps.0.volumeMm3': rel(air, 0.01),
      'airTraps.0.spillZMm': abs(40, 1e-3),
      'airTraps.0.floor.2': abs(10, 0.02),
      'airTraps.0.trapsAir': true,
      'undercut.overhangAreaMm2': 0,
      'undercut.shadowVolumeMm3': 0,
    });
  });

  it('a ring of round section lying on the bed', () => {
    const [R, r, n] = [30, 10, 48];
    const circle = Array.from({ length: n }, (_, i): P => [R + r * Math.cos((2 * Math.PI * i) / n), r + r * Math.sin((2 * Math.PI * i) / n)]); // prettier-ignore
    const sides = 96;
    const k = polygonFactor(sides);
    const volume = turnedVolume(circle, sides);
    const plan = k * ((R + r) ** 2 - (R - r) ** 2);
    // Air above the inner half of the ring, below its crest: what the crest's cylinder holds less the quarter below it.
    const inner: P[] = [[R - r, 0], [R, 0], [R, 2 * r], ...circle.slice(n / 4 + 1, n / 2 + 1)]; // prettier-ignore
    const underCrest = k * R * R * 2 * r - turnedVolume(inner, sides);
    quick(lathe(circle, sides), {
      'mesh.volumeMm3': tight(volume),
      'mesh.watertight': true,
      'plan.planAreaMm2': rel(plan, 0.005),
      'undercut.undercutVolumeMm3': rel(plan * r - volume / 2, 0.01),
      'undercut.enclosedVolumeMm3': 0,
      'airTraps.length': 1,
      'airTraps.0.volumeMm3': rel(underCrest, 0.01),
      'airTraps.0.spillZMm': abs(2 * r, 0.01),
      'airTraps.0.trapsAir': true,
      vents: [],
    });
  });

  it('a sphere standing on its pole', () => {
    const [R, n, sides] = [25, 48, 96];
    const half = Array.from({ length: n + 1 }, (_, i): P => [i % n === 0 ? 0 : R * Math.sin((Math.PI * i) / n), R - R * Math.cos((Math.PI * i) / n)]); // prettier-ignore
    const volume = turnedVolume(half, sides);
    quick(lathe(half, sides), {
      'mesh.volumeMm3': tight(volume),
      'mesh.bedContactAreaMm2': abs(0, 1e-9),
      'plan.planAreaMm2': rel(polygonFactor(sides) * R * R, 0.005),
      'undercut.undercutVolumeMm3': rel(polygonFactor(sides) * R ** 3 - volume / 2, 0.01),
      'undercut.maxDepthMm': abs(R, 0.8),
      airTraps: [],
    });
  });

  it('an arch: the air below it comes in from both ends', () => {
    const arch: P[] = [[-30, 0], [-20, 0], [-20, 20], [20, 20], [20, 0], [30, 0], [30, 30], [-30, 30]]; // prettier-ignore
    const report = quick(extrude(arch, 50), {
      'mesh.bedContactAreaMm2': tight(1000),
      'undercut.overhangAreaMm2': tight(2000),
      'undercut.shadowedAreaMm2': rel(4000, 0.01),
      'undercut.undercutVolumeMm3': rel(40_000, 0.01),
      'undercut.enclosedVolumeMm3': 0,
      'undercut.maxDepthMm': abs(25, 0.2),
      'plan.planAreaMm2': rel(3000, 0.005),
      'walls.hollow': false,
      airTraps: [],
    });
    holdChecks(report, { undercut: 'fail' });
  });

  it('a wide hole through to the bed is a pit, and leaves the plan open', () => {
    const hole = polygonFactor(48) * 25;
    quick(plate(rectangle(60, 40), [ring(5, 48, 3, 2)], 0, 15), {
      'plan.planAreaMm2': rel(2400 - hole, 0.005),
      'plan.formedAreaMm2': rel(12_000 + 3000 + 2 * 48 * 5 * Math.sin(Math.PI / 48) * 15, 0.005),
      'undercut.shadowVolumeMm3': 0,
      'airTraps.length': 1,
      'airTraps.0.volumeMm3': rel(hole * 15, 0.015),
      vents: [],
    });
  });
});

describe('corners and facets at the edge of what is sound', () => {
  const whole = box(60, 40, 20);
  const facets = (mesh: Triangles) => mesh.length / 9;
  const without = (mesh: Triangles, ...gone: number[]) =>
    reordered(mesh, Array.from({ length: facets(mesh) }, (_, i) => i).filter((i) => !gone.includes(i))); // prettier-ignore

  it('a facet without area that closes a T-junction keeps the mesh closed', () => {
    const mesh = without(whole, 2, 3);
    const [a, b, c, d] = rectangle(60, 40).map(([x, y]) => [x, y, 20] as const);
    addFacet(mesh, a, [0, -20, 20], d);
    addFacet(mesh, [0, -20, 20], c, d);
    addFacet(mesh, [0, -20, 20], b, c);
    addFacet(mesh, a, b, [0, -20, 20]);
    quick(mesh, {
      'mesh.degenerate': 1,
      'mesh.watertight': true,
      'mesh.edges.boundary': 0,
      'mesh.volumeMm3': tight(48_000),
      'mesh.unionVolumeMm3': tight(48_000),
      'mesh.warnings': has('degenerate_triangles'),
    });
  });

  it('minus zero is zero', () => {
    const block = carved([[0, 0], [40, 0], [40, 30], [0, 30]], 10, []); // prettier-ignore
    let n = 0;
    const signs = block.map((value) => (value === 0 && n++ % 2 === 0 ? -0 : value));
    quick(signs, { 'mesh.watertight': true, 'mesh.shells': 1, 'mesh.warnings': [], 'mesh.bedContactAreaMm2': tight(1200) }); // prettier-ignore
  });

  it('a plate of 0.05 mm, and a needle', () => {
    quick(box(60, 40, 0.05), { 'mesh.volumeMm3': tight(120), 'plan.planAreaMm2': rel(2400, 0.005), 'mesh.warnings': lacks('self_intersection', 'touching_shells', 'overlapping_shells') }); // prettier-ignore
    quick(together(box(60, 40, 5), moved(frustum(0.6, 0.6, 30, 0.2), 0, 0, 4)), { 'mesh.shells': 2, 'mesh.unionVolumeMm3': rel(12_000 + 0.36 * 29 - 0.35, 1e-3) }); // prettier-ignore
  });

  it('an up direction of any length; none at all is refused', () => {
    const lying = mapPoints(frustum(60, 40, 20, 5), (x, y, z) => [x, -z, y]);
    quick(lying, { 'draft.minUpFacingDeg': abs(5, 0.02), 'mesh.bedContactAreaMm2': tight(2400) }, { mesh: { up: [0, -7.5, 0] } }); // prettier-ignore
    expect(() => analysed(lying, { mesh: { up: [0, 0, 0] } })).toThrow(/up/);
  });

  it('leaning by 30° and told so', () => {
    const [c, s] = [Math.cos(30 * rad), Math.sin(30 * rad)];
    const leaning = mapPoints(frustum(60, 40, 20, 5), (x, y, z) => [x, c * y - s * z, s * y + c * z]);
    quick(leaning, { 'draft.minUpFacingDeg': abs(5, 0.02), 'mesh.bedContactAreaMm2': rel(2400, 1e-4), 'mesh.volumeMm3': rel(analysed(frustum(60, 40, 20, 5)).mesh.volumeMm3, 1e-5) }, { mesh: { up: [0, -s, c] } }); // prettier-ignore
  });
});

describe('bores of other kinds', () => {
  const pit = (vents: Pocket[]) =>
    carved(rectangle(60, 60), 30, [{ ring: rectangle(24, 24), z: 10, pockets: vents }]);

  it('a slanted bore, 15° off upright', () => {
    const shift = 10 * Math.tan(15 * rad);
    const vent: Pocket = { ring: ring(0.5, 24, 1, 2), foot: ring(0.5, 24, 1 + shift, 2), z: 0 };
    quick(pit([vent]), {
      'vents.length': 1,
      'vents.0.diameterMm': abs(1, 0.08),
      'vents.0.lengthMm': abs(10, 0.4),
      'airTraps.0.trapsAir': false,
    });
  });

  it('from the bottom of a funnel, far from the origin', () => {
    const funnel: P[] = [[0.4, 0], [40, 0], [40, 30], [30, 30], [0.4, 5]]; // prettier-ignore
    const k = polygonFactor(48);
    quick(moved(lathe(funnel, 48), 9000, -4000, 0), {
      'vents.length': 1,
      'vents.0.diameterMm': abs(0.8, 0.05),
      'vents.0.lengthMm': abs(5, 0.05),
      'vents.0.at.0': abs(9000, 0.05),
      'airTraps.length': 1,
      'airTraps.0.volumeMm3': rel((25 / 3) * k * (900 + 12 + 0.16), 0.015),
      'airTraps.0.trapsAir': false,
    });
  });

  it('a shut bore and an open one in one pit: the air gets out', () => {
    const vents = [0.4, 0.8].map((d, i): Pocket => ({ ring: ring(d / 2, 12, 5 * i, 0), z: 0 }));
    const { airTraps, vents: found } = quick(pit(vents), { 'vents.length': 2, 'airTraps.0.trapsAir': false });
    expect(found.map((vent) => vent.printable).sort()).toEqual([false, true]);
    expect(airTraps[0].vents).toHaveLength(2);
  });

  it('64 sides of 0.02 mm', () => {
    quick(pit([{ ring: ring(0.2, 64, 1, 2), z: 0 }]), {
      'vents.length': 1,
      'vents.0.diameterMm': abs(0.4, 0.05),
    });
  });

  it('two bores 0.3 mm apart are two', () => {
    const vents = [0, 1.3].map((x): Pocket => ({ ring: ring(0.5, 16, x, 0), z: 0 }));
    quick(pit(vents), {
      'vents.length': 2,
      'vents.0.diameterMm': abs(1, 0.05),
      'vents.1.diameterMm': abs(1, 0.05),
    });
  });

  it('a countersunk bore: 2.4 mm at the floor, 0.8 below', () => {
    const sunk: Pocket = { ring: ring(1.2, 24), z: 8, pockets: [{ ring: ring(0.4, 24), z: 0 }] };
    quick(pit([sunk]), {
      'vents.length': 1,
      'vents.0.diameterMm': abs(0.8, 0.05),
      'airTraps.0.trapsAir': false,
    });
  });

  it('in a hollow template: through the top into the space below, which stays enclosed', () => {
    // Round shell, open at the bed, with a pit in its top and a bore of 1.2 mm through the pit's floor.
    const shell: P[] = [[36, 0], [40, 0], [40, 30], [15, 30], [15, 20], [0.6, 20], [0.6, 16], [36, 16]]; // prettier-ignore
    const k = polygonFactor(96);
    quick(lathe(shell, 96), {
      'vents.length': 1,
      'vents.0.diameterMm': abs(1.2, 0.05),
      'airTraps.length': 1,
      'airTraps.0.volumeMm3': rel(k * 225 * 10, 0.015),
      'airTraps.0.trapsAir': false,
      'undercut.shadowVolumeMm3': rel(k * (36 ** 2 - 0.36) * 16, 0.01),
      'walls.hollow': true,
    });
  });
});

describe('the report has every field of the contract', () => {
  const FIELDS = {
    mesh: 'boundsMm volumeMm3 unionVolumeMm3 areaMm2 bedContactAreaMm2 shells watertight edges degenerate suggestedScale warnings repairs',
    draft: 'minUpFacingDeg minDeg verticalAreaMm2 binEdgesDeg areaByBinMm2 wallMinMacroDeg',
    plan: 'frameAreaMm2 planAreaMm2 formedAreaMm2 arealDrawRatio linearDrawRatioX linearDrawRatioY depthRatio',
    undercut:
      'overhangAreaMm2 shadowedAreaMm2 undercutVolumeMm3 enclosedVolumeMm3 shadowVolumeMm3 maxDepthMm regions',
    walls: 'minMm topMm hollow',
    layers: 'cuspMaxMm cuspMedianMm treadMinMm layerDraftDeg',
    'airTraps.0': 'floor spillZMm volumeMm3 trapsAir parent vents',
    'vents.0': 'at diameterMm lengthMm printable',
    'spacing.0': 'gapMm gapAtBedMm heightMm heightOverGap between',
    input: 'sha256 bytes format unit triangles',
  };

  it('on a part that has them all', () => {
    const cup = carved(rectangle(40, 40), 20, [{ ring: rectangle(20, 20), z: 8, pockets: [{ ring: ring(0.5, 12), z: 0 }] }]); // prettier-ignore
    const report = analysed(together(cup, moved(frustum(20, 30, 18, 6), 50, 0, 0)));
    for (const [path, names] of Object.entries(FIELDS)) {
      const section = path
        .split('.')
        .reduce<unknown>((at, key) => (at as Record<string, unknown>)[key], report);
      expect(Object.keys(section as object), path).toEqual(expect.arrayContaining(names.split(' ')));
    }
    expect(missesOf(report, { schema: 1, 'draft.binEdgesDeg': [-90, -60, -30, -10, -2, -0.25, 0.25, 1, 2, 4, 6, 10, 15, 30, 60, 85, 90], 'draft.areaByBinMm2.length': 16 })).toEqual([]); // prettier-ignore
    expect(report.checks.map((check) => check.id)).toEqual('mesh fit draft undercut layers edges spacing draw sheet air vents shell skin walls heat nozzle overhang release print'.split(' ')); // prettier-ignore
    for (const check of report.checks) {
      expect(check.basis.source.length, check.id).toBeGreaterThan(3);
      expect(check.message.length, check.id).toBeGreaterThan(10);
      if (check.status === 'fail' || check.status === 'caution') expect(check.remedy.length, check.id).toBeGreaterThan(10); // prettier-ignore
    }
  });
});
