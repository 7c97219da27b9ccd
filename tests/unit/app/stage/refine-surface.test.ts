import { describe, expect, it } from 'vitest';
import { refineSurface, type Surface } from '@/app/_components/stage/refine-surface';

/** A rectangle of two triangles in one plane, its left edge flagged as bed. */
const wall = (width: number, height: number): Surface => ({
  positions: Float32Array.from([0, 0, 0, width, 0, 0, width, 0, height, 0, 0, height]),
  normals: Float32Array.from([0, -1, 0, 0, -1, 0, 0, -1, 0, 0, -1, 0]),
  flags: Float32Array.from([1, 0, 0, 1]),
  index: Uint32Array.from([0, 1, 2, 0, 2, 3]),
});

const corner = ({ positions }: Surface, v: number) => [...positions.slice(3 * v, 3 * v + 3)];
const edgesOf = ({ index }: Surface) => {
  const edges = new Map<string, number>();
  for (let c = 0; c < index.length; c++) {
    const [a, b] = [index[c], index[c % 3 === 2 ? c - 2 : c + 1]];
    const key = a < b ? `${a} ${b}` : `${b} ${a}`;
    edges.set(key, (edges.get(key) ?? 0) + 1);
  }
  return edges;
};

describe('a surface made fine enough for a figure that varies over it', () => {
  it.each([
    [40, 3],
    [7, 7],
    [100, 60],
  ])('has no long edge, the same area, and no tear (%d × %d)', (width, height) => {
    const fine = refineSurface(wall(width, height), 2);
    let area = 0;
    for (let c = 0; c < fine.index.length; c += 3) {
      const [a, b, d] = [0, 1, 2].map((k) => corner(fine, fine.index[c + k]));
      const twice = (b[0] - a[0]) * (d[2] - a[2]) - (b[2] - a[2]) * (d[0] - a[0]);
      expect(twice).toBeGreaterThan(0);
      area += twice / 2;
    }
    expect(area).toBeCloseTo(width * height, 3);
    const outer = [...edgesOf(fine)].filter(([key, count]) => {
      const [a, b] = key.split(' ').map((v) => corner(fine, Number(v)));
      expect(Math.hypot(...a.map((v, k) => v - b[k]))).toBeLessThanOrEqual(2 + 1e-5);
      return count === 1;
    });
    // An edge of one triangle lies on the rectangle's own outline.
    for (const [key] of outer) {
      const [a, b] = key.split(' ').map((v) => corner(fine, Number(v)));
      const along = [0, 2].some((k) => a[k] === b[k] && (a[k] === 0 || a[k] === (k === 0 ? width : height)));
      expect(along).toBe(true);
    }
  });

  it('keeps flags where both ends have them, and leaves what is fine as it is', () => {
    const fine = refineSurface(wall(40, 30), 5);
    for (let v = 0; v < fine.flags.length; v++)
      expect(fine.flags[v]).toBe(fine.positions[3 * v] === 0 ? 1 : 0);
    expect(refineSurface(wall(4, 3), 5)).toEqual(wall(4, 3));
  });
});
