import { describe, expect, it } from 'vitest';
import type { MeshPlace } from '@/lib/formability/report';
import { box, dome, extrude, frustum, lathe } from '../../../fixtures/meshes/solids';
import { flipped, mapPoints, moved, reordered, together, turned, type Triangles } from '../../../fixtures/meshes/triangles'; // prettier-ignore
import { reportOn } from '../run-engine';

const meshOf = (mesh: Triangles) => reportOn(mesh, { grid: { cellMm: 2 } }).mesh;
const cube = (size: number, x = 0, y = 0, z = 0) => moved(box(size, size, size), x, y, z);
const at = (places: MeshPlace[], code: MeshPlace['code']) => places.filter((place) => place.code === code);
const rounded = (places: MeshPlace[]) =>
  places.map(({ at: p }) => p.map((value) => Math.round(value * 100) / 100 + 0));

describe('bodies that overlap', () => {
  it('tells where two bodies go through one another, once for the pair', () => {
    const { warnings, places } = meshOf(together(cube(20), cube(20, 12, 12, 12)));
    expect(warnings).toEqual(['overlapping_shells']);
    const [place, ...others] = at(places, 'overlapping_shells');
    expect(others).toEqual([]);
    // The crossing runs round the common cube from 2 to 10 in x and y, from 12 to 20 in z.
    place.at.forEach((value, k) => expect(Math.abs(value - [6, 6, 16][k])).toBeLessThan(2));
    expect(place.sizeMm).toBeGreaterThan(8);
  });

  it('sees an overlap of 0.001 mm, and takes one of 0.00005 mm for a contact', () => {
    expect(meshOf(together(box(40, 40, 10), moved(box(20, 20, 10), 0, 0, 9.999))).warnings).toEqual([
      'overlapping_shells',
    ]);
    expect(meshOf(together(box(40, 40, 10), moved(box(20, 20, 10), 0, 0, 9.99995))).warnings).toEqual([
      'touching_shells',
    ]);
  });

  it('finds bodies with common planes, where no facet goes through another', () => {
    const { warnings, places } = meshOf(together(cube(20), cube(20, 12)));
    expect(warnings).toEqual(['overlapping_shells']);
    expect(at(places, 'overlapping_shells')).toHaveLength(1);
  });

  it('finds a body wholly within another, at its own place', () => {
    const { warnings, places } = meshOf(together(cube(30), cube(10, 3, 4, 8)));
    expect(warnings).toEqual(['overlapping_shells']);
    expect(rounded(places)).toEqual([[3, 4, 13]]);
  });

  it('a void is none, nor are bodies side by side whose boxes overlap', () => {
    expect(meshOf(together(cube(30), flipped(cube(10, 3, 4, 8)))).warnings).toEqual([]);
    const leaning = mapPoints(box(10, 40, 10), (x, y, z) => [x + y, y, z]);
    expect(meshOf(together(leaning, moved(leaning, 15, 0, 0))).warnings).toEqual([]);
  });
});

describe('bodies that touch', () => {
  const pair = [box(40, 40, 10), moved(box(20, 16, 12), 3, 2, 10)];

  it.each([
    ['on top', together(...pair), [3, 2, 10]],
    ['side by side', together(box(20, 30, 20), moved(box(20, 18, 12), 20, 1, 0)), [10, 1, 6]],
    ['at the same face', together(cube(20), cube(20, 20)), [10, 0, 10]],
  ])('%s: said once, at the contact', (_, mesh, wanted) => {
    const { warnings, places } = meshOf(mesh);
    expect(warnings).toContain('touching_shells');
    const [place] = at(places, 'touching_shells');
    place.at.forEach((value, k) => expect(Math.abs(value - wanted[k])).toBeLessThan(2.5));
  });

  it.each([17, 37, 90])(
    'turned by %s°, where rounding parts or sinks the contact by a few nanometres',
    (deg) => {
      for (const mesh of [together(...pair), together(box(20, 30, 20), moved(box(20, 18, 12), 20, 1, 0))]) {
        expect(meshOf(turned(mesh, deg)).warnings).toEqual(['touching_shells']);
      }
    },
  );

  it('along a line only: a roll lying on a block', () => {
    const roll = mapPoints(lathe([[0, -10], [8, -10], [8, 10], [0, 10]], 32), (x, y, z) => [y, z, x]); // prettier-ignore
    expect(meshOf(together(box(60, 40, 20), moved(roll, 0, 0, 28))).warnings).toEqual(['touching_shells']);
    expect(meshOf(together(box(60, 40, 20), moved(roll, 0, 0, 28.01))).warnings).toEqual(['floating']);
  });

  it('0.0002 mm apart do not touch', () => {
    expect(meshOf(together(box(20, 30, 20), moved(box(20, 18, 12), 20.0002, 1, 0))).warnings).toEqual([]);
  });
});

describe('a surface that goes through itself', () => {
  /** A strip bent into a ring whose ends pass through one another. */
  const ring = (radius: number) => {
    const n = 40;
    const top = Array.from({ length: n + 1 }, (_, i): [number, number] => [-50 + (100 * i) / n, 0]);
    const strip = extrude([...top, ...top.map(([x]): [number, number] => [-x, 8])], 20);
    return mapPoints(strip, (x, y, z) => {
      const a = (x / 50) * 3.6;
      const r = radius - z / 2;
      return [r * Math.sin(a), y, r + 8 - r * Math.cos(a)];
    });
  };

  it('is seen whichever way it lies, with the place where the ends pass', () => {
    const bent = ring(25);
    for (const mesh of [
      bent,
      turned(bent, 37),
      mapPoints(bent, (x, y, z) => [y, z, x]),
      mapPoints(bent, (x, y, z) => [z, x, y]),
    ]) {
      const { warnings, places, shells } = meshOf(mesh);
      expect(shells).toBe(1);
      expect(warnings).toContain('self_intersection');
      expect(at(places, 'self_intersection').length).toBeGreaterThan(0);
    }
    for (const { at: p } of at(meshOf(bent).places, 'self_intersection')) {
      // The ends meet opposite the middle of the strip, at the top of the ring.
      expect(p[2]).toBeGreaterThan(40);
      expect(Math.abs(p[0])).toBeLessThan(16);
    }
  });

  it('two arms of one body that pass through one another sideways, both walls upright', () => {
    // A comb seen from above: two teeth bent so that their walls cross by 1 mm.
    const comb: [number, number][] = [[0, 0], [30, 0], [30, 30], [19, 30], [17, 8], [13, 8], [20, 30], [0, 30]]; // prettier-ignore
    const mesh = mapPoints(extrude(comb, 20), (x, y, z) => [x - 15, z - 15, y + 10]);
    expect(meshOf(mesh).warnings).toContain('self_intersection');
  });

  it.each([
    ['a dome', dome(30, 64, 32)],
    ['a frustum', frustum(60, 40, 20, 5)],
    ['a lathe with a waist', lathe([[0, 0], [20, 0], [6, 15], [20, 30], [0, 30]], 48)], // prettier-ignore
  ])('%s does not', (_, mesh) => {
    expect(meshOf(mesh).warnings).not.toContain('self_intersection');
  });
});

describe('bodies in the air', () => {
  it('tells each body that nothing carries, and no tower that stands', () => {
    const base = box(40, 40, 10);
    expect(rounded(at(meshOf(together(base, cube(10, 0, 0, 15))).places, 'floating'))).toEqual([[0, 0, 20]]);
    const pile = together(base, cube(10, 0, 0, 10), cube(8, 0, 0, 20));
    expect(meshOf(pile).warnings).toEqual(['touching_shells']);
    const high = meshOf(together(base, cube(10, 0, 0, 10.01), cube(8, 0, 0, 20.01)));
    expect(rounded(at(high.places, 'floating'))).toEqual([
      [0, 0, 15.01],
      [0, 0, 24.01],
    ]);
  });

  it('a loose kernel in a void floats, one stuck into the wall does not', () => {
    const hollow = together(cube(40), flipped(cube(30, 0, 0, 5)));
    expect(meshOf(together(hollow, cube(5, 0, 0, 10))).warnings).toEqual(['floating']);
    expect(meshOf(together(hollow, cube(5, 14, 0, 10))).warnings).toEqual(['overlapping_shells']);
  });

  it('boxes that overlap are not enough to carry: a peg in the mouth of a ring', () => {
    const tub = lathe([[20, 0], [25, 0], [25, 30], [20, 30]], 48); // prettier-ignore
    expect(meshOf(together(tub, cube(10, 0, 0, 12))).warnings).toEqual(['floating']);
  });
});

it('places do not hang on the order of facets', () => {
  const mesh = together(frustum(40, 30, 20, 5), moved(dome(9, 24, 8), 12, 0, 0), cube(6, 0, 0, 30));
  const n = mesh.length / 9;
  const [a, b] = [
    meshOf(mesh),
    meshOf(
      reordered(
        mesh,
        Array.from({ length: n }, (_, i) => (i * 101) % n),
      ),
    ),
  ];
  expect(b.warnings).toEqual(a.warnings);
  expect(b.places.map(({ code, count }) => [code, count])).toEqual(
    a.places.map(({ code, count }) => [code, count]),
  );
  expect(rounded(b.places)).toEqual(rounded(a.places));
});
