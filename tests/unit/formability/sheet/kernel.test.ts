import { describe, expect, it } from 'vitest';
import { addForces, listActive } from '@/lib/formability/sheet/add-forces';
import { makeRectangle, type Membrane } from '@/lib/formability/sheet/membrane';
import { cycle, fixNode, makeMultigrid } from '@/lib/formability/sheet/multigrid';
import { dice } from '../dice';
import { makeDisc } from './make-disc';

const SEED = 20261;

/** Energy in μ t0 mm², from singular values: written apart from the forces. */
function energy(sheet: Membrane, pressure: number): number {
  let sum = 0;
  for (let e = 0; e < sheet.elements; e++) {
    const [p, q, r] = [0, 1, 2].map((c) => 3 * sheet.corners[3 * e + c]);
    const rest = (k: number) => [sheet.restX[k / 3], sheet.restY[k / 3]];
    const [rp, rq, rr] = [rest(p), rest(q), rest(r)];
    const at = (k: number, axis: number) => sheet.at[k + axis];
    const det = (rq[0] - rp[0]) * (rr[1] - rp[1]) - (rr[0] - rp[0]) * (rq[1] - rp[1]);
    const F = [0, 1, 2].map((axis) => {
      const [u, v] = [at(q, axis) - at(p, axis), at(r, axis) - at(p, axis)];
      return [
        (u * (rr[1] - rp[1]) - v * (rq[1] - rp[1])) / det,
        (v * (rq[0] - rp[0]) - u * (rr[0] - rp[0])) / det,
      ];
    });
    const dot = (i: number, j: number) => F.reduce((s, row) => s + row[i] * row[j], 0);
    const [a, b, c] = [dot(0, 0), dot(0, 1), dot(1, 1)];
    const spread = Math.hypot(a - c, 2 * b);
    const [one, two] = [Math.sqrt((a + c + spread) / 2), Math.sqrt(Math.max(0, (a + c - spread) / 2))];
    let w = (one ** 2 + two ** 2 + (one * two) ** -2 - 3) / 2;
    if (one <= 1 && two < one ** -0.5) w = 0;
    else if (two < one ** -0.5) w = (one ** 2 + 2 / one - 3) / 2;
    sum += (w * det) / 2;
    const x = [p, q, r].map((k) => [at(k, 0), at(k, 1), at(k, 2)]);
    const six =
      x[0][0] * (x[1][1] * x[2][2] - x[1][2] * x[2][1]) -
      x[0][1] * (x[1][0] * x[2][2] - x[1][2] * x[2][0]) +
      x[0][2] * (x[1][0] * x[2][1] - x[1][1] * x[2][0]);
    // Pressure from above does work on the volume over the cone to the origin.
    sum += (pressure * six) / 6;
  }
  return sum;
}

describe(`forces, seed ${SEED}`, () => {
  it.each([
    ['taut', 1.3, 1.2],
    ['wrinkled across', 1.6, 0.6],
    ['slack both ways', 0.8, 0.7],
  ])('are minus the slope of the energy: %s', (_, stretchX, stretchY) => {
    const roll = dice(SEED);
    const sheet = makeRectangle([0, 0], [6, 4], [6, 4], 0);
    for (let n = 0; n < sheet.nodes; n++) {
      sheet.at[3 * n] = stretchX * sheet.restX[n] + (roll(1000) - 500) / 2e4;
      sheet.at[3 * n + 1] = stretchY * sheet.restY[n] + (roll(1000) - 500) / 2e4;
      sheet.at[3 * n + 2] = (roll(1000) - 500) / 2e4;
    }
    const active = new Int32Array(sheet.elements);
    const count = listActive(sheet, active);
    const force = new Float64Array(3 * sheet.nodes);
    const pressure = 0.21;
    addForces(sheet, active, count, pressure, 1, force);
    let tried = 0;
    for (let n = 0; n < sheet.nodes; n++) {
      if (!sheet.free[n]) continue;
      for (let k = 3 * n; k < 3 * n + 3; k++) {
        const own = sheet.at[k];
        const step = 1e-5;
        sheet.at[k] = own + step;
        const up = energy(sheet, pressure);
        sheet.at[k] = own - step;
        const down = energy(sheet, pressure);
        sheet.at[k] = own;
        expect(Math.abs(force[k] + (up - down) / (2 * step))).toBeLessThan(2e-6);
        tried++;
      }
    }
    expect(tried).toBe(3 * 5 * 3);
  });

  it('vanish in the flat sheet, on a disc too, and carry no pressure where folded under', () => {
    for (const sheet of [makeRectangle([3, 4], [10, 7], [8, 8], 5), makeDisc(20, 16)]) {
      const active = new Int32Array(sheet.elements);
      const count = listActive(sheet, active);
      const force = new Float64Array(3 * sheet.nodes);
      addForces(sheet, active, count, 0, 1, force);
      expect(Math.max(...force.map(Math.abs))).toBeLessThan(1e-12);
      addForces(sheet, active, count, 0.5, 0.3, force);
      expect(Math.min(...force)).toBeLessThan(-1e-3);
      for (let n = 0; n < sheet.nodes; n++) sheet.at[3 * n] *= -1;
      addForces(sheet, active, count, 0.5, 0.3, force);
      expect(Math.max(...force.map(Math.abs))).toBeLessThan(1e-12);
    }
  });
});

describe('multigrid', () => {
  /** Greatest residual left after `cycles`, each on what the one before left, by that at the start. */
  function reduce(cells: number, cycles: number, fix: (i: number, j: number) => boolean): number {
    const roll = dice(SEED);
    const sheet = makeRectangle([0, 0], [cells, cells], [cells, cells], 0);
    const grid = makeMultigrid(sheet);
    const across = cells + 1;
    for (let n = 0; n < sheet.nodes; n++) {
      if (sheet.free[n] && fix(n % across, Math.floor(n / across))) fixNode(grid, n);
    }
    const wanted = Float64Array.from({ length: 3 * sheet.nodes }, (_, k) =>
      sheet.free[Math.floor(k / 3)] ? (roll(2000) - 1000) / 1000 : 0,
    );
    const sum = new Float64Array(3 * sheet.nodes);
    const { b, u } = grid.levels[0];
    for (let k = 0; k < cycles; k++) {
      for (let n = 0; n < sheet.nodes; n++) {
        for (let c = 3 * n; c < 3 * n + 3; c++) {
          const up = 3 * across;
          b[c] = sheet.free[n]
            ? wanted[c] - (4 * sum[c] - sum[c - 3] - sum[c + 3] - sum[c - up] - sum[c + up])
            : 0;
        }
      }
      if (k === cycles - 1) break;
      cycle(grid);
      for (let c = 0; c < u.length; c++) sum[c] += u[c];
    }
    return Math.max(...b.map(Math.abs));
  }

  it.each([32, 64, 128])('takes a residual down by more than half a cycle on %d cells', (cells) => {
    expect(reduce(cells, 9, () => false)).toBeLessThan(0.5 ** 8);
  });

  it(`still converges round fixed nodes of any shape, seed ${SEED}`, () => {
    const round = (i: number, j: number) => Math.hypot(i - 30, j - 35) < 14 || (i === 50 && j > 20);
    expect(reduce(64, 9, round)).toBeLessThan(0.8 ** 8);
    const roll = dice(SEED + 1);
    expect(reduce(64, 9, () => roll(10) === 0)).toBeLessThan(0.8 ** 8);
  });

  it('fixes coarse nodes one by one as it would all at once', () => {
    const sheet = makeRectangle([0, 0], [1, 1], [32, 32], 0);
    const grid = makeMultigrid(sheet);
    const roll = dice(SEED);
    for (let k = 0; k < 60; k++) {
      const node = roll(33 * 33);
      if (sheet.free[node]) fixNode(grid, node);
    }
    const anew = makeMultigrid(sheet);
    expect(anew.levels.length).toBe(4);
    grid.levels.forEach((level, k) => expect(level.free).toEqual(anew.levels[k].free));
  });
});
