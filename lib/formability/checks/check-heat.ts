import { FILAMENTS } from '../materials/filaments';
import { filamentsThatHold, hottestC } from '../measures/estimate-heat';
import type { EffectiveRecipe } from '../recipe';
import type { Basis, Check, HeatReport } from '../report';
import { say } from './basis';
import type { CheckInput } from './check-input';

/** Within this distance of the limit the check asks for a look, K (common practice, no source). */
const NEAR_K = 10;

const BASIS: Basis = {
  source:
    'contact of two solids (Incropera and DeWitt), heat of N cycles (derived); softening from HDT, ISO 75, with 10 K kept from it (common practice, no source); material figures from memory',
  kind: 'computed',
};

/** Does the template stay below softening for the planned pulls? */
export function checkHeat({ recipe, report }: CheckInput): Check | null {
  const { heat } = report;
  if (!heat) return null;
  const { run, print } = recipe;
  const peak = hottestC(heat);
  const fails = peak > heat.limitC;
  const near = !fails && peak > heat.limitC - NEAR_K;
  const name = FILAMENTS[print.material].name;
  const built =
    heat.model === 'lumped' ? 'the printed wall warms through' : 'heat builds up below the surface';
  return {
    id: 'heat',
    status: fails ? 'fail' : near ? 'caution' : 'pass',
    measured: peak,
    limit: heat.limitC,
    unit: '°C',
    basis: BASIS,
    message: `The sheet heats the surface to ${say(heat.contactC, 0)} °C at the first touch; over ${run.pulls} pulls of ${say(run.cycleS, 0)} s ${built}, to ${say(peak, 0)} °C at most. ${name} holds to about ${say(heat.limitC, 0)} °C${near ? ', which is near' : ''}.`,
    remedy: fails || near ? waysOut(recipe, heat) : '',
    places: [],
  };
}

function waysOut(recipe: EffectiveRecipe, heat: HeatReport): string {
  const { run } = recipe;
  const ways: string[] = [];
  if (heat.contactC <= heat.limitC) {
    if (heat.cycleThatHoldsS !== null && heat.cycleThatHoldsS > run.cycleS)
      ways.push(`take ${say(heat.cycleThatHoldsS, 0)} s a pull`);
    if (heat.pullsBeforeRest > 0 && heat.pullsBeforeRest < run.pulls)
      ways.push(
        `let it cool after every ${heat.pullsBeforeRest} ${heat.pullsBeforeRest === 1 ? 'pull' : 'pulls'}`,
      );
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
