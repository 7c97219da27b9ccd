import { contactC, type ThermalBody } from './conduction';
import { prepareStep, takeStep, type HeatStep, type Rod } from './conduct';

/** Sheet upon template, seen along the pull: what touches, from when to when, and what lies behind. */
export interface PullSequence {
  sheet: ThermalBody;
  gaugeMm: number;
  formingC: number;
  /** Mean temperature at which the sheet is taken off. */
  demouldC: number;
  tool: ThermalBody;
  /** Printed wall, infill behind it as a share of solid, and depth of both together. */
  shellMm: number;
  infillShare: number;
  depthMm: number;
  ambientC: number;
  /** Loss of the upper side to the air, W/m²K; 0 insulates it. */
  lossWm2K: number;
  cycleS: number;
  pulls: number;
}

export interface FollowedPulls {
  /** Hottest surface of the template in each pull that was followed; later ones are as the last. */
  surfaceC: number[];
  /** Time from laying on to demoulding, first and last pull; null where the sheet does not set within the cycle. */
  setFirstS: number | null;
  setLastS: number | null;
  /** Pulls from the first on whose sheet sets within the cycle. */
  setPulls: number;
  /** Whether pulls had become alike, or all were followed. */
  settled: boolean;
  /** Hottest that each depth below the surface gets, in the first and the last pull. */
  profile: { depthMm: number; firstC: number; lastC: number }[];
}

const SHEET_CELLS = 10;
const TOOL_CELLS = 36;
/** First cell of the template, share of the gauge; the others grow evenly to the depth wanted. */
const FIRST_CELL = 0.1;
const STEPS = 28;
/** First step, share of the sheet's own time a² / α. */
const FIRST_STEP = 0.002;
/** Pulls that differ by less are alike, K. */
const ALIKE_K = 0.01;
const MOST_PULLS = 200;

/**
 * Follows pull after pull through sheet and template in one dimension: a hot sheet is laid on, gives its heat off until
 * its mean has come down to demoulding, and the bare surface cools to the air for the rest of the cycle. What lies on top,
 * sheet or template, loses to the air; the bed takes nothing. No contact resistance, which would make it cooler.
 */
export function followPulls(job: PullSequence): FollowedPulls {
  const rods = layRods(job);
  const times = stepTimes(job);
  const loss = { lossWm2K: job.lossWm2K, toC: job.ambientC };
  const pressed = times.map((time) => prepareStep(rods.both, time, loss, null));
  const bare = times.map((time) => prepareStep(rods.tool, time, loss, null));
  const celsius = new Float64Array(SHEET_CELLS + TOOL_CELLS).fill(job.ambientC);
  const tool = celsius.subarray(SHEET_CELLS);
  const first = new Float64Array(TOOL_CELLS).fill(-Infinity);
  const last = new Float64Array(TOOL_CELLS);
  const surfaceC: number[] = [];
  let setFirstS: number | null = null;
  let setLastS: number | null = null;
  let setPulls = 0;
  let settled = false;
  const most = Math.min(job.pulls, MOST_PULLS);
  for (let pull = 0; pull < most && !settled; pull++) {
    celsius.fill(job.formingC, 0, SHEET_CELLS);
    last.set(tool);
    const laid = layOn(job, rods, pressed, celsius, last);
    for (let k = laid.steps; k < STEPS; k++) {
      takeStep(bare[k], tool);
      keepHottest(last, tool);
    }
    surfaceC.push(laid.surfaceC);
    setLastS = laid.setS;
    if (laid.setS !== null && setPulls === pull) setPulls++;
    if (pull === 0) {
      first.set(last);
      setFirstS = laid.setS;
    }
    settled = pull + 1 === job.pulls || (pull > 0 && Math.abs(laid.surfaceC - surfaceC[pull - 1]) < ALIKE_K);
  }
  return {
    surfaceC,
    setFirstS,
    setLastS,
    // Those not followed are as the last.
    setPulls: setPulls === surfaceC.length ? job.pulls : setPulls,
    settled,
    profile: rods.depthMm.map((depthMm, i) => ({ depthMm, firstC: first[i], lastC: last[i] })),
  };
}

/** One sheet, from laying on to its mean being at demoulding. */
function layOn(
  { sheet, formingC, demouldC, tool }: PullSequence,
  { both, depthMm }: Rods,
  steps: HeatStep[],
  celsius: Float64Array,
  hottest: Float64Array,
): { steps: number; surfaceC: number; setS: number | null } {
  // Just below the surface the template is even: line through its first two cells.
  const below = celsius.subarray(SHEET_CELLS);
  const atFace = below[0] - ((below[1] - below[0]) * depthMm[0]) / (depthMm[1] - depthMm[0]);
  let surfaceC = contactC(sheet, formingC, tool, atFace);
  const [s, t] = [SHEET_CELLS - 1, SHEET_CELLS];
  const above = both.conductivityWmK[s] / both.widthM[s];
  const under = both.conductivityWmK[t] / both.widthM[t];
  let time = 0;
  let mean = formingC;
  for (let k = 0; k < steps.length; k++) {
    takeStep(steps[k], celsius);
    keepHottest(hottest, below);
    surfaceC = Math.max(surfaceC, (above * celsius[s] + under * celsius[t]) / (above + under));
    const before = mean;
    mean = 0;
    for (let i = 0; i < SHEET_CELLS; i++) mean += celsius[i] / SHEET_CELLS;
    if (mean <= demouldC) {
      const share = before > mean ? (before - demouldC) / (before - mean) : 1;
      return { steps: k + 1, surfaceC, setS: time + Math.max(0, share) * steps[k].timeS };
    }
    time += steps[k].timeS;
  }
  return { steps: steps.length, surfaceC, setS: null };
}

function keepHottest(hottest: Float64Array, now: Float64Array): void {
  for (let i = 0; i < hottest.length; i++) if (now[i] > hottest[i]) hottest[i] = now[i];
}

interface Rods {
  both: Rod;
  tool: Rod;
  /** Middles of the template's cells below its surface, mm. */
  depthMm: number[];
}

function layRods({ sheet, gaugeMm, tool, shellMm, infillShare, depthMm }: PullSequence): Rods {
  const widths = growing(Math.min(FIRST_CELL * gaugeMm, depthMm / TOOL_CELLS), depthMm, TOOL_CELLS);
  const middles: number[] = [];
  widths.reduce((top, width) => {
    middles.push(top + width / 2);
    return top + width;
  }, 0);
  const cells = SHEET_CELLS + TOOL_CELLS;
  const rod = (): Float64Array => new Float64Array(cells);
  const both: Rod = { widthM: rod(), conductivityWmK: rod(), capacityJm3K: rod() };
  for (let i = 0; i < cells; i++) {
    const inTool = i - SHEET_CELLS;
    const body = inTool < 0 ? sheet : tool;
    const share = inTool < 0 || middles[inTool] <= shellMm ? 1 : infillShare;
    both.widthM[i] = (inTool < 0 ? gaugeMm / SHEET_CELLS : widths[inTool]) / 1000;
    both.conductivityWmK[i] = Math.max(share * body.conductivityWmK, STILL_AIR.conductivityWmK);
    both.capacityJm3K[i] = Math.max(share * body.densityKgM3 * body.heatJkgK, STILL_AIR.capacityJm3K);
  }
  const from = (values: Float64Array) => values.subarray(SHEET_CELLS);
  return {
    both,
    tool: {
      widthM: from(both.widthM),
      conductivityWmK: from(both.conductivityWmK),
      capacityJm3K: from(both.capacityJm3K),
    },
    depthMm: middles,
  };
}

/** What fills an empty template (usual values at 40 °C). */
const STILL_AIR = { conductivityWmK: 0.027, capacityJm3K: 1130 };

/** Steps that grow evenly and together make the cycle. */
function stepTimes({ sheet, gaugeMm, cycleS }: PullSequence): number[] {
  const own = ((gaugeMm / 1000) ** 2 * sheet.densityKgM3 * sheet.heatJkgK) / sheet.conductivityWmK;
  return growing(Math.min(FIRST_STEP * own, cycleS / STEPS), cycleS, STEPS);
}

/** `count` parts of a whole, each larger than the one before by the same factor. */
function growing(first: number, whole: number, count: number): number[] {
  let [low, high] = [1, 4];
  for (let round = 0; round < 60; round++) {
    const ratio = (low + high) / 2;
    const sum = (first * (ratio ** count - 1)) / (ratio - 1);
    if (sum < whole) low = ratio;
    else high = ratio;
  }
  const parts = Array.from({ length: count }, (_, i) => first * low ** i);
  const sum = parts.reduce((a, b) => a + b, 0);
  return parts.map((part) => (part * whole) / sum);
}
