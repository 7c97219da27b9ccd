import type { Basis, Check, WallsUnderPressureReport } from '../report';
import { roundUp, say, sayGive } from './basis';
import type { CheckInput } from './check-input';

const BASIS: Basis = {
  source:
    'clamped plates (Timoshenko and Woinowsky-Krieger), ring collapse E t³ / 4 (1 − ν²) R³ (Timoshenko and Gere) with 0.4 of the ideal; limit of sag and knock-down: common practice, no source',
  kind: 'computed',
};
/** A wall that gives more than this moves the part's size, mm (common practice, no source). */
export const WALL_GIVES_MM = 0.1;
const SAFE = 1.5;

/** Will the walls give under pressure? */
export function checkWalls({ recipe, report }: CheckInput): Check | null {
  const { wallsUnderPressure: hold } = report;
  if (!hold) return null;
  const { machine } = recipe;
  const collapses = hold.collapseBar !== null && hold.collapseBar < machine.pressureBar;
  const near = hold.collapseBar !== null && !collapses && hold.collapseBar < SAFE * machine.pressureBar;
  const breaks = hold.stressMPa > hold.strengthMPa;
  const gives = hold.sagMm > WALL_GIVES_MM;
  const status =
    collapses || breaks || hold.sagMm > 2 * WALL_GIVES_MM ? 'fail' : gives || near ? 'caution' : 'pass';
  return {
    id: 'walls',
    status,
    ...(collapses || (near && !gives)
      ? { measured: hold.collapseBar, limit: machine.pressureBar, unit: 'bar' }
      : { measured: hold.sagMm, limit: WALL_GIVES_MM, unit: 'mm' }),
    basis: BASIS,
    message: message(hold, machine.pressureBar),
    remedy: status === 'pass' ? '' : remedy(hold, machine.pressureBar),
    places: [],
  };
}

function message(hold: WallsUnderPressureReport, bar: number): string {
  const sag = sayGive(hold.sagMm);
  const wall = `${say(hold.wallMm, 2)} mm walls`;
  if (!hold.empty) return `Between infill lines the ${wall} give ${sag} mm under ${say(bar, 1)} bar.`;
  return `Empty inside, its ${wall} give ${sag} mm under ${say(bar, 1)} bar and would buckle at about ${say(hold.collapseBar ?? 0, 2)} bar.`;
}

function remedy(hold: WallsUnderPressureReport, bar: number): string {
  // Sag and collapse go with the third power of the thickness, stress with the second.
  const share = Math.max(
    (hold.sagMm / WALL_GIVES_MM) ** (1 / 3),
    hold.collapseBar === null ? 0 : ((SAFE * bar) / hold.collapseBar) ** (1 / 3),
    Math.sqrt(hold.stressMPa / hold.strengthMPa),
  );
  const wall = roundUp(hold.wallMm * share, 0.1);
  const ways = [`Make the walls ${say(wall, 1)} mm thick`];
  if (hold.empty)
    ways.push('rib or fill it: 25 to 50 % of infill carries the walls (common practice, no source)');
  else ways.push('more infill');
  return `${ways.join(', or ')}.`;
}
