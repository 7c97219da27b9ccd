import { describe, expect, it } from 'vitest';
import { analyse } from '@/lib/formability/analyse';
import type { AnalysisGeometry } from '@/lib/formability/report';
import { carved, rectangle } from '../../../fixtures/meshes/carved';
import { box, lathe } from '../../../fixtures/meshes/solids';
import { flipped, moved, together, type Triangles } from '../../../fixtures/meshes/triangles';
import { binaryStl } from '../../../fixtures/meshes/write-stl';

type P = [number, number];
const UNVENTED = 4;

interface Seen {
  /** distance of the facet's middle from the axis, and its own lowest and highest corner */
  r: number;
  low: number;
  high: number;
  /** outward from the axis (1), towards it (−1), up (0) */
  faces: number;
  draft: number;
  spill: number;
  unvented: boolean;
}

const geometryOf = (mesh: Triangles) => analyse(binaryStl(mesh)).geometry;

function facetsOf({ positions, facetDraftDeg, facetSpillMm, facetFlags }: AnalysisGeometry): Seen[] {
  return Array.from(facetDraftDeg, (draft, t) => {
    const p = positions.subarray(9 * t, 9 * t + 9);
    const [x, y] = [(p[0] + p[3] + p[6]) / 3, (p[1] + p[4] + p[7]) / 3];
    const [ux, uy, uz] = [p[3] - p[0], p[4] - p[1], p[5] - p[2]];
    const [vx, vy, vz] = [p[6] - p[0], p[7] - p[1], p[8] - p[2]];
    const out = (uy * vz - uz * vy) * x + (uz * vx - ux * vz) * y;
    return {
      r: Math.hypot(x, y),
      low: Math.min(p[2], p[5], p[8]),
      high: Math.max(p[2], p[5], p[8]),
      faces: Math.abs(draft) > 85 ? 0 : Math.sign(out),
      draft,
      spill: facetSpillMm[t],
      unvented: (facetFlags[t] & UNVENTED) !== 0,
    };
  });
}

const cup = (bore: number): P[] => [
  [bore, 0],
  [40, 0],
  [40, 30],
  [15, 30],
  [15, 10],
  [bore, 10],
];

describe('pockets that facets look into', () => {
  it.each([
    ['upright', 15],
    ['leaning 14° outward', 20],
  ])('a cup with %s walls: floor and wall spill at the rim, nothing else does', (_, mouth) => {
    const profile: P[] = [[0, 0], [40, 0], [40, 30], [mouth, 30], [15, 10], [0, 10]]; // prettier-ignore
    for (const { r, low, faces, draft, spill, unvented } of facetsOf(geometryOf(lathe(profile, 96)))) {
      const inside = (faces === 0 && draft > 0 && low === 10) || (faces === -1 && r < 25);
      if (inside) expect(spill).toBeCloseTo(30, 5);
      else expect(spill).toBeNaN();
      expect(unvented).toBe(inside);
    }
  });

  it('a vent leads the air out of it, whatever the printer makes of the vent; the bore is in no pocket', () => {
    const facets = facetsOf(geometryOf(lathe(cup(0.3), 96)));
    expect(facets.filter(({ spill }) => spill === 30).length).toBeGreaterThan(96 * 3);
    expect(facets.every(({ unvented }) => !unvented)).toBe(true);
    const bore = facets.filter(({ r, faces }) => r < 0.31 && faces === -1);
    expect(bore.length).toBe(96 * 2);
    expect(bore.every(({ spill }) => Number.isNaN(spill))).toBe(true);
  });

  it('a tower that rises out of a moat looks into it with its foot', () => {
    const moat = carved(rectangle(120, 120), 15, [{ ring: rectangle(80, 80), z: 5 }]);
    const tower = moved(box(30, 30, 45), 0, 0, 5);
    const facets = facetsOf(geometryOf(together(moat, tower)));
    const wall = facets.filter(({ low, high, faces }) => low === 5 && high === 50 && faces === 1);
    expect(wall).toHaveLength(8);
    expect(wall.map(({ spill }) => spill)).toEqual(Array(8).fill(15));
    const top = facets.filter(({ low }) => low === 50);
    expect(top.length).toBeGreaterThan(0);
    expect(top.every(({ spill }) => Number.isNaN(spill))).toBe(true);
  });

  it('a pocket in a pocket is told by the outer rim, as the sheet seals there first', () => {
    const profile: P[] = [[0, 0], [40, 0], [40, 30], [20, 30], [20, 18], [8, 18], [8, 6], [0, 6]]; // prettier-ignore
    const floors = facetsOf(geometryOf(lathe(profile, 64))).filter((f) => f.faces === 0 && f.draft > 0);
    for (const { low, spill } of floors) {
      if (low === 30) expect(spill).toBeNaN();
      else expect(spill).toBe(30);
    }
    expect(new Set(floors.map(({ low }) => low))).toEqual(new Set([6, 18, 30]));
  });

  it('a hollow under the pocket and a part without one have none', () => {
    const solid = geometryOf(box(60, 40, 20));
    expect(solid.facetSpillMm.every(Number.isNaN)).toBe(true);
    const plate = carved(rectangle(100, 100), 40, [{ ring: rectangle(30, 30), z: 30 }]);
    const hollow = flipped(moved(box(40, 40, 10), 0, 0, 10));
    const { facetSpillMm, positions } = geometryOf(together(plate, hollow));
    facetSpillMm.forEach((spill, t) => {
      const low = Math.min(positions[9 * t + 2], positions[9 * t + 5], positions[9 * t + 8]);
      if (low < 29) expect(spill).toBeNaN();
    });
    expect(facetSpillMm.some((spill) => spill === 40)).toBe(true);
  });
});
