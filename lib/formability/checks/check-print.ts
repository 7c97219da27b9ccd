import { PRINT_ASSUMPTIONS } from '../measures/estimate-print';
import type { Check } from '../report';
import { say } from './basis';
import type { CheckInput } from './check-input';

/** What will it cost in time and filament? An estimate, never a verdict. */
export function checkPrint({ report, recipe }: CheckInput): Check {
  const { print } = report;
  const { speedMmS, efficiency, perLayerS } = PRINT_ASSUMPTIONS;
  return {
    id: 'print',
    status: 'pass',
    measured: print.timeS,
    limit: null,
    unit: 's',
    basis: {
      source: `bead flow line × layer × ${speedMmS} mm/s at ${efficiency * 100} % efficiency and ${perLayerS} s a layer, assumed (common practice, no source); rates from the recipe`,
      kind: 'computed',
    },
    message: `Printing takes about ${time(print.timeS)}, up to ${time(print.timeMostS)} with round beads, in ${print.layers} layers, ${small(print.massG, 0)} g or ${small(print.filamentM)} m of filament, with ${say(recipe.print.infillPercent, 0)} % infill. It costs about ${say(print.cost, 2)} in the studio's currency, at ${say(recipe.costs.materialPerKg, 2)} per kg, ${say(recipe.costs.machinePerHour, 2)} per hour and ${say(recipe.costs.labour, 2)} for handling: an estimate.`,
    remedy: '',
    places: [],
  };
}

/** Below an hour in minutes. */
function time(seconds: number): string {
  return seconds < 3600 ? `${Math.max(1, Math.ceil(seconds / 60))} min` : `${say(seconds / 3600)} h`;
}

/** With more digits below 1. */
function small(value: number, digits = 1): string {
  return say(value, value < 1 ? 2 : digits);
}
