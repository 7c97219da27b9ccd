/** A row of cells that heat flows along, from the left end to the right: width m, conductivity W/mK, capacity J/m³K. */
export interface Rod {
  widthM: Float64Array;
  conductivityWmK: Float64Array;
  capacityJm3K: Float64Array;
}

/** What an end gives to: a loss in W/m²K to a temperature in °C; Infinity holds the end at it, null insulates it. */
export type End = { lossWm2K: number; toC: number } | null;

/** One step of a length in time, its matrix taken apart once for as many uses as wanted. */
export interface HeatStep {
  timeS: number;
  capacity: Float64Array;
  lower: Float64Array;
  upper: Float64Array;
  pivot: Float64Array;
  /** Heat that the ends put in per stage, J/m². */
  source: Float64Array;
  /** Room for the first stage. */
  scratch: Float64Array;
}

/** Alexander's two-stage method: both stages share a matrix, second order, and stiff modes die out. */
const STAGE = 1 - Math.SQRT1_2;

/**
 * Prepares a step of heat flow through layers without contact resistance (finite volumes; R. Alexander's singly
 * diagonally implicit method of 1977, from memory; held against the exact series in the tests).
 * @throws RangeError for a rod without cells, cells or a time that are not above 0
 */
export function prepareStep(rod: Rod, timeS: number, left: End, right: End): HeatStep {
  const n = rod.widthM.length;
  if (n === 0 || rod.conductivityWmK.length !== n || rod.capacityJm3K.length !== n)
    throw new RangeError('a rod needs cells, each with a width, a conductivity and a capacity');
  if (!(timeS > 0)) throw new RangeError(`a step of ${timeS} s leads nowhere: give a time above 0`);
  const resistance = rod.widthM.map((width, i) => width / 2 / rod.conductivityWmK[i]);
  const share = STAGE * timeS;
  const flow = (i: number) => share / (resistance[i] + resistance[i + 1]);
  const atEnd = (end: End, i: number) => (end ? share / (1 / end.lossWm2K + resistance[i]) : 0);
  const step: HeatStep = {
    timeS,
    capacity: rod.capacityJm3K.map((capacity, i) => capacity * rod.widthM[i]),
    lower: new Float64Array(n),
    upper: new Float64Array(n),
    pivot: new Float64Array(n),
    source: new Float64Array(n),
    scratch: new Float64Array(n),
  };
  for (let i = 0; i < n; i++) {
    const before = i > 0 ? flow(i - 1) : atEnd(left, 0);
    const after = i + 1 < n ? flow(i) : atEnd(right, n - 1);
    let diagonal = step.capacity[i] + before + after;
    if (!(diagonal > 0 && Number.isFinite(diagonal)))
      throw new RangeError(`cell ${i} of the rod has a width, conductivity or capacity that is not above 0`);
    if (i === 0 && left) step.source[0] += before * left.toC;
    if (i + 1 === n && right) step.source[i] += after * right.toC;
    if (i > 0) {
      step.lower[i] = before;
      diagonal -= before * step.upper[i - 1];
    }
    step.pivot[i] = 1 / diagonal;
    step.upper[i] = i + 1 < n ? after * step.pivot[i] : 0;
  }
  return step;
}

/** Takes the temperatures of the cells, °C, one step on, in place. */
export function takeStep(step: HeatStep, celsius: Float64Array): void {
  const { capacity, scratch: stage } = step;
  stage.set(celsius);
  solve(step, stage);
  // The rate of the first stage carries to the second: T + (1 − γ) / γ (T₁ − T).
  const carried = (1 - STAGE) / STAGE;
  for (let i = 0; i < capacity.length; i++) celsius[i] += carried * (stage[i] - celsius[i]);
  solve(step, celsius);
}

/** Thomas's elimination with the stored pivots. */
function solve({ capacity, lower, upper, pivot, source }: HeatStep, t: Float64Array): void {
  const n = capacity.length;
  t[0] = (capacity[0] * t[0] + source[0]) * pivot[0];
  for (let i = 1; i < n; i++) t[i] = (capacity[i] * t[i] + source[i] + lower[i] * t[i - 1]) * pivot[i];
  for (let i = n - 2; i >= 0; i--) t[i] += upper[i] * t[i + 1];
}
