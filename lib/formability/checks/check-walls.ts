import { KNOCK_DOWN, WALL_GIVES_MM } from '../measures/estimate-hold';
import type { Basis, Check } from '../report';
import type { WallsUnderPressureReport } from '../report-forming';
import { roundDown, roundUp, say, sayGive } from './basis';
import type { CheckInput } from './check-input';

const BASIS: Basis = {
  source:
    'clamped plates (Timoshenko and Woinowsky-Krieger), ring collapse E t³ / 4 (1 − ν²) R³ (Timoshenko and Gere) with 0.4 of the ideal, infill walls as long plates in compression with the same; limit of sag and knock-down: common practice, no source',
  kind: 'computed',
};
const SAFE = 1.5;
/** A wall so many times as thick is another template. */
const MOST_SHARE = 10;

/** Will the walls give under pressure? */
export function checkWalls({ recipe, report }: CheckInput): Check | null {
  const { wallsUnderPressure: hold } = report;
  if (!hold) return null;
  const { machine } = recipe;
  const collapses = hold.collapseBar !== null && hold.collapseBar < machine.pressureBar;
  const near = hold.collapseBar !== null && !collapses && hold.collapseBar < SAFE * machine.pressureBar;
  const breaks = hold.stressMPa > hold.strengthMPa;
  const gives = hold.sagMm > WALL_GIVES_MM;
  // Between the ideal and what printed walls reach of it, they may hold or not.
  const load = hold.infill ? hold.infill.stressMPa / hold.infill.bucklesMPa : 0;
  const crushes = load * KNOCK_DOWN > 1;
  const status =
    collapses || breaks || crushes || hold.sagMm > 2 * WALL_GIVES_MM
      ? 'fail'
      : gives || near || load > 1
        ? 'caution'
        : 'pass';
  return {
    id: 'walls',
    status,
    ...(collapses || (near && !gives)
      ? { measured: hold.collapseBar, limit: machine.pressureBar, unit: 'bar' }
      : { measured: hold.sagMm, limit: WALL_GIVES_MM, unit: 'mm' }),
    basis: BASIS,
    message: message(hold, machine.pressureBar),
    remedy: status === 'pass' ? '' : remedy(hold, machine.pressureBar, recipe.print.infillPercent),
    places: [],
  };
}

function message(hold: WallsUnderPressureReport, bar: number): string {
  const sag = sayGive(hold.sagMm);
  const wall = `${say(hold.wallMm, 2)} mm walls`;
  if (!hold.empty)
    return `Between infill lines the ${wall} give ${sag} mm under ${say(bar, 1)} bar.${ribs(hold)}`;
  return `Empty inside, its ${wall} give ${sag} mm under ${say(bar, 1)} bar and would buckle at about ${say(hold.collapseBar ?? 0, 2)} bar.`;
}

function ribs({ infill }: WallsUnderPressureReport): string {
  if (!infill) return '';
  const load = `The infill's own walls bear ${say(infill.stressMPa)} MPa`;
  return infill.stressMPa > infill.bucklesMPa
    ? ` ${load} and buckle at ${infill.bucklesMPa < 0.01 ? 'less than 0.01' : `about ${say(infill.bucklesMPa, 2)}`} MPa.`
    : ` ${load}, and would buckle at about ${say(infill.bucklesMPa, 0)} MPa.`;
}

function remedy(hold: WallsUnderPressureReport, bar: number, infillPercent: number): string {
  // Sag and collapse go with the third power of the thickness, stress with the second.
  const share = Math.max(
    (hold.sagMm / WALL_GIVES_MM) ** (1 / 3),
    hold.collapseBar === null ? 0 : ((SAFE * bar) / hold.collapseBar) ** (1 / 3),
    Math.sqrt(hold.stressMPa / hold.strengthMPa),
  );
  const ways =
    share > 1 && share <= MOST_SHARE
      ? [`make the walls ${say(roundUp(hold.wallMm * share, 0.1), 1)} mm thick`]
      : [];
  const infill = hold.infillThatHoldsPercent;
  if (hold.empty && share <= MOST_SHARE)
    ways.push(
      `rib or fill it: ${hold.ribSpacingMm === null ? '' : `ribs no more than ${say(roundDown(hold.ribSpacingMm, 0.1))} mm apart, or `}25 to 50 % of infill, carry the walls (share: common practice, no source)`,
    );
  else if (infill !== null && infill > infillPercent)
    ways.push(`print an infill of ${say(roundUp(infill, 1), 0)} %`);
  if (ways.length === 0) return 'It is too soft there: first mend the heat, then the walls follow.';
  return `${ways.join(', or ').replace(/^./, (first) => first.toUpperCase())}.`;
}
