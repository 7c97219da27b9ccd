import { describe, expect, it } from 'vitest';
import { WindingProbe } from '@/lib/formability/mesh/winding-probe';

describe('winding by rays', () => {
  it('holds a hundred thousand facets that each fill the whole plan', () => {
    const floors = 50_000;
    const position = new Float64Array(12 * floors);
    const index = new Uint32Array(6 * floors);
    for (let floor = 0; floor < floors; floor++) {
      position.set([0, 0, floor, 100, 0, floor, 100, 100, floor, 0, 100, floor], 12 * floor);
      index.set(
        [0, 1, 2, 0, 2, 3].map((v) => 4 * floor + v),
        6 * floor,
      );
    }
    // In every bucket of the finest division they would be 4.9 billion entries.
    const probe = new WindingProbe(index, position);
    const above = probe.windingAt(70, 20, 12_345.5, true, () => true);
    const below = probe.windingAt(70, 20, 12_345.5, false, () => true);
    expect([Math.abs(above), Math.abs(below)]).toEqual([floors - 12_346, 12_346]);
    expect(Math.sign(above)).toBe(-Math.sign(below));
    // Each ray looks at all of them: 100 rays are the 1e7 looks that all together may take, two are spent.
    const rays = Array.from({ length: 99 }, () => probe.windingAt(70, 20, 0.5, true, () => false));
    expect(rays.findIndex(Number.isNaN)).toBe(98);
  });
});
