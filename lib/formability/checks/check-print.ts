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
    message: `Printing takes about ${say(print.timeS / 3600)} h in ${print.layers} layers, ${say(print.massG, 0)} g or ${say(print.filamentM)} m of filament, and costs about ${say(print.cost, 2)} at the recipe's rates with ${say(recipe.print.infillPercent, 0)} % infill: an estimate.`,
    remedy: '',
    places: [],
  };
}
