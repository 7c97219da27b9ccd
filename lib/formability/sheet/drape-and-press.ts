import { closeLeftovers } from './close-leftovers';
import type { Membrane } from './membrane';
import type { Obstacle } from './obstacle';
import { follow, iterate, makeRun, stickTouching } from './relax';

export interface DrapePlan {
  /** Steps in which the frame comes down, and iterations of each. */
  lowerSteps: number;
  iterations: number;
  /** Most iterations after the frame has landed, and the force on a node (μ t0 × cell) that ends them. */
  settleIterations: number;
  tolerance: number;
  /** Each pressure over the one before. */
  growth: number;
  /** First and greatest p / (μ t0), per mm. */
  firstPressure: number;
  mostPressure: number;
  /** Whether nodes that the last pressure leaves free are pushed home. */
  close: boolean;
  /** Called with the sheet as it hangs when the frame has landed, before any pressure. */
  onLanded?(sheet: Membrane): void;
}

/** Nodes of the level sheet this near to the template lie on its plateau, in cells of the sheet. */
export const NEAR = 0.021;

export interface Drape {
  steps: number;
  iterations: number;
  /** Greatest force on a free node when the frame had landed, μ t0 × cell. */
  residual: number;
  /** p / (μ t0) at the end, per mm. */
  pressure: number;
  /** Nodes that touch nothing at the end. */
  leftFree: number;
  stopped: boolean;
}

/**
 * Lowers the clamped frame over the template to the bed, then presses the sheet on with a pressure that grows step by
 * step until every node has met the template or the bed. A node that has met stays: full stick, no slip.
 * @param sheet level with the template's top; its free nodes and positions are changed
 * @param goOn asked at each step with the share done; false stops, and the result says so
 */
export function drapeAndPress(
  sheet: Membrane,
  template: Obstacle,
  plan: DrapePlan,
  goOn: (share: number) => boolean,
): Drape {
  const run = makeRun(sheet, template);
  const done: Drape = { steps: 0, iterations: 0, residual: 0, pressure: 0, leftFree: 0, stopped: false };
  const pressSteps = Math.ceil(Math.log(plan.mostPressure / plan.firstPressure) / Math.log(plan.growth)) + 1;
  const total = plan.lowerSteps + Math.max(1, pressSteps);
  const frame = clampedNodes(sheet);
  const top = template.highest;
  stickTouching(run, NEAR);
  for (let step = 1; step <= plan.lowerSteps; step++) {
    if (!goOn(done.steps++ / total)) return { ...done, stopped: true };
    const z = step === plan.lowerSteps ? 0 : top * (1 - step / plan.lowerSteps);
    const dz = z - sheet.at[3 * frame[0] + 2];
    for (let k = 0; k < frame.length; k++) sheet.at[3 * frame[k] + 2] = z;
    follow(run, dz);
    for (let k = 0; k < plan.iterations; k++) iterate(run, 0);
  }
  for (let k = 0; k < plan.settleIterations && run.residual > plan.tolerance; k++) iterate(run, 0);
  done.residual = run.freeCount > 0 ? run.residual : 0;
  plan.onLanded?.(sheet);
  let pressure = Math.min(plan.firstPressure, plan.mostPressure);
  while (run.freeCount > 0) {
    if (!goOn(Math.min(1, done.steps++ / total))) return { ...done, stopped: true };
    for (let k = 0; k < plan.iterations && run.freeCount > 0; k++) iterate(run, pressure);
    done.pressure = pressure;
    if (pressure >= plan.mostPressure) break;
    pressure = Math.min(pressure * plan.growth, plan.mostPressure);
  }
  if (plan.close && run.freeCount > 0) closeLeftovers(run, template);
  done.iterations = run.iterations;
  done.leftFree = run.freeCount;
  return done;
}

function clampedNodes({ nodes, free }: Membrane): Int32Array {
  const found = new Int32Array(nodes);
  let count = 0;
  for (let n = 0; n < nodes; n++) if (!free[n]) found[count++] = n;
  return found.slice(0, count);
}
