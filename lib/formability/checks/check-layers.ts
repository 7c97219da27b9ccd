import { layerForCusp } from '../physics/layer-surface';
import type { Basis, Check } from '../report';
import type { LayerShowReport } from '../report-forming';
import { basisOf, roundDown, say, sayGive } from './basis';
import type { CheckInput } from './check-input';

/**
 * Will the layer lines show or grip? The cusp against its limit, the layer against common practice, and the steps as they
 * come through the formed sheet.
 */
export function checkLayers({ recipe, report }: CheckInput): Check {
  const { print, limits } = recipe;
  const { cuspMaxMm, layerDraftDeg, show } = report.layers;
  const thick = print.layerMm > limits.layerMaxMm + 1e-9;
  const coarse = cuspMaxMm > limits.cuspMaxMm + 1e-9 && !print.sanded;
  const through = show !== null && show.throughMm > show.limitMm + 1e-9 && !print.sanded;
  const bad = thick || coarse || through;
  const byThrough = through && !coarse && !thick;
  const wanted = wantedLayer(recipe, report.layers, coarse, through);
  const reachable = wanted >= limits.layerMinMm - 1e-9;
  const figures = `steps of up to ${say(cuspMaxMm, 3)} mm on its slopes, and grooves that ask for ${say(layerDraftDeg)}° of draft on its walls`;
  const verdict = print.sanded
    ? `Layers of ${say(print.layerMm, 2)} mm leave ${figures}; sanding takes them away.`
    : bad
      ? `Layers of ${say(print.layerMm, 2)} mm leave ${figures}: they may show in the part.`
      : `Layers of ${say(print.layerMm, 2)} mm leave ${figures}: fine enough.`;
  return {
    id: 'layers',
    status: bad ? 'caution' : 'pass',
    measured: thick && !coarse ? print.layerMm : byThrough ? show.throughMm : cuspMaxMm,
    limit: thick && !coarse ? limits.layerMaxMm : byThrough ? show.limitMm : limits.cuspMaxMm,
    unit: 'mm',
    basis: byThrough ? THROUGH_BASIS : basisOf(thick && !coarse ? 'layerMaxMm' : 'cuspMaxMm', recipe),
    message: [verdict, show && !print.sanded ? throughText(show) : ''].filter(Boolean).join(' '),
    remedy: bad
      ? reachable
        ? `Print in layers of ${say(wanted, 2)} mm${print.sanded ? '' : ', or sand the slopes'}.`
        : `Sand the slopes; layers thin enough (${say(wanted, 3)} mm) would be below ${say(limits.layerMinMm, 2)} mm.`
      : '',
    places: show?.at && through ? [{ at: show.at, areaMm2: show.areaMm2 }] : [],
  };
}

const THROUGH_BASIS: Basis = {
  source:
    'step through an incompressible sheet that sticks (derived); height that shows: common practice, no source',
  kind: 'computed',
};

/** Layer at which cusp, layer and what comes through the sheet are all within their limits, mm. */
function wantedLayer(
  { print, limits }: CheckInput['recipe'],
  { cuspMaxMm, show }: CheckInput['report']['layers'],
  coarse: boolean,
  through: boolean,
): number {
  const draftDeg = (Math.asin(Math.min(1, cuspMaxMm / print.layerMm)) * 180) / Math.PI;
  const forCusp = coarse ? layerForCusp(limits.cuspMaxMm, draftDeg, limits.layerMaxMm) : Infinity;
  const forSheet = through ? (show?.layerThatHidesMm ?? 0) : Infinity;
  return roundDown(Math.min(limits.layerMaxMm, forCusp, forSheet), 0.01);
}

function throughText(show: LayerShowReport): string {
  const sheet = `${say(show.thicknessMm, 2)} mm of sheet (${show.from === 'sheet-run' ? 'as formed there' : 'its mean'})`;
  const reach =
    show.throughMm <= show.limitMm
      ? `${sayGive(show.throughMm)} mm of a step comes through, ${say(show.limitMm, 2)} mm show`
      : `${say(show.throughMm, 3)} mm of a step comes through on slopes of ${say(show.draftDeg ?? 0, 0)}° draft, ${say(show.areaMm2, 0)} mm² in all, and ${say(show.limitMm, 2)} mm show`;
  return `Through ${sheet} ${reach}.`;
}
