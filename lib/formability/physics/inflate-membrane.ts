import { inRange } from './in-range';

/** A clamped disc of incompressible neo-Hookean sheet, blown up: heights in radii, pressure p a / (C₁ t₀), C₁ = E / 6. */
export interface Inflated {
  height: number;
  pressure: number;
  poleStretch: number;
  poleThickness: number;
  edgeThickness: number;
}

/** Where pressure is highest: above it no state of balance is left, and the sheet blows out. */
export const LIMIT_STRETCH = 2.1959445;
const LIMIT_PRESSURE = 3.7583469;
/** Steps that give a height to four digits. */
const COARSE = 60;

/** Steps of the first, rough pass, which finds how wide the disc is. */
const ROUGH = 100;

/**
 * State of the disc at a stretch of its pole. Equations of J. E. Adkins, R. S. Rivlin, Phil. Trans. R. Soc. A 244 (1952)
 * 505; integrated once from the pole at pressure 1 and scaled, so nothing is shot for.
 * @param poleStretch above 1
 * @param steps from pole to rim; 400 give six digits
 */
export function inflateMembrane(poleStretch: number, steps = 400): Inflated {
  inRange('pole stretch', poleStretch, 1, 20);
  // A flat blister is narrow in these units: Hencky's w = 0.595 a (p a / E t)^(1/3), with pole strain 0.65 (w/a)².
  const flat = 3 * (Math.sqrt((poleStretch - 1) / 0.65) / 0.595) ** 3;
  const radius = integrate(poleStretch, Math.min(4 * poleStretch, flat) / ROUGH).pressure / 2;
  return integrate(poleStretch, radius / steps);
}

function integrate(poleStretch: number, step: number): Inflated {
  // State r, z, T₁, θ over R; material 2 C₁ t₀ = 1, pressure 1.
  const start = 1e-6 * Math.min(1, step);
  const pole = tension(poleStretch, poleStretch);
  let state = [start * poleStretch, 0, pole, (start * poleStretch) / (2 * pole)];
  let radius = start;
  for (let k = 0; k < MOST_STEPS; k++) {
    const next = rungeKutta(derive, radius, state, step);
    if (next[0] / (radius + step) <= 1) return atRim(poleStretch, radius, state, step);
    state = next;
    radius += step;
  }
  throw new RangeError(`a pole stretch of ${poleStretch} closes nowhere`);
}

const MOST_STEPS = 100_000;

/** The rim lies where the hoop stretch has come back to 1, within the step that passes it. */
function atRim(poleStretch: number, radius: number, state: number[], step: number): Inflated {
  let [low, high] = [0, step];
  for (let round = 0; round < 50; round++) {
    const middle = (low + high) / 2;
    if (rungeKutta(derive, radius, state, middle)[0] / (radius + middle) > 1) low = middle;
    else high = middle;
  }
  const [, z, t1] = rungeKutta(derive, radius, state, high);
  const a = radius + high;
  return {
    height: -z / a,
    pressure: 2 * a,
    poleStretch,
    poleThickness: poleStretch ** -2,
    edgeThickness: 1 / meridianStretch(t1, 1),
  };
}

function tension(l1: number, l2: number): number {
  return l1 / l2 - (l1 * l2) ** -3;
}

function derive(at: number, [r, , t1, angle]: number[]): number[] {
  const l2 = r / at;
  const l1 = meridianStretch(t1, l2);
  const t2 = tension(l2, l1);
  const dr = l1 * Math.cos(angle);
  return [dr, -l1 * Math.sin(angle), ((t2 - t1) * dr) / r, (l1 * (1 - (t2 * Math.sin(angle)) / r)) / t1];
}

/** λ₁ of a tension at a hoop stretch: T₁ = λ₁/λ₂ − (λ₁λ₂)⁻³, which rises with λ₁. */
function meridianStretch(t1: number, l2: number): number {
  let l1 = Math.max(l2, t1 * l2, 0.5);
  for (let round = 0; round < 60; round++) {
    const value = l1 / l2 - (l1 * l2) ** -3 - t1;
    const change = value / (1 / l2 + 3 * l1 ** -4 * l2 ** -3);
    l1 -= change;
    if (Math.abs(change) < 1e-15 * l1) break;
  }
  return l1;
}

function rungeKutta(
  derive: (at: number, y: number[]) => number[],
  at: number,
  y: number[],
  step: number,
): number[] {
  const add = (slope: number[], share: number) => y.map((value, i) => value + share * slope[i]);
  const k1 = derive(at, y);
  const k2 = derive(at + step / 2, add(k1, step / 2));
  const k3 = derive(at + step / 2, add(k2, step / 2));
  const k4 = derive(at + step, add(k3, step));
  return y.map((value, i) => value + (step / 6) * (k1[i] + 2 * k2[i] + 2 * k3[i] + k4[i]));
}

const FLAT: Inflated = { height: 0, pressure: 0, poleStretch: 1, poleThickness: 1, edgeThickness: 1 };

/** The disc at a pressure p a / (C₁ t₀), to four digits; null above the highest pressure it can hold. */
export function stateAtPressure(pressure: number): Inflated | null {
  if (inRange('pressure p a / (C₁ t₀)', pressure, -Infinity, Infinity, true) <= 0) return FLAT;
  if (pressure >= LIMIT_PRESSURE) return null;
  // False position, Illinois variant, on a pressure that rises with the stretch.
  let [low, high] = [1 + 1e-9, LIMIT_STRETCH];
  let [below, above] = [-pressure, LIMIT_PRESSURE - pressure];
  let stretch = high;
  for (let round = 0, side = 0; round < 60 && high - low > 1e-10; round++) {
    stretch = (low * above - high * below) / (above - below);
    const off = inflateMembrane(stretch, COARSE).pressure - pressure;
    if (Math.abs(off) < 1e-9 * pressure) break;
    if (off > 0) {
      [high, above] = [stretch, off];
      if (side > 0) below /= 2;
      side = 1;
    } else {
      [low, below] = [stretch, off];
      if (side < 0) above /= 2;
      side = -1;
    }
  }
  return inflateMembrane(stretch, COARSE);
}
