import { describe, expect, it } from 'vitest';
import { cutSheet, outerSide } from '@/lib/stage-model/cut-sheet';

const SIDE = 9;

/** A square of 8 × 8 quads about the origin with a ridge along y = 0, half as thick there. */
function ridge() {
  const positions: number[] = [];
  const thicknessMm: number[] = [];
  for (let j = 0; j < SIDE; j++)
    for (let i = 0; i < SIDE; i++) {
      positions.push(i - 4, j - 4, Math.max(0, 2 - Math.abs(j - 4)));
      thicknessMm.push(j === 4 ? 0.5 : 1);
    }
  const index: number[] = [];
  for (let j = 0; j < SIDE - 1; j++)
    for (let i = 0; i < SIDE - 1; i++) {
      const n = j * SIDE + i;
      index.push(n, n + 1, n + SIDE, n + 1, n + SIDE + 1, n + SIDE);
    }
  return {
    positions: Float32Array.from(positions),
    thicknessMm: Float32Array.from(thicknessMm),
    index: Uint32Array.from(index),
  };
}

describe('the formed sheet along a cut', () => {
  it('is one run from edge to edge that follows its height and thickness', () => {
    const [run, ...others] = cutSheet(ridge(), { axis: 'x', atMm: 0.5 });
    expect(others).toEqual([]);
    expect(run.points[0]).toEqual([-4, 0]);
    expect(run.points[run.points.length - 1]).toEqual([4, 0]);
    for (const [y, z] of run.points) expect(z).toBeCloseTo(Math.max(0, 2 - Math.abs(y)), 6);
    const top = run.points.findIndex(([y]) => Math.abs(y) < 1e-9);
    expect(run.points[top][1]).toBeCloseTo(2, 6);
    expect(run.thicknessMm[top]).toBeCloseTo(0.5, 6);
    const along = run.points.map(([y]) => y);
    expect([...along].sort((a, b) => a - b)).toEqual(along);
  });

  it('through nodes meets each triangle once, and misses what lies beside it', () => {
    expect(cutSheet(ridge(), { axis: 'y', atMm: 0 })).toHaveLength(1);
    expect(cutSheet(ridge(), { axis: 'y', atMm: 9 })).toEqual([]);
  });

  it('is drawn outward by its thickness, as many times as asked for', () => {
    const run = { points: [[0, 0], [10, 0], [10, -10]] as [number, number][], thicknessMm: [1, 1, 0.5] }; // prettier-ignore
    const [start, corner, end] = outerSide(run, 2);
    expect(start).toEqual([0, 2]);
    expect(corner[0]).toBeCloseTo(10 + Math.SQRT2, 9);
    expect(corner[1]).toBeCloseTo(Math.SQRT2, 9);
    expect(end[0]).toBeCloseTo(11, 9);
  });
});
