import { describe, expect, it } from 'vitest';
import { prepareStep, takeStep, type End, type Rod } from '@/lib/formability/physics/conduct';
import { erfc } from '@/lib/formability/physics/erf';

/** A rod of 1 m, 1 W/mK, 1 J/m³K: time is the Fourier number, the left end its insulated middle. */
function slab(cells: number): Rod {
  const of = (value: number) => new Float64Array(cells).fill(value);
  return { widthM: of(1 / cells), conductivityWmK: of(1), capacityJm3K: of(1) };
}

function run(rod: Rod, fourier: number, steps: number, left: End, right: End, start = 1): Float64Array {
  const celsius = new Float64Array(rod.widthM.length).fill(start);
  const step = prepareStep(rod, fourier / steps, left, right);
  for (let k = 0; k < steps; k++) takeStep(step, celsius);
  return celsius;
}

const mean = (values: Float64Array) => values.reduce((sum, one) => sum + one, 0) / values.length;
const held: End = { lossWm2K: Infinity, toC: 0 };

/** Σ (4/π) (−1)ⁿ / (2n+1) exp(−((2n+1) π/2)² Fo) in the middle; mean Σ 8/π² / (2n+1)² exp(…). */
function fixedSeries(fourier: number): { centre: number; mean: number } {
  let [centre, all] = [0, 0];
  for (let n = 0; n < 60; n++) {
    const k = 2 * n + 1;
    const decay = Math.exp(-(((k * Math.PI) / 2) ** 2) * fourier);
    centre += ((4 / Math.PI) * (n % 2 ? -1 : 1) * decay) / k;
    all += ((8 / Math.PI ** 2) * decay) / k ** 2;
  }
  return { centre, mean: all };
}

/** Roots of ζ tan ζ = Bi and Heisler's series at a share of the half thickness. */
function convectiveSeries(biot: number, fourier: number, at: number): number {
  let sum = 0;
  for (let n = 0; n < 40; n++) {
    let [low, high] = [n * Math.PI, n * Math.PI + Math.PI / 2 - 1e-12];
    for (let round = 0; round < 80; round++) {
      const middle = (low + high) / 2;
      if (middle * Math.tan(middle) < biot) low = middle;
      else high = middle;
    }
    const zeta = low;
    const c = (4 * Math.sin(zeta)) / (2 * zeta + Math.sin(2 * zeta));
    if (n === 0 && biot === 1) {
      // H10, H11: Incropera and DeWitt, table 5.1.
      expect(zeta).toBeCloseTo(0.8603336, 6);
      expect(c).toBeCloseTo(1.119132, 6);
    }
    sum += c * Math.exp(-zeta * zeta * fourier) * Math.cos(zeta * at);
  }
  return sum;
}

describe('plane wall with a fixed surface: exact series', () => {
  it.each([
    [0.05, 0.9968692, 0.747687],
    [0.1, 0.9493054, 0.6431766],
    [0.2, 0.7723116, 0.4959122],
    [0.5, 0.3707774, 0.2360497],
    [1, 0.107977, 0.0687403],
  ])('Fourier number %f: series as tabled, solver within 2e-4 (H7, H8, H9)', (fourier, centre, all) => {
    const series = fixedSeries(fourier);
    expect(series.centre).toBeCloseTo(centre, 6);
    expect(series.mean).toBeCloseTo(all, 5);
    const found = run(slab(80), fourier, 120, null, held);
    expect(Math.abs(found[0] - centre)).toBeLessThan(2e-4);
    expect(Math.abs(mean(found) - all)).toBeLessThan(2e-4);
  });

  it('is of second order in time', () => {
    const fine = run(slab(40), 0.3, 4096, null, held)[0];
    const errors = [16, 32, 64].map((steps) => Math.abs(run(slab(40), 0.3, steps, null, held)[0] - fine));
    expect(errors[0] / errors[1]).toBeGreaterThan(3.3);
    expect(errors[1] / errors[2]).toBeGreaterThan(3.5);
  });

  it('does not swing on a step that is far too long', () => {
    const found = run(slab(40), 50, 1, null, held);
    for (const value of found) expect(Math.abs(value)).toBeLessThan(0.1);
  });
});

describe('plane wall with convection: Heisler, Incropera and DeWitt table 5.1', () => {
  it.each([
    [1, 0.5, 0.772526],
    [1, 1, 0.533859],
    [0.1, 2, convectiveSeries(0.1, 2, 0)],
    [10, 0.3, convectiveSeries(10, 0.3, 0)],
  ])('Biot number %f, Fourier number %f (H10, H11, H12)', (biot, fourier, centre) => {
    expect(convectiveSeries(biot, fourier, 0)).toBeCloseTo(centre, 6);
    const found = run(slab(60), fourier, 100, null, { lossWm2K: biot, toC: 0 });
    expect(Math.abs(found[0] - convectiveSeries(biot, fourier, 0.5 / 60))).toBeLessThan(3e-4);
    expect(Math.abs(found[59] - convectiveSeries(biot, fourier, 1 - 0.5 / 60))).toBeLessThan(1e-3);
  });
});

describe('thick body under convection', () => {
  /** θ = erfc ξ − exp(2ξH + H²) erfc(ξ + H), share of the way to the air's temperature. */
  const exact = (xi: number, H: number) => erfc(xi) - Math.exp(2 * xi * H + H * H) * erfc(xi + H);

  it('surface at H = h √(αt) / k = 1 (H13)', () => {
    expect(exact(0, 1)).toBeCloseTo(0.5724164, 7);
    expect(exact(0.5, 1)).toBeCloseTo(0.2290491, 6);
    const n = 400;
    const width = 0.02;
    const of = (value: number) => new Float64Array(n).fill(value);
    const rod = { widthM: of(width), conductivityWmK: of(1), capacityJm3K: of(1) };
    const found = run(rod, 1, 100, { lossWm2K: 1, toC: 1 }, null, 0);
    // Surface by the flow through the first half cell.
    const surface = (found[0] * (2 / width) + 1) / (2 / width + 1);
    expect(Math.abs(surface - exact(0, 1))).toBeLessThan(2e-4);
    expect(Math.abs(found[50] - exact((50.5 * width) / 2, 1))).toBeLessThan(2e-4);
  });
});

describe('balance and bad input', () => {
  it('keeps the heat of an insulated rod of unlike cells', () => {
    const rod = {
      widthM: Float64Array.of(0.1, 0.2, 0.05, 0.4),
      conductivityWmK: Float64Array.of(1, 0.1, 5, 0.3),
      capacityJm3K: Float64Array.of(2, 1, 4, 0.5),
    };
    const celsius = Float64Array.of(100, 20, 60, -5);
    const heat = () => celsius.reduce((sum, t, i) => sum + t * rod.widthM[i] * rod.capacityJm3K[i], 0);
    const before = heat();
    const step = prepareStep(rod, 0.01, null, null);
    for (let k = 0; k < 500; k++) takeStep(step, celsius);
    expect(heat()).toBeCloseTo(before, 9);
    const even = before / rod.widthM.reduce((sum, w, i) => sum + w * rod.capacityJm3K[i], 0);
    for (let k = 0; k < 5000; k++) takeStep(step, celsius);
    for (const t of celsius) expect(t).toBeCloseTo(even, 6);
  });

  it('says which value cannot be', () => {
    expect(() => prepareStep(slab(3), 0, null, null)).toThrow(/give a time above 0/);
    expect(() => prepareStep(slab(0), 1, null, null)).toThrow(/needs cells/);
    const broken = { ...slab(3), capacityJm3K: Float64Array.of(1, NaN, 1) };
    expect(() => prepareStep(broken, 1, null, null)).toThrow(/cell 1/);
  });
});
