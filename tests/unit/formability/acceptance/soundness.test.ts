import { describe, expect, it } from 'vitest';
import type { RecipeInput } from '@/lib/formability/recipe';
import { polygonFactor } from '../../../fixtures/meshes/answers';
import { box, dome, frustum, lathe } from '../../../fixtures/meshes/solids';
import {
  addFacet,
  flipped,
  mapPoints,
  moved,
  reordered,
  together,
  type Triangles,
} from '../../../fixtures/meshes/triangles';
import { abs, analysed, has, hold, holdChecks, lacks, missesOf, rel, tight, type Claims } from './claims';

/** Coarser cells than the default: what is held here needs no finer ones. */
const quick = (mesh: Triangles, claims: Claims, recipe: RecipeInput = {}) =>
  hold(mesh, claims, { grid: { cellMm: 0.2 }, ...recipe });

type P = [number, number];
const rad = Math.PI / 180;
const cube = (size: number, x = 0, y = 0, z = 0) => moved(box(size, size, size), x, y, z);
const facets = (mesh: Triangles) => mesh.length / 9;
const without = (mesh: Triangles, ...gone: number[]) =>
  reordered(
    mesh,
    Array.from({ length: facets(mesh) }, (_, i) => i).filter((i) => !gone.includes(i)),
  );

describe('shells: apart, overlapping, touching, within each other', () => {
  it('two cubes apart', () => {
    quick(together(cube(20), cube(20, 50)), {
      'mesh.shells': 2,
      'mesh.volumeMm3': tight(16_000),
      'mesh.unionVolumeMm3': tight(16_000),
      'mesh.warnings': [],
      'mesh.watertight': true,
    });
  });

  it.each([
    ['along one axis', [8, 0, 0], 12 * 20 * 20],
    ['along two axes', [8, 5, 0], 12 * 15 * 20],
    ['along three axes', [8, 5, 3], 12 * 15 * 17],
  ] as const)('two cubes overlapping %s', (_, [x, y, z], common) => {
    const report = quick(together(cube(20), cube(20, x, y, z)), {
      'mesh.shells': 2,
      'mesh.volumeMm3': tight(16_000),
      'mesh.unionVolumeMm3': rel(16_000 - common, 1e-4),
      'mesh.areaMm2': tight(4800),
      'mesh.watertight': true,
      'mesh.warnings': has('overlapping_shells'),
      'undercut.enclosedVolumeMm3': 0,
    });
    expect(report.mesh.warnings).not.toContain('self_intersection');
  });

  it('two round bodies overlapping: a lens of two 96-sided cylinders', () => {
    // Both turned alike, 24 mm apart: the lens is twice the part of one polygon beyond the middle line.
    const [r, n, d] = [20, 96, 24];
    const ring = Array.from({ length: n }, (_, i): P => [r * Math.cos((2 * Math.PI * i) / n), r * Math.sin((2 * Math.PI * i) / n)]); // prettier-ignore
    let segment = 0;
    ring.forEach((a, i) => {
      const b = ring[(i + 1) % n];
      const height = (p: P) => Math.max(0, p[0] - d / 2);
      // ∮ (x − d/2)+ dy, exact where an edge does not cross; crossing edges are split at the line.
      if (height(a) > 0 === height(b) > 0) segment += ((height(a) + height(b)) / 2) * (b[1] - a[1]);
      else {
        const t = (d / 2 - a[0]) / (b[0] - a[0]);
        const y = a[1] + t * (b[1] - a[1]);
        segment += height(a) > 0 ? (height(a) / 2) * (y - a[1]) : (height(b) / 2) * (b[1] - y);
      }
    });
    const body = lathe([[0, 0], [r, 0], [r, 15], [0, 15]], n); // prettier-ignore
    quick(together(body, moved(body, d, 0, 0)), {
      'mesh.unionVolumeMm3': rel((2 * polygonFactor(n) * r * r - 2 * segment) * 15, 1e-4),
      'plan.planAreaMm2': rel(2 * polygonFactor(n) * r * r - 2 * segment, 0.005),
      'mesh.warnings': has('overlapping_shells'),
    });
  });

  it('a body within a body counts once', () => {
    const report = quick(together(cube(30), cube(10, 2, 3, 8)), {
      'mesh.shells': 2,
      'mesh.volumeMm3': tight(28_000),
      'mesh.unionVolumeMm3': rel(27_000, 1e-4),
      'mesh.warnings': has('overlapping_shells'),
      'undercut.enclosedVolumeMm3': 0,
      'walls.hollow': false,
    });
    holdChecks(report, { undercut: 'pass' });
  });

  it('the same body twice over is duplicate facets, not two bodies', () => {
    quick(together(cube(30), cube(30)), {
      'mesh.unionVolumeMm3': tight(27_000),
      'mesh.warnings': has('duplicate_triangles'),
    });
  });

  it('three bodies in a row, each overlapping the next', () => {
    quick(together(cube(20), cube(20, 15), cube(20, 30)), {
      'mesh.shells': 3,
      'mesh.unionVolumeMm3': rel(50 * 400, 1e-4),
      'mesh.warnings': has('overlapping_shells'),
    });
  });

  it('three bodies in one place: winding number 3 in the middle', () => {
    quick(together(cube(20), cube(20, 4, 0, 0), cube(20, 8, 0, 0)), {
      'mesh.unionVolumeMm3': rel(28 * 400, 1e-4),
    });
  });

  it('bodies that touch at faces of different size', () => {
    quick(together(box(40, 40, 10), moved(box(20, 16, 12), 3, 2, 10)), {
      'mesh.shells': 2,
      'mesh.volumeMm3': tight(16_000 + 3840),
      'mesh.unionVolumeMm3': rel(16_000 + 3840, 1e-4),
      'mesh.watertight': true,
      'mesh.warnings': has('touching_shells'),
      'undercut.overhangAreaMm2': 0,
      'undercut.undercutVolumeMm3': 0,
      'undercut.enclosedVolumeMm3': 0,
    });
  });

  it('bodies that touch side by side', () => {
    quick(together(box(20, 30, 20), moved(box(20, 18, 12), 20, 1, 0)), {
      'mesh.shells': 2,
      'mesh.unionVolumeMm3': rel(12_000 + 4320, 1e-4),
      'mesh.warnings': has('touching_shells'),
      'plan.planAreaMm2': rel(600 + 360, 0.005),
    });
  });

  it('cubes that share four corners, an edge, or one corner', () => {
    // Corners are shared bit for bit: one component. A shared edge has four triangles; so has each side of a shared face.
    quick(together(cube(20), cube(20, 20)), {
      'mesh.shells': 1,
      'mesh.watertight': false,
      'mesh.volumeMm3': tight(16_000),
      'mesh.unionVolumeMm3': rel(16_000, 1e-4),
      'mesh.warnings': has('nonmanifold_edge'),
      'mesh.edges.boundary': 0,
    });
    quick(together(cube(20), cube(20, 20, 20)), {
      'mesh.shells': 1,
      'mesh.watertight': false,
      'mesh.edges.nonManifold': 1,
      'mesh.edges.boundary': 0,
      'mesh.volumeMm3': tight(16_000),
      'mesh.unionVolumeMm3': tight(16_000),
      'mesh.warnings': has('nonmanifold_edge'),
    });
    quick(together(cube(20), cube(20, 20, 20, 20)), {
      'mesh.shells': 1,
      'mesh.watertight': true,
      'mesh.edges.nonManifold': 0,
      'mesh.volumeMm3': tight(16_000),
    });
  });

  it('voids: one, and one inside out with its body', () => {
    const hollow = together(box(60, 40, 30), flipped(moved(box(40, 20, 10), 5, 5, 10)));
    quick(hollow, {
      'mesh.shells': 2,
      'mesh.volumeMm3': tight(64_000),
      'mesh.unionVolumeMm3': tight(64_000),
      'mesh.warnings': [],
      'undercut.enclosedVolumeMm3': rel(8000, 0.01),
    });
    quick(flipped(hollow), {
      'mesh.volumeMm3': tight(-64_000),
      'mesh.unionVolumeMm3': tight(64_000),
      'mesh.warnings': has('inverted'),
      'mesh.repairs': has('flipped_inside_out'),
      'undercut.enclosedVolumeMm3': rel(8000, 0.01),
    });
  });

  it('a body inside out beside a sound one', () => {
    quick(together(cube(20), flipped(cube(20, 50))), {
      'mesh.volumeMm3': abs(0, 1e-6),
      'mesh.unionVolumeMm3': tight(16_000),
      'mesh.warnings': has('inverted'),
      'mesh.watertight': true,
      'undercut.overhangAreaMm2': 0,
      'mesh.bedContactAreaMm2': tight(800),
    });
  });

  it('one shell that crosses itself: a star of five points with the middle counted twice', () => {
    // Pentagram {5/2} of radius 30 drawn as one closed line, extruded 20.
    const [n, R] = [5, 30];
    const tips = Array.from({ length: n }, (_, i): P => [R * Math.cos((4 * Math.PI * i) / n), R * Math.sin((4 * Math.PI * i) / n)]); // prettier-ignore
    const mesh: Triangles = [];
    tips.forEach(([x, y], i) => {
      const [u, v] = tips[(i + 1) % n];
      addFacet(mesh, [0, 0, 20], [x, y, 20], [u, v, 20]);
      addFacet(mesh, [0, 0, 0], [u, v, 0], [x, y, 0]);
      addFacet(mesh, [x, y, 0], [u, v, 0], [u, v, 20]);
      addFacet(mesh, [x, y, 0], [u, v, 20], [x, y, 20]);
    });
    const inner = (R * Math.cos(72 * rad)) / Math.cos(36 * rad);
    const stored = (n / 2) * R * R * Math.sin(144 * rad);
    const star = n * R * inner * Math.sin(36 * rad);
    quick(mesh, {
      'mesh.shells': 1,
      'mesh.watertight': true,
      'mesh.volumeMm3': tight(stored * 20),
      'mesh.unionVolumeMm3': rel(star * 20, 0.005),
      'mesh.warnings': has('self_intersection'),
      'plan.planAreaMm2': rel(star, 0.005),
    });
  });

  it('a convex shell, a dome and a lathe of many facets cross nothing', () => {
    const { mesh } = analysed(together(dome(30, 64, 32), moved(frustum(20, 20, 20, 5), 60, 0, 0)));
    expect(mesh.warnings).toEqual([]);
  });
});

describe('edges that do not close', () => {
  const whole = box(60, 40, 20);

  it.each(Array.from({ length: 12 }, (_, i) => i))('a box without its facet %s', (gone) => {
    quick(without(whole, gone), {
      'mesh.watertight': false,
      'mesh.edges.boundary': 3,
      'mesh.edges.nonManifold': 0,
      'mesh.edges.inconsistent': 0,
      'mesh.shells': 1,
      'mesh.warnings': has('not_watertight'),
      'mesh.unionVolumeMm3': rel(48_000, 0.015),
      'plan.planAreaMm2': rel(2400, 0.015),
      'mesh.areaMm2': (value: unknown) =>
        [8800 - 1200, 8800 - 600, 8800 - 400].some((area) => Math.abs((value as number) - area) < 0.1)
          ? null
          : '8800 less a facet',
    });
  });

  it('one facet turned over', () => {
    for (let i = 0; i < 12; i++) {
      const order = whole.slice(9 * i, 9 * i + 9);
      const mesh = together(whole.slice(0, 9 * i), flipped(order), whole.slice(9 * i + 9));
      const report = analysed(mesh, { grid: { cellMm: 0.5 } });
      expect(
        missesOf(report, {
          'mesh.edges.inconsistent': 3,
          'mesh.edges.boundary': 0,
          'mesh.warnings': has('inconsistent_winding'),
          'mesh.repairs': has('rewound_facets'),
          'mesh.unionVolumeMm3': tight(48_000),
          'mesh.bedContactAreaMm2': tight(2400),
          'draft.minDeg': abs(0, 1e-6),
          'undercut.overhangAreaMm2': 0,
        }),
        `facet ${i}`,
      ).toEqual([]);
    }
  });

  it('a fin: a facet that hangs on an edge of the box', () => {
    const mesh: Triangles = [...whole];
    addFacet(mesh, [-30, -20, 20], [30, -20, 20], [0, -35, 30]);
    quick(mesh, {
      'mesh.edges.nonManifold': 1,
      'mesh.edges.boundary': 2,
      'mesh.watertight': false,
      'mesh.warnings': has('nonmanifold_edge', 'not_watertight'),
      'mesh.unionVolumeMm3': rel(48_000, 0.015),
    });
  });

  it('a T-junction: one side knows a corner in the middle of an edge, the other does not', () => {
    // The top of the box cut into two halves at x = 0, the walls not.
    const mesh: Triangles = without(whole, 2, 3);
    const [a, b, c, d] = [[-30, -20], [30, -20], [30, 20], [-30, 20]].map(([x, y]) => [x, y, 20] as const); // prettier-ignore
    addFacet(mesh, a, [0, -20, 20], d);
    addFacet(mesh, [0, -20, 20], c, d);
    addFacet(mesh, [0, -20, 20], b, c);
    quick(mesh, {
      'mesh.watertight': false,
      'mesh.edges.boundary': 3,
      'mesh.volumeMm3': tight(48_000),
      'mesh.unionVolumeMm3': rel(48_000, 1e-4),
      'mesh.areaMm2': tight(8800),
      'mesh.warnings': has('t_junction'),
      'plan.planAreaMm2': rel(2400, 0.005),
    });
  });

  it('a plain hole is no T-junction', () => {
    const { mesh } = analysed(without(whole, 4), { grid: { cellMm: 0.5 } });
    expect(mesh.warnings).not.toContain('t_junction');
  });

  it('facets without area, twice the same corner and three in a line', () => {
    const mesh: Triangles = [...whole];
    addFacet(mesh, [-30, -20, 0], [-30, -20, 0], [30, -20, 0]);
    addFacet(mesh, [-30, -20, 0], [0, -20, 0], [30, -20, 0]);
    quick(mesh, {
      'mesh.degenerate': 2,
      'mesh.volumeMm3': tight(48_000),
      'mesh.unionVolumeMm3': tight(48_000),
      'mesh.areaMm2': tight(8800),
      'mesh.warnings': has('degenerate_triangles'),
    });
  });

  it('a facet twice', () => {
    quick(together(whole, whole.slice(45, 54)), {
      'mesh.warnings': has('duplicate_triangles'),
      'mesh.unionVolumeMm3': tight(48_000),
    });
  });

  it('one triangle, and a sheet without thickness, still get every figure that makes sense', () => {
    const single = analysed([0, 0, 0, 30, 0, 0, 0, 20, 10]);
    expect(missesOf(single, { 'mesh.watertight': false, 'mesh.edges.boundary': 3, 'mesh.shells': 1, 'input.triangles': 1, 'mesh.warnings': has('not_watertight') })).toEqual([]); // prettier-ignore
    expect(Math.abs(single.mesh.areaMm2 - Math.hypot(30 * 10, 0, 30 * 20) / 2)).toBeLessThan(0.01);
    const flat = analysed(box(60, 40, 0));
    expect(missesOf(flat, { 'mesh.volumeMm3': abs(0, 1e-9), 'mesh.unionVolumeMm3': abs(0, 1e-9), 'plan.formedAreaMm2': rel(120 * 100, 1e-6), airTraps: [] })).toEqual([]); // prettier-ignore
    for (const report of [single, flat]) {
      expect(JSON.stringify(report, (_key, value: unknown) => (typeof value === 'number' && !Number.isFinite(value) ? 'BAD' : value))).not.toContain('BAD'); // prettier-ignore
    }
  });
});

/** Numbers from −1 to 1 (xorshift). */
function noise(seed: number): () => number {
  let state = seed;
  return () => {
    state ^= state << 13;
    state ^= state >>> 17;
    state ^= state << 5;
    return (state >>> 0) / 2 ** 31 - 1;
  };
}

describe('corners that do not meet bit for bit (xorshift seed 11)', () => {
  const body = lathe([[0, 0], [25, 0], [22, 20], [0, 20]], 32); // prettier-ignore
  const jittered = (amount: number) => {
    const roll = noise(11);
    return mapPoints(body, (x, y, z) => [x + amount * roll(), y + amount * roll(), z + amount * roll()]);
  };

  it.each([1e-5, 2.5e-5])('by %s mm: welded, and said so', (amount) => {
    quick(jittered(amount), {
      'mesh.watertight': true,
      'mesh.edges.boundary': 0,
      'mesh.shells': 1,
      'mesh.warnings': has('needs_tolerant_weld'),
      'mesh.repairs': has('tolerant_weld'),
      'mesh.volumeMm3': rel((20 / 3) * (625 + 550 + 484) * polygonFactor(32), 1e-4),
    });
  });

  it.each([0.002, 0.02])('by %s mm: open, and still measured', (amount) => {
    quick(jittered(amount), {
      'mesh.watertight': false,
      'mesh.warnings': has('not_watertight'),
      'mesh.repairs': lacks('tolerant_weld'),
      'mesh.unionVolumeMm3': rel((20 / 3) * (625 + 550 + 484) * polygonFactor(32), 0.015),
      'plan.planAreaMm2': rel(625 * polygonFactor(32), 0.015),
    });
  });
});
