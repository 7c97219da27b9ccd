import { describe, expect, it } from 'vitest';
import { analyse } from '@/lib/formability/analyse';
import { ballOnStem, box, dome, extrude, frustum, lathe } from '../../../fixtures/meshes/solids';
import { addFacet, flipped, mapPoints, moved, reordered, scaled, together, turned, type Triangles } from '../../../fixtures/meshes/triangles'; // prettier-ignore
import { binaryStl } from '../../../fixtures/meshes/write-stl';
import { checkOf, reportOn } from '../run-engine';

const coarse = { grid: { cellMm: 1 } };
const meshOf = (mesh: Triangles, recipe = {}) => reportOn(mesh, { ...coarse, ...recipe }).mesh;
const without = (mesh: Triangles, ...gone: number[]) =>
  reordered(
    mesh,
    Array.from({ length: mesh.length / 9 }, (_, i) => i).filter((i) => !gone.includes(i)),
  );

describe('volume as stored', () => {
  it('is what the file says, whatever is mended: an inside-out body takes off, a second copy adds', () => {
    const body = box(60, 40, 20);
    expect(meshOf(together(body, flipped(moved(box(10, 10, 10), 60, 0, 0)))).volumeMm3).toBeCloseTo(
      47_000,
      6,
    );
    // The second copy of the facet (0 0 0)-free top adds a third of height 20 times its 1200 mm².
    expect(meshOf(together(body, body.slice(18, 27))).volumeMm3).toBeCloseTo(48_000 + 8000, 6);
  });

  it('of an open mesh is taken from the file’s origin, wherever the part is set down', () => {
    const wall = without(box(60, 40, 20), 0, 1);
    expect(meshOf(wall).volumeMm3).toBeCloseTo(48_000, 6);
    // Lifted by 7 the missing base no longer passes through the origin: 2400 × 7 / 3 are missing too.
    expect(meshOf(moved(wall, 0, 0, 7)).volumeMm3).toBeCloseTo(48_000 + (2400 * 7) / 3, 6);
    expect(meshOf(moved(wall, 0, 0, 7)).unionVolumeMm3).toBeCloseTo(48_000, 6);
  });
});

describe('T-junctions', () => {
  /** A box whose top is cut into `n` strips while its front and back walls know nothing of it. */
  const strips = (n: number) => {
    const mesh: Triangles = without(box(60, 40, 20), 2, 3);
    for (let i = 0; i < n; i++) {
      const [x, u] = [-30 + (60 * i) / n, -30 + (60 * (i + 1)) / n];
      addFacet(mesh, [x, -20, 20], [u, -20, 20], [u, 20, 20]);
      addFacet(mesh, [x, -20, 20], [u, 20, 20], [x, 20, 20]);
    }
    return mesh;
  };

  it.each([2, 3, 7])('a top of %s strips on plain walls is split and closed', (n) => {
    const report = reportOn(strips(n), coarse);
    expect(report.mesh).toMatchObject({
      watertight: false,
      approximate: false,
      shells: 1,
      // Both long edges of the top: one of the wall, n of the strips.
      edges: { boundary: 2 * (n + 1), nonManifold: 0, inconsistent: 0 },
      warnings: ['not_watertight', 't_junction'],
      repairs: ['split_at_t_junctions'],
    });
    expect(report.mesh.unionVolumeMm3).toBeCloseTo(48_000, 6);
    expect(report.mesh.areaMm2).toBeCloseTo(8800, 6);
    expect(report.mesh.openColumns).toBe(0);
    const places = report.mesh.places.filter((place) => place.code === 't_junction');
    expect(places).toHaveLength(Math.min(12, 2 * (n - 1)));
    for (const { at } of places) expect([Math.abs(at[1]), at[2]]).toEqual([20, 20]);
    expect(checkOf(report, 'mesh')).toMatchObject({ status: 'caution' });
  });

  it('turned and moved, where rounding puts the corner beside the edge', () => {
    const found = meshOf(moved(turned(strips(3), 37), 113.7, -41.3, 0));
    expect(found.repairs).toEqual(['split_at_t_junctions']);
    expect(found.unionVolumeMm3 / 48_000).toBeCloseTo(1, 6);
  });

  it('a corner 0.01 mm off the edge is a gap, not a T-junction', () => {
    const gap = strips(2).map((value, i, all) =>
      i % 3 === 1 && all[i - 1] === 0 && value === -20 ? value + 0.01 : value,
    );
    const found = meshOf(gap);
    expect(found.places.filter((place) => place.code === 't_junction')).toHaveLength(1);
    expect(found.approximate).toBe(true);
  });

  it('a facet without height that closes the gap keeps the mesh watertight', () => {
    const mesh = strips(2);
    for (const [y, order] of [[-20, 1], [20, -1]] as const) addFacet(mesh, [-30 * order, y, 20], [30 * order, y, 20], [0, y, 20]); // prettier-ignore
    const found = meshOf(mesh);
    expect(found).toMatchObject({
      watertight: true,
      degenerate: 2,
      warnings: ['degenerate_triangles'],
      repairs: [],
    });
    expect(found.unionVolumeMm3).toBeCloseTo(48_000, 6);
  });
});

describe('holes', () => {
  it('a window in a wall, L-shaped: capped flat, the volume exact, the place its middle', () => {
    const outline: [number, number][] = [[-20, 0], [20, 0], [20, 30], [0, 30], [0, 12], [-20, 12]]; // prettier-ignore
    const mesh = extrude(outline, 50);
    const ends = mesh.length / 9 - 8;
    // The end facets come in pairs, front then back, after two for each side.
    const front = Array.from({ length: 4 }, (_, i) => ends + 2 * i);
    const found = meshOf(without(mesh, ...front));
    expect(found.repairs).toEqual(['capped_holes']);
    expect(found.unionVolumeMm3).toBeCloseTo(50 * (40 * 12 + 20 * 18), 6);
    expect(found.places.filter(({ code }) => code === 'not_watertight')).toMatchObject([
      { count: 6, sizeMm: 50 },
    ]);
  });

  it('several holes: the widest first, twelve at the most', () => {
    const boxes = Array.from({ length: 14 }, (_, i) =>
      without(moved(box(10 + i, 10, 10), 40 * i, 0, 0), 2, 3),
    );
    const { places } = meshOf(together(...boxes));
    const holes = places.filter(({ code }) => code === 'not_watertight');
    expect(holes).toHaveLength(12);
    expect(holes[0].sizeMm).toBeCloseTo(Math.hypot(23, 10), 5);
  });

  it('a sheet that rises to the middle stands on the bed: no cap across its rim', () => {
    const sheet = without(frustum(60, 60, 10, 45), 0, 1);
    const found = meshOf(sheet);
    expect(found.repairs).toEqual(['closed_at_bed']);
    expect(found.unionVolumeMm3).toBeCloseTo((10 / 3) * (3600 + 1600 + 2400), 2);
  });
});

describe('winding', () => {
  it('a shell wound the wrong way in part is turned as a whole, each shell for itself', () => {
    const two = together(box(20, 20, 20), moved(box(20, 20, 20), 40, 0, 0));
    for (const gone of [[0], [1, 2, 3], [4, 5, 6, 7, 8, 9, 10]]) {
      const mixed = Array.from({ length: 24 }, (_, i) => {
        const facet = two.slice(9 * i, 9 * i + 9);
        return gone.includes(i) ? flipped(facet) : facet;
      }).flat();
      const found = meshOf(mixed);
      expect(found).toMatchObject({
        watertight: false,
        approximate: false,
        warnings: ['inconsistent_winding'],
      });
      expect(found.repairs).toContain('rewound_facets');
      expect(found.unionVolumeMm3).toBeCloseTo(16_000, 6);
      expect(found.places.every(({ code, at }) => code === 'inconsistent_winding' && at[0] < 15)).toBe(true);
    }
  });

  it('names the body that was inside out', () => {
    const found = meshOf(together(box(20, 20, 20), flipped(moved(box(10, 10, 10), 40, 5, 0))));
    expect(found.places).toMatchObject([{ code: 'inverted', at: [40, 5, 5], count: 1 }]);
  });
});

describe('degenerate and repeated facets', () => {
  it('a facet is without area below a ten-millionth of its length, not above', () => {
    const needle = (height: number) => together(box(60, 40, 20), [0, 0, 20, 10, 0, 20, 5, height, 20]);
    expect(meshOf(needle(0.9e-6)).degenerate).toBe(1);
    expect(meshOf(needle(1.1e-6)).degenerate).toBe(0);
  });

  it('tells where', () => {
    const mesh = together(box(60, 40, 20), box(60, 40, 20).slice(18, 27), [5, 5, 20, 5, 5, 20, 9, 5, 20]);
    const { places } = meshOf(mesh);
    expect(places.find(({ code }) => code === 'degenerate_triangles')).toMatchObject({ count: 1, sizeMm: 4 });
    expect(places.find(({ code }) => code === 'duplicate_triangles')).toMatchObject({ count: 1 });
  });
});

describe('where the part stands', () => {
  const part = frustum(100, 80, 40, 5);
  const tip = (deg: number, axis: 'x' | 'y') => {
    const [c, s] = [Math.cos((deg * Math.PI) / 180), Math.sin((deg * Math.PI) / 180)];
    return mapPoints(part, (x, y, z) =>
      axis === 'x' ? [x, c * y - s * z, s * y + c * z] : [c * x + s * z, y, c * z - s * x],
    );
  };

  it('says by how much the file is off the bed, and sets it down', () => {
    for (const [z, code] of [
      [3, 'floating'],
      [-3, 'below_bed'],
    ] as const) {
      // prettier-ignore
      const report = reportOn(moved(part, 0, 0, z), coarse);
      expect(report.mesh).toMatchObject({ warnings: [code], repairs: ['dropped_to_bed'] });
      expect(report.mesh.places).toMatchObject([{ code, sizeMm: 3 }]);
      expect(checkOf(report, 'mesh').status).toBe('pass');
      const left = reportOn(moved(part, 0, 0, z), { ...coarse, mesh: { dropToBed: false } });
      expect(left.mesh).toMatchObject({ warnings: [code], repairs: [] });
      expect(checkOf(left, 'mesh')).toMatchObject({ status: 'fail' });
    }
    expect(meshOf(moved(part, 0, 0, 5e-5)).warnings).toEqual([]);
    expect(meshOf(moved(part, 0, 0, 2e-4)).warnings).toEqual(['floating']);
  });

  it.each([
    ['on its back', 90, 'x', [0, -1, 0]],
    ['on its face', -90, 'x', [0, 1, 0]],
    ['on its side', 90, 'y', [1, 0, 0]],
    ['on its head', 180, 'x', [0, 0, -1]],
    ['flush on a wall', 85, 'x', [0, -Math.sin((85 * Math.PI) / 180), Math.cos((85 * Math.PI) / 180)]],
    ['on an edge', 30, 'x', [0, -0.5, Math.sqrt(0.75)]],
  ] as const)('%s: the direction that stands it on its base', (_, deg, axis, up) => {
    const lying = tip(deg, axis);
    const found = meshOf(lying);
    expect(found.warnings).toContain('orientation');
    found.suggestedUp?.forEach((value, k) => expect(value).toBeCloseTo(up[k], 4));
    const again = meshOf(lying, { mesh: { up: found.suggestedUp } });
    expect(again.suggestedUp).toBeNull();
    expect(again.bedContactAreaMm2).toBeCloseTo(8000, 0);
  });

  it('is given in the file’s frame where the recipe turns the part', () => {
    const found = meshOf(part, { mesh: { up: [0, 1, 0] } });
    expect(found.suggestedUp).toEqual([0, 0, 1]);
  });

  it('leaves a T, a dovetail, a mushroom and a ball on a stem alone: they stand on their foot', () => {
    const t = (length: number) => extrude([[-10, 0], [10, 0], [10, 30], [24, 30], [24, 40], [-24, 40], [-24, 30], [-10, 30]], length); // prettier-ignore
    const dovetail = extrude([[-20, 0], [20, 0], [30, 20], [-30, 20]], 60); // prettier-ignore
    const mushroom = lathe([[0, 0], [10, 0], [10, 20], [30, 20], [30, 30], [0, 30]], 64); // prettier-ignore
    for (const mesh of [t(70), t(12), dovetail, mushroom, ballOnStem(20, 6, 26, 60, 40)]) {
      expect(meshOf(mesh)).toMatchObject({ warnings: [], suggestedUp: null });
      expect(checkOf(reportOn(mesh, coarse), 'undercut').status).toBe('fail');
    }
  });

  it('tells a frustum and a dome on their heads, not walls that lean out by 2° only', () => {
    const head = (mesh: Triangles) => meshOf(mapPoints(mesh, (x, y, z) => [x, -y, 40 - z]));
    expect(head(part)).toMatchObject({ warnings: ['orientation'], suggestedUp: [0, 0, -1] });
    expect(head(dome(40, 48, 24))).toMatchObject({ warnings: ['orientation'], suggestedUp: [0, 0, -1] });
    expect(meshOf(frustum(80, 60, 30, -5)).warnings).toEqual(['orientation']);
    expect(meshOf(frustum(80, 60, 30, -2))).toMatchObject({ warnings: [], suggestedUp: null });
  });

  it('leaves alone what stands: hollow below, a box on any side, a slope', () => {
    const hollow = together(part.slice(18), flipped(frustum(92, 72, 36, 5).slice(18)));
    const rim: Triangles = [];
    const [a, b] = [[50, 40], [46, 36]]; // prettier-ignore
    const at = ([x, y]: number[], i: number): [number, number, number] => [
      i === 1 || i === 2 ? x : -x,
      i > 1 ? y : -y,
      0,
    ];
    for (let i = 0; i < 4; i++) {
      const n = (i + 1) % 4;
      addFacet(rim, at(a, i), at(b, i), at(b, n));
      addFacet(rim, at(a, i), at(b, n), at(a, n));
    }
    const tray = together(hollow, rim);
    expect(meshOf(tray)).toMatchObject({ watertight: true, warnings: [], suggestedUp: null });
    expect(meshOf(mapPoints(box(60, 40, 20), (x, y, z) => [y, z, x + 30])).suggestedUp).toBeNull();
    expect(meshOf(frustum(60, 40, 20, [3, 40, 10, 20])).suggestedUp).toBeNull();
  });
});

describe('invariance of the mesh facts', () => {
  const part = together(frustum(60, 44, 25, 6), moved(turned(frustum(30, 30, 18, 4), 20), 26, 5, 0), moved(box(9, 9, 9), -48, 30, 0)); // prettier-ignore
  const base = meshOf(part);
  const same = (found: typeof base, factor: number, share: number) => {
    const near = (value: number, wanted: number) => expect(Math.abs(value / wanted - 1)).toBeLessThan(share);
    near(found.volumeMm3, base.volumeMm3 * factor ** 3);
    near(found.unionVolumeMm3, base.unionVolumeMm3 * factor ** 3);
    near(found.areaMm2, base.areaMm2 * factor ** 2);
    near(found.bedContactAreaMm2, base.bedContactAreaMm2 * factor ** 2);
    expect(found).toMatchObject({ shells: 3, watertight: true, edges: base.edges, warnings: base.warnings });
  };

  it('has an overlap to lose', () => {
    expect(base.warnings).toEqual(['overlapping_shells']);
    expect(base.volumeMm3 - base.unionVolumeMm3).toBeGreaterThan(2000);
  });

  it.each([90, 37])('turned by %s°', (deg) => same(meshOf(turned(part, deg)), 1, 1e-6));
  it('moved by 1000 mm', () => same(meshOf(moved(part, 1000, -1000, 0)), 1, 1e-5));

  it('moved by 100 m, where a float32 step is 0.008 mm', () => {
    const found = meshOf(moved(part, 1e5, -1e5, 0));
    expect(found.warnings).toEqual(['overlapping_shells', 'precision']);
    expect(Math.abs(found.volumeMm3 / base.volumeMm3 - 1)).toBeLessThan(1e-3);
    expect(Math.abs(found.unionVolumeMm3 / base.unionVolumeMm3 - 1)).toBeLessThan(1e-3);
  });

  it('facets in another order, corners beginning elsewhere', () => {
    const n = part.length / 9;
    same(
      meshOf(
        reordered(
          part,
          Array.from({ length: n }, (_, i) => (i * 7) % n),
        ),
      ),
      1,
      1e-7,
    );
    const rolled: Triangles = [];
    for (let i = 0; i < part.length; i += 9)
      rolled.push(...part.slice(i + 3, i + 9), ...part.slice(i, i + 3));
    same(meshOf(rolled), 1, 1e-7);
  });

  it('in metres and in microns, told so', () => {
    same(meshOf(scaled(part, 1e-3), { mesh: { unit: 'm' } }), 1, 1e-6);
    same(meshOf(scaled(part, 1e3), { mesh: { unit: 'micron' } }), 1, 1e-6);
  });
});

it('names the first facet whose stored normal points another way, where it stands after the drop', () => {
  const bytes = binaryStl(moved(box(60, 40, 20), 0, 0, 5));
  const view = new DataView(bytes.buffer);
  // Facet 2 is half of the top: a normal straight down.
  view.setFloat32(84 + 50 * 2 + 8, -1, true);
  const { mesh } = analyse(bytes, coarse).report;
  expect(mesh.warnings).toEqual(['floating', 'normals_disagree']);
  const [place] = mesh.places.filter(({ code }) => code === 'normals_disagree');
  expect(place).toMatchObject({ count: 1, sizeMm: 0 });
  expect(place.at.map((value) => Math.round(value * 10) / 10)).toEqual([10, -6.7, 20]);
});
