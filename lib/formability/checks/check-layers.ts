import type { Check } from '../report';
import { basisOf, roundDown, say } from './basis';
import type { CheckInput } from './check-input';

/** Will the layer lines show or grip? Cusp against its limit, and the layer against common practice. */
export function checkLayers({ recipe, report }: CheckInput): Check {
  const { print, limits } = recipe;
  const { cuspMaxMm, layerDraftDeg } = report.layers;
  const thick = print.layerMm > limits.layerMaxMm + 1e-9;
  const coarse = cuspMaxMm > limits.cuspMaxMm + 1e-9 && !print.sanded;
  const wanted = roundDown(Math.min(limits.layerMaxMm, coarse ? (print.layerMm * limits.cuspMaxMm) / cuspMaxMm : Infinity), 0.01); // prettier-ignore
  const reachable = wanted >= limits.layerMinMm - 1e-9;
  const figures = `steps of up to ${say(cuspMaxMm, 3)} mm on its slopes, and grooves that ask for ${say(layerDraftDeg)}° of draft on its walls`;
  return {
    id: 'layers',
    status: thick || coarse ? 'caution' : 'pass',
    measured: thick && !coarse ? print.layerMm : cuspMaxMm,
    limit: thick && !coarse ? limits.layerMaxMm : limits.cuspMaxMm,
    unit: 'mm',
    basis: basisOf(thick && !coarse ? 'layerMaxMm' : 'cuspMaxMm', recipe),
    message: print.sanded
      ? `Layers of ${say(print.layerMm, 2)} mm leave ${figures}; sanding takes them away.`
      : thick || coarse
        ? `Layers of ${say(print.layerMm, 2)} mm leave ${figures}: they may show in the part.`
        : `Layers of ${say(print.layerMm, 2)} mm leave ${figures}: fine enough.`,
    remedy:
      thick || coarse
        ? reachable
          ? `Print in layers of ${say(wanted, 2)} mm${print.sanded ? '' : ', or sand the slopes'}.`
          : `Sand the slopes; layers thin enough (${say(wanted, 3)} mm) would be below ${say(limits.layerMinMm, 2)} mm.`
        : '',
    places: [],
  };
}
