import type { DrapePlan } from './drape-and-press';
import type { Membrane } from './membrane';
import type { Obstacle } from './obstacle';
import type { SheetInput } from './sheet-input';

const LOWER_STEPS = 30;
const GROWTH = 1.15;
/** First pressure by the frame's long side, in μ t0: a ninth of what bursts a disc of that diameter. */
const FIRST = 0.5;
/** Greatest pressure by the side of an element, in μ t0: it leaves fillets of about two elements, then closed. */
const MOST = 0.5;

/** Steps and pressures of one run. A load that is given caps the pressure, and what it leaves open stays open. */
export function planDrape(
  input: SheetInput,
  template: Obstacle,
  sheet: Membrane,
  preview: boolean,
): DrapePlan {
  const { load, gaugeMm, frameMm } = input;
  const closing = MOST / sheet.cell;
  const given = load ? load.pressureMPa / (load.modulusMPa * gaugeMm) : Infinity;
  return {
    // A step longer than an element would pass by the template's edges.
    lowerSteps:
      template.highest === 0 ? 1 : Math.max(LOWER_STEPS, Math.ceil(template.highest / (2 * sheet.cell))),
    iterations: preview ? 6 : 10,
    settleIterations: preview ? 60 : 200,
    tolerance: 1e-3,
    growth: GROWTH,
    firstPressure: FIRST / Math.max(...frameMm),
    mostPressure: Math.min(closing, given),
    close: given >= closing,
  };
}
