import { describe, expect, it } from 'vitest';
import { measureElements } from '@/lib/formability/sheet/measure-elements';
import { inflateDisc, type Inflated } from './inflate-disc';
import { inflate, inflateTo, type Inflation } from './inflation-ode';

/** Greatest and root-mean-square relative difference of element thickness over the whole disc. */
function profileError({ sheet }: Inflated, ode: Inflation, radius: number): { most: number; rms: number } {
  const { area, thickness } = measureElements(sheet, 1);
  let most = 0;
  let squares = 0;
  let whole = 0;
  for (let e = 0; e < sheet.elements; e++) {
    const [a, b, c] = sheet.corners.subarray(3 * e, 3 * e + 3);
    const x = (sheet.restX[a] + sheet.restX[b] + sheet.restX[c]) / 3;
    const y = (sheet.restY[a] + sheet.restY[b] + sheet.restY[c]) / 3;
    const wanted = ode.at(Math.hypot(x, y) / radius).thickness;
    const off = thickness[e] / wanted - 1;
    most = Math.max(most, Math.abs(off));
    squares += off * off * area[e];
    whole += area[e];
  }
  return { most, rms: Math.sqrt(squares / whole) };
}

// Rows M1 to M10 and M12 beside physics/membrane.test.ts; M11 (Mooney-Rivlin) here alone.
describe('clamped circular membrane: the reference solution', () => {
  // Computed with an eighth-order integrator at a relative tolerance of 1e-12 and confirmed by collocation and energy.
  const table: [number, number, number, number, number, number][] = [
    // h/a, p a/(C1 t0), pole stretch, t/t0 at pole, at edge, edge angle in degrees
    [0.1, 0.0276426, 1.0065354, 0.987056, 0.992105, 12.691],
    [0.25, 0.3696941, 1.0414452, 0.921992, 0.954491, 31.264],
    [0.5, 1.8012769, 1.1755714, 0.723606, 0.860922, 59.351],
    [0.75, 3.121567, 1.4328108, 0.487105, 0.785506, 81.831],
    [1, 3.6798648, 1.8355883, 0.29679, 0.744732, 98.306],
    [1.25, 3.747383, 2.3727165, 0.177627, 0.724779, 110.317],
    [1.5, 3.6074267, 3.0319477, 0.108782, 0.714376, 119.408],
    [2, 3.1665375, 4.7058288, 0.045157, 0.704702, 132.228],
  ];
  it.each(table)('h/a = %d', (height, pressure, stretch, pole, edge, angle) => {
    const found = inflate(stretch);
    expect(found.height).toBeCloseTo(height, 5);
    expect(Math.abs(found.pressure / pressure - 1)).toBeLessThan(height < 0.2 ? 2e-5 : 1e-6);
    expect(found.at(0).thickness).toBeCloseTo(pole, 5);
    expect(found.at(1).thickness).toBeCloseTo(edge, 5);
    expect(found.edgeAngleDeg).toBeCloseTo(angle, 2);
  });

  it('has its greatest pressure at h/a = 1.1739, and a Mooney-Rivlin sheet (α = 0.1) its own pressure', () => {
    const limit = inflate(2.1959445);
    expect(limit.pressure).toBeCloseTo(3.7583469, 5);
    expect(limit.height).toBeCloseTo(1.1738969, 5);
    expect(inflate(2.19).pressure).toBeLessThan(limit.pressure);
    expect(inflate(2.2).pressure).toBeLessThan(limit.pressure);
    const rubber = inflate(1.749968, 0.1);
    expect(rubber.height).toBeCloseTo(1, 5);
    expect(rubber.pressure).toBeCloseTo(4.602583, 4);
  });
});

describe('small deflection', () => {
  it('tends to the dish of H. Hencky (1915, recomputed for ν = 0.5): w0 = k a (p a / E t0)^1/3, k = 0.594879', () => {
    // E = 3 μ = 6 C1.
    const k = (height: number, pressure: number) => height / (pressure / 6) ** (1 / 3);
    const [near, nearer] = [0.04, 0.02].map((height) => k(height, inflateTo(height).pressure));
    // The difference goes with the square of the height.
    expect(Math.abs((4 * nearer - near) / 3 / 0.594879 - 1)).toBeLessThan(1e-4);
  });
});

describe('membrane solver against the reference', () => {
  it.each([0.25, 0.5, 1, 1.3])('pressure, pole and whole thickness profile at h/a = %d', (height) => {
    const radiusMm = 37;
    const found = inflateDisc({ radiusMm, cells: 80, heightMm: height * radiusMm });
    const ode = inflateTo(height);
    expect(found.converged).toBe(true);
    expect(found.poleMm / radiusMm).toBeCloseTo(height, 8);
    // p a / (C1 t0) with μ = 2 C1.
    expect(Math.abs((2 * found.pressure * radiusMm) / ode.pressure - 1)).toBeLessThan(2e-3);
    const { most, rms } = profileError(found, ode, radiusMm);
    expect(rms).toBeLessThan(height > 1 ? 8e-3 : 5e-3);
    expect(most).toBeLessThan(0.02);
    const stretches = measureElements(found.sheet, 1);
    const pole = 40 * 81 + 40;
    expect(Math.abs(stretches.nodeThickness[pole] / ode.at(0).thickness - 1)).toBeLessThan(0.01);
  });

  it('passes the greatest pressure: higher domes need less', () => {
    const blow = (height: number) => inflateDisc({ radiusMm: 50, cells: 24, heightMm: 50 * height });
    const [before, at, after] = [0.9, 1.2, 1.6].map(blow);
    expect([before, at, after].every((one) => one.converged)).toBe(true);
    expect(before.pressure).toBeLessThan(at.pressure);
    expect(after.pressure).toBeLessThan(at.pressure);
  });

  it('is of second order, in a number of iterations that does not grow with the mesh', () => {
    const ode = inflateTo(0.8);
    const runs = [16, 32, 64].map((cells) => inflateDisc({ radiusMm: 50, cells, heightMm: 40 }));
    const errors = runs.map((one) => Math.abs((2 * one.pressure * 50) / ode.pressure - 1));
    const orders = [Math.log2(errors[0] / errors[1]), Math.log2(errors[1] / errors[2])];
    expect(orders[0]).toBeGreaterThan(1.7);
    expect(orders[1]).toBeGreaterThan(1.8);
    expect(runs[2].iterations).toBeLessThan(1.3 * runs[0].iterations);
  });

  it('says so when it may not go on', () => {
    const short = inflateDisc({ radiusMm: 50, cells: 16, heightMm: 40, mostIterations: 20 });
    expect(short.converged).toBe(false);
    expect(short.iterations).toBe(20);
    expect(short.residual).toBeGreaterThan(1e-9);
  });
});
