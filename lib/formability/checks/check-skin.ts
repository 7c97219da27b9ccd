import { FILAMENTS } from '../materials/filaments';
import { CREEP, MPA_PER_BAR, POISSON } from '../measures/estimate-skin';
import { clampedPlate } from '../physics/plates';
import type { Basis, Check } from '../report';
import { roundUp, say, sayGive } from './basis';
import type { CheckInput } from './check-input';

const BASIS: Basis = {
  source:
    'clamped plate over one cell of the infill (Timoshenko and Woinowsky-Krieger) at the modulus of the hottest pull (ISO 75 construction, derived) with creep factor 3; sag that shows: common practice, no source',
  kind: 'computed',
};

type Skin = NonNullable<CheckInput['report']['skin']>;

/** Sag of this many limits is no matter of taste. */
const FAIL_AT = 2;

/** Will the top sink between the infill lines? */
export function checkSkin(input: CheckInput): Check | null {
  const { recipe, report } = input;
  const { skin } = report;
  if (!skin) return null;
  const { hollow, topMm } = report.walls;
  if (hollow && topMm !== null) return overCavity(input, skin, topMm);
  const { print, machine } = recipe;
  const sag = skin.sagMm ?? Infinity;
  const breaks = skin.stressMPa !== null && skin.stressMPa > skin.strengthMPa;
  const status = sag > FAIL_AT * skin.limitMm || breaks ? 'fail' : sag > skin.limitMm ? 'caution' : 'pass';
  const loose = skin.sagMostMm ?? sag;
  const turning =
    status === 'pass' && loose > skin.limitMm
      ? ` Should the lines let its edges turn, it would be ${sayGive(loose)} mm.`
      : breaks
        ? ` It is bent to ${say(skin.stressMPa ?? 0)} MPa, more than the ${say(skin.strengthMPa, 2)} MPa that it bears so warm.`
        : '';
  const over =
    skin.spanMm === null
      ? 'With no infill the top spans the whole template'
      : skin.spanMm === 0
        ? `Printed solid, its ${say(print.topMm, 2)} mm top has no free span and sinks ${sayGive(sag)} mm`
        : `Over free spans of ${say(skin.spanMm, 2)} mm between ${print.infillPattern} infill lines a ${say(print.topMm, 2)} mm top sinks ${sayGive(sag)} mm`;
  return {
    id: 'skin',
    status,
    measured: skin.sagMm,
    limit: skin.limitMm,
    unit: 'mm',
    basis: BASIS,
    message: `${over} at ${say(machine.pressureBar, 1)} bar and ${say(skin.atC, 0)} °C, where ${FILAMENTS[print.material].name} keeps ${say(skin.modulusMPa, 0)} MPa; ${say(skin.limitMm, 2)} mm show through.${turning}`,
    remedy: status === 'pass' ? '' : remedy(skin, print.topMm, print.infillPercent),
    places: [],
  };
}

/**
 * No infill lies below the top of a hollow template. How far a cavity reaches is not measured, so the whole plan stands for
 * it: the most that the top can sink, for a look and never a failure.
 */
function overCavity({ recipe, sizeMm }: CheckInput, skin: Skin, topMm: number): Check {
  const { machine, sheet } = recipe;
  const [long, wide] = sizeMm;
  const plate = {
    thicknessMm: topMm,
    pressureMPa: machine.pressureBar * MPA_PER_BAR,
    modulusMPa: skin.modulusMPa / CREEP,
    poisson: POISSON,
  };
  const { sagMm, stressMPa } = clampedPlate(plate, long, wide);
  const over = Math.max(Math.cbrt(sagMm / skin.limitMm), Math.sqrt(stressMPa / skin.strengthMPa));
  const neededMm = roundUp(topMm * over, 0.1);
  const holds = over <= 1;
  return {
    id: 'skin',
    status: holds ? 'pass' : 'caution',
    measured: sagMm,
    limit: skin.limitMm,
    unit: 'mm',
    basis: BASIS,
    message: `The template is hollow: no infill carries its ${say(topMm, 2)} mm top. Free over the whole ${say(long)} × ${say(wide)} mm, it would sink ${sayGive(sagMm)} mm at ${say(machine.pressureBar)} bar and ${say(skin.atC, 0)} °C; ${say(skin.limitMm, 2)} mm show through a ${say(sheet.gaugeMm, 2)} mm sheet.`,
    remedy: holds ? '' : `Fill the cavity, or rib it below the top${neededMm <= 10 * topMm ? `, or make the top ${say(neededMm)} mm thick` : ''}; a smaller cavity needs less.`, // prettier-ignore
    places: [],
  };
}

function remedy(skin: Skin, topMm: number, infillPercent: number): string {
  const ways: string[] = [];
  const top = skin.topThatHoldsMm;
  if (top !== null && top > topMm && top <= 10 * topMm)
    ways.push(`print a top of ${say(roundUp(top, 0.1), 1)} mm`);
  const infill = skin.infillThatHoldsPercent;
  if (infill !== null && infill > infillPercent && infill <= 100)
    ways.push(`${ways.length === 0 ? 'print ' : ''}an infill of ${say(roundUp(infill, 1), 0)} %`);
  if (ways.length === 0) return 'It is too soft there: first mend the heat, then the skin follows.';
  return `${ways.join(', or ').replace(/^./, (first) => first.toUpperCase())}.`;
}
