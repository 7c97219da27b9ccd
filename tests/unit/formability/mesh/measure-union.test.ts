import Module from 'manifold-3d';
import { beforeAll, describe, expect, it } from 'vitest';
import { judgeShells } from '@/lib/formability/mesh/judge-shells';
import { prepareMesh } from '@/lib/formability/mesh/prepare-mesh';
import { buildColumns } from '@/lib/formability/dexel/columns';
import { makeGrid } from '@/lib/formability/dexel/grid';
import { rasterise } from '@/lib/formability/dexel/raster';
import { scannedRabbit } from '../../../fixtures/meshes/known-models';
import { box, dome, frustum, lathe } from '../../../fixtures/meshes/solids';
import { flipped, mapPoints, moved, reordered, together, turned, type Triangles } from '../../../fixtures/meshes/triangles'; // prettier-ignore

/** The union alone, on a grid so coarse that no figure of the columns could pass for it. */
function judged(mesh: Triangles, cells = 9) {
  const raw = {
    format: 'stl-binary' as const,
    triangles: mesh.length / 9,
    coords: Float32Array.from(mesh),
    warnings: [],
  };
  const prepared = prepareMesh(raw, { mmPerUnit: 1, up: [0, 0, 1], dropToBed: true });
  const { min, max, capped, shells } = prepared;
  const [x, y] = capped.mesh.centre;
  const grid = makeGrid([min[0] - x, min[1] - y], [max[0] - x, max[1] - y], (max[0] - min[0]) / cells);
  return judgeShells(prepared, buildColumns(rasterise(capped.mesh, grid, 2), grid, shells.ofFacet));
}
const unionOf = (...bodies: Triangles[]) => judged(together(...bodies)).unionVolumeMm3;
const cube = (size: number, x = 0, y = 0, z = 0) => moved(box(size, size, size), x, y, z);
const share = (found: number, wanted: number) => Math.abs(found / wanted - 1);

/** Two balls of radius 20, their middles 20, 3 and 2 mm apart along the axes, one turned so that no edges meet. */
function twoBalls(sides: number, rings: number): Triangles[] {
  const profile = Array.from({ length: rings - 1 }, (_, i): [number, number] => {
    const angle = -Math.PI / 2 + (Math.PI * (i + 1)) / rings;
    return [20 * Math.cos(angle), 20 + 20 * Math.sin(angle)];
  });
  const ball = lathe([[0, 0], ...profile, [0, 40]], sides);
  return [ball, moved(turned(ball, 0.7), 20, 3, 2)];
}
const apart = Math.hypot(20, 3, 2);
const lensOfBalls = (Math.PI * (80 + apart) * (40 - apart) ** 2) / 12;

describe('union volume against closed forms', () => {
  it.each([
    ['shifted along an edge, four planes in common', [10, 0, 0], 16_000 - 10 * 400],
    ['shifted along two edges, two planes in common', [7, 6, 0], 16_000 - 13 * 14 * 20],
    ['shifted along a diagonal', [7, 6, 5], 16_000 - 13 * 14 * 15],
    ['by a hair', [19.99, 0, 0], 16_000 - 0.01 * 400],
  ] as const)('two cubes of 20, %s', (_, [x, y, z], wanted) => {
    expect(share(unionOf(cube(20), cube(20, x, y, z)), wanted)).toBeLessThan(1e-6);
  });

  it('two squares turned by 45° against each other: a star of eight points', () => {
    const octagon = 400 * 2 * (Math.SQRT2 - 1);
    expect(share(unionOf(cube(20), turned(cube(20), 45)), (800 - octagon) * 20)).toBeLessThan(1e-6);
  });

  it('three cubes in one place, winding number 3 in the middle, and four in a ring', () => {
    expect(share(unionOf(cube(20), cube(20, 4), cube(20, 8)), 28 * 400)).toBeLessThan(1e-6);
    const ring = [cube(20), cube(20, 15), cube(20, 15, 15), cube(20, 0, 15)];
    expect(share(unionOf(...ring), 35 * 35 * 20)).toBeLessThan(1e-6);
  });

  it('a body within a body counts once, a void is taken off, a body within the void is added', () => {
    const [outer, hollow, kernel] = [cube(30), flipped(cube(20, 0, 0, 5)), cube(10, 1, 2, 8)];
    expect(share(unionOf(outer, kernel), 27_000)).toBeLessThan(1e-9);
    expect(share(unionOf(outer, hollow), 19_000)).toBeLessThan(1e-9);
    expect(share(unionOf(outer, hollow, kernel), 20_000)).toBeLessThan(1e-9);
  });

  it('a body that reaches through the wall of a hollow one', () => {
    // Cube of 40 with a void of 20, and a bar 10 × 10 from its middle to 40: 10 mm in the void, 10 in the wall, 20 outside.
    const bar = mapPoints(box(40, 10, 10), (x, y, z) => [x + 20, y, z + 15]);
    expect(
      share(unionOf(cube(40), flipped(cube(20, 0, 0, 10)), bar), 64_000 - 8000 + 1000 + 2000),
    ).toBeLessThan(1e-6);
  });

  it('bodies that only touch keep the sum to the last digit', () => {
    expect(unionOf(box(40, 40, 10), moved(box(20, 20, 10), 3, 2, 10))).toBe(20_000);
    expect(unionOf(cube(20), cube(20, 20))).toBe(16_000);
    expect(unionOf(cube(20), cube(20, 0, 0, 20))).toBe(16_000);
  });

  it('two balls of 160 × 90 facets: less than the smooth lens by what the facets cut off', () => {
    const smooth = (64_000 / 3) * Math.PI - lensOfBalls;
    const found = unionOf(...twoBalls(160, 90));
    expect(found).toBeLessThan(smooth);
    expect(share(found, smooth)).toBeLessThan(7e-4);
  });

  it('does not hang on the order of facets, nor on the order of bodies', () => {
    const [one, other] = [frustum(60, 40, 30, 6), moved(turned(dome(20, 24, 12), 5), 22, 4, 0)];
    const mesh = together(one, other);
    const n = mesh.length / 9;
    const base = judged(mesh).unionVolumeMm3;
    const shuffled = reordered(
      mesh,
      Array.from({ length: n }, (_, i) => (i * 101) % n),
    );
    expect(share(judged(shuffled).unionVolumeMm3, base)).toBeLessThan(1e-7);
    expect(share(unionOf(other, one), base)).toBeLessThan(1e-7);
  });
});

describe('union volume against manifold-3d', () => {
  let wasm: Awaited<ReturnType<typeof Module>>;
  beforeAll(async () => {
    wasm = await Module();
    wasm.setup();
  });

  function solid(mesh: Triangles) {
    const coords = Float32Array.from(mesh);
    const numbers = new Map<string, number>();
    const points: number[] = [];
    const triVerts = new Uint32Array(coords.length / 3);
    for (let i = 0; i < coords.length; i += 3) {
      const key = `${coords[i]},${coords[i + 1]},${coords[i + 2]}`;
      let at = numbers.get(key);
      if (at === undefined) {
        numbers.set(key, (at = numbers.size));
        points.push(coords[i], coords[i + 1], coords[i + 2]);
      }
      triVerts[i / 3] = at;
    }
    const vertProperties = Float32Array.from(points);
    return new wasm.Manifold(new wasm.Mesh({ numProp: 3, vertProperties, triVerts }));
  }

  function manifoldUnion(bodies: Triangles[]): number {
    return wasm.Manifold.union(bodies.map(solid)).volume();
  }

  it('two scanned rabbits stuck into each other, and a rabbit in a block', () => {
    const rabbit = moved(scannedRabbit(10), 0, 0, 20);
    const pairs = [
      [rabbit, moved(turned(rabbit, 40), 25, 8, 3)],
      [rabbit, moved(box(60, 50, 45), 0, 0, 0)],
    ];
    for (const bodies of pairs) expect(share(unionOf(...bodies), manifoldUnion(bodies))).toBeLessThan(2e-6);
  });

  it('two balls of 80,000 facets, of which only those near the other are looked at', () => {
    const bodies = twoBalls(200, 101);
    const { unionVolumeMm3, warnings } = judged(together(...bodies), 250);
    expect(share(unionVolumeMm3, manifoldUnion(bodies))).toBeLessThan(2e-6);
    expect(warnings).toEqual(['overlapping_shells']);
  });

  it.each(Array.from({ length: 12 }, (_, i) => i + 1))(
    'five bodies in a heap (linear congruential seed %s)',
    (seed) => {
      let state = seed * 2654435761;
      const roll = () => (state = (Math.imul(state, 1664525) + 1013904223) >>> 0) / 2 ** 32;
      const bodies = Array.from({ length: 5 }, (_, i) => {
        const body = [box(10 + 20 * roll(), 15, 12), frustum(24, 18, 15, 8), dome(11, 20, 8), lathe([[0, 0], [9, 0], [6, 14], [0, 14]], 17)][Math.floor(4 * roll())]; // prettier-ignore
        return moved(turned(body, 360 * roll()), 22 * roll(), 22 * roll(), i % 2 === 0 ? 0 : 9 * roll());
      });
      expect(share(unionOf(...bodies), manifoldUnion(bodies))).toBeLessThan(5e-6);
    },
  );
});
