import { FILAMENTS } from '../materials/filaments';
import { filamentsThatHold, hottestC } from '../measures/estimate-heat';
import type { EffectiveRecipe } from '../recipe';
import type { Basis, Check } from '../report';
import type { HeatReport } from '../report-forming';
import { say } from './basis';
import type { CheckInput } from './check-input';

/** Within this distance of the limit the check asks for a look, K (common practice, no source). */
const NEAR_K = 10;

const BASIS: Basis = {
  source:
    'contact of two solids (Incropera and DeWitt), heat of N cycles (derived), pull after pull in one dimension (computed, held against the exact series); softening from HDT, ISO 75, with 10 K kept from it (common practice, no source); material figures from memory',
  kind: 'computed',
};

/**
 * Does the template stay below softening for the planned pulls? It fails by contact and build-up; where only the pulls
 * followed one by one pass the limit, or come near it, it asks for a look.
 */
export function checkHeat({ recipe, report }: CheckInput): Check | null {
  const { heat } = report;
  if (!heat) return null;
  const { run, print } = recipe;
  const peak = hottestC(heat);
  const fails = peak > heat.limitC;
  const followed = Math.max(peak, heat.transient.peakC);
  const near = !fails && followed > heat.limitC - NEAR_K;
  const name = FILAMENTS[print.material].name;
  const built =
    heat.model === 'lumped' ? 'the printed wall warms through' : 'heat builds up below the surface';
  const close = !near ? '' : followed > heat.limitC ? ', which later pulls may pass' : ', which is near';
  return {
    id: 'heat',
    status: fails ? 'fail' : near ? 'caution' : 'pass',
    measured: peak,
    limit: heat.limitC,
    unit: '°C',
    basis: BASIS,
    message: `The sheet heats the surface to ${say(heat.contactC, 0)} °C at the first touch; over ${run.pulls} pulls of ${say(run.cycleS, 0)} s ${built}, to ${say(peak, 0)} °C at most. ${name} holds to about ${say(heat.limitC, 0)} °C${close}. ${inDepth(heat, run.pulls)}`,
    remedy: fails || near ? waysOut(recipe, heat) : '',
    places: [],
  };
}

/** What following the pulls adds: later ones meet a warm template, and the sheet must set on it. */
function inDepth({ transient, coolS }: HeatReport, pulls: number): string {
  const { setFirstS, setLastS, setPulls, peakC, softensToMm, settled } = transient;
  const soft = softensToMm >= 0.05 ? `, soft to a depth of ${say(softensToMm)} mm` : '';
  const comes = `Followed pull by pull it comes to ${say(peakC, 0)} °C${soft}${settled ? '' : ' and still rises'}`;
  const least = coolS === null ? '' : `, on a template that stays cold in ${say(coolS, 1)} s`;
  if (setFirstS === null) return `${comes}; no sheet sets within the cycle${least}.`;
  const first = `the first sheet sets in about ${say(setFirstS, 0)} s${least}`;
  if (setPulls < pulls)
    return `${comes}; ${first}, and from pull ${setPulls + 1} on one needs longer than the cycle, or air blown on it.`;
  return `${comes}; ${first}${pulls > 1 && setLastS !== null ? `, the last in ${say(setLastS, 0)} s` : ''}.`;
}

function waysOut(recipe: EffectiveRecipe, heat: HeatReport): string {
  const { run } = recipe;
  const ways: string[] = [];
  const { transient, coolS } = heat;
  if (heat.contactC <= heat.limitC) {
    const cycle = Math.max(heat.cycleThatHoldsS ?? 0, coolS === null ? 0 : Math.ceil(coolS));
    if (heat.cycleThatHoldsS !== null && cycle > run.cycleS) ways.push(`take ${say(cycle, 0)} s a pull`);
    if (heat.pullsBeforeRest > 0 && heat.pullsBeforeRest < run.pulls)
      ways.push(
        `let it cool after every ${heat.pullsBeforeRest} ${heat.pullsBeforeRest === 1 ? 'pull' : 'pulls'}`,
      );
    const soft = transient.surfaceC.findIndex((surface) => surface > heat.limitC);
    if (heat.pullsBeforeRest === run.pulls && soft > 0)
      ways.push(`let it cool after every ${soft} ${soft === 1 ? 'pull' : 'pulls'}, or blow air on it`);
  }
  const holds = coolest(recipe);
  if (holds) ways.push(`print it in ${holds}`);
  if (ways.length === 0)
    ways.push(
      'form a sheet with a cooler forming temperature, or a thinner one, or make the template of metal',
    );
  return `${ways.join(', or ').replace(/^./, (first) => first.toUpperCase())}.`;
}

/** The material with the least margin that still holds with room to spare: no stronger one is asked for than needed. */
function coolest(recipe: EffectiveRecipe): string | null {
  const [first] = filamentsThatHold(recipe, NEAR_K).sort((a, b) => a.marginK - b.marginK);
  return first ? FILAMENTS[first.id].name : null;
}
