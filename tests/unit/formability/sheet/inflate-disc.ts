import type { Membrane } from '@/lib/formability/sheet/membrane';
import { iterate, makeRun } from '@/lib/formability/sheet/relax';
import { makeDisc } from './make-disc';

export interface DiscInput {
  radiusMm: number;
  /** Elements across the diameter. */
  cells: number;
  /** Height of the pole wanted, mm. */
  heightMm: number;
  /** Greatest nodal force, in μ t0 × cell, and relative miss of the height at which it ends. */
  tolerance?: number;
  mostIterations?: number;
}

export interface Inflated {
  sheet: Membrane;
  /** p / (μ t0), per mm. */
  pressure: number;
  poleMm: number;
  /** Volume under the dome, mm³. */
  volumeMm3: number;
  iterations: number;
  residual: number;
  converged: boolean;
}

/** How fast the amount of gas follows the miss of the height, per iteration. */
const FEED = 0.1;
const FIRST_RISE = 0.05;

/**
 * Blows a clamped disc up to a wanted pole height. A fixed amount of gas (p V constant) presses it, not a fixed
 * pressure, so that states beyond the greatest pressure are reached as well; the amount follows the height.
 */
export function inflateDisc(input: DiscInput): Inflated {
  const { radiusMm, cells, heightMm, tolerance = 1e-9, mostIterations = 5000 } = input;
  const sheet = makeDisc(radiusMm, cells);
  const run = makeRun(sheet, null);
  const pole = 3 * ((cells / 2) * (cells + 1) + cells / 2) + 2;
  startAsCap(sheet, radiusMm, FIRST_RISE * heightMm);
  let volume = volumeUnder(sheet);
  let gas = (volume / radiusMm) * Math.min(1, heightMm / radiusMm);
  let pressure = 0;
  let miss = Infinity;
  while (run.iterations < mostIterations) {
    volume = volumeUnder(sheet);
    pressure = gas / volume;
    // Pressure acts on the upper side when positive; the gas is below.
    iterate(run, -pressure);
    miss = (heightMm - sheet.at[pole]) / heightMm;
    if (run.residual < tolerance && Math.abs(miss) < tolerance) break;
    gas *= 1 + FEED * Math.max(-1, Math.min(1, miss));
  }
  return {
    sheet,
    pressure,
    poleMm: sheet.at[pole],
    volumeMm3: volume,
    iterations: run.iterations,
    residual: run.residual,
    converged: run.residual < tolerance && Math.abs(miss) < tolerance,
  };
}

function startAsCap(sheet: Membrane, radius: number, height: number): void {
  for (let n = 0; n < sheet.nodes; n++) {
    if (!sheet.free[n]) continue;
    const share = (sheet.restX[n] ** 2 + sheet.restY[n] ** 2) / radius ** 2;
    sheet.at[3 * n + 2] = height * (1 - share);
  }
}

function volumeUnder({ at, corners, elements }: Membrane): number {
  let six = 0;
  for (let e = 0; e < elements; e++) {
    const p = 3 * corners[3 * e];
    const q = 3 * corners[3 * e + 1];
    const r = 3 * corners[3 * e + 2];
    const area = (at[q] - at[p]) * (at[r + 1] - at[p + 1]) - (at[r] - at[p]) * (at[q + 1] - at[p + 1]);
    six += area * (at[p + 2] + at[q + 2] + at[r + 2]);
  }
  return six / 6;
}
