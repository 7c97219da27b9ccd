import type { Basis, Check } from '../report';
import { basisOf, say } from './basis';
import type { CheckInput } from './check-input';

const ALIKE: Basis = {
  source: 'common practice, no source: a top as thick as the walls on large hollow templates',
  kind: 'common practice',
};
const TWO_LINES: Basis = {
  source: 'common practice, no source: two lines side by side on a small template',
  kind: 'common practice',
};
/** What float32 corners round away. */
const SMALL_MM = 1e-3;

/** What is compared, and what is said of it. */
interface Finding {
  measured: number;
  limit: number;
  basis: Basis;
  says: string;
  remedy: string;
}

/** Are shell and top thick enough, and alike? From the recipe, and from the mesh where that is hollow itself. */
export function checkShell({ recipe, report, sizeMm }: CheckInput): Check {
  const { limits, print } = recipe;
  const large = Math.max(sizeMm[0], sizeMm[1]) >= limits.largeTemplateMm;
  const least = large ? limits.shellMinMm : 2 * print.lineMm;
  const { hollow, minMm, topMm } = report.walls;
  const wall = hollow && minMm !== null ? Math.min(minMm, print.shellMm) : print.shellMm;
  const top = hollow && topMm !== null ? Math.min(topMm, print.topMm) : print.topMm;
  // What the model itself is too thin for, no recipe mends.
  const inModel = (mm: number, printed: number) => (mm < printed ? ' in the model' : '');
  const basis = large ? basisOf('shellMinMm', recipe) : TWO_LINES;
  const find = (): Finding | null => {
    if (Math.min(wall, top) < least - SMALL_MM) {
      const todo: string[] = [];
      if (wall < least - SMALL_MM)
        todo.push(`the walls ${say(least, 2)} mm thick${inModel(wall, print.shellMm)}`);
      if (top < least - SMALL_MM) {
        const wanted = large ? Math.max(least, wall) : least;
        todo.push(`the top ${say(wanted, 2)} mm thick${inModel(top, print.topMm)}`);
      }
      return {
        measured: Math.min(wall, top),
        limit: least,
        basis,
        says: `, less than the ${say(least, 2)} mm that ${large ? 'a template of this size needs' : 'two lines need'}`,
        remedy: `Make ${todo.join(' and ')}.`,
      };
    }
    if (large && top < wall - print.layerMm - SMALL_MM) {
      return {
        measured: top,
        limit: wall - print.layerMm,
        basis: ALIKE,
        says: '; the top is thinner than the walls and will sink first',
        remedy: `Make the top ${say(wall, 2)} mm thick${inModel(top, print.topMm)}, like the walls.`,
      };
    }
    if (large && print.shellMm > limits.shellMaxMm + SMALL_MM && print.infillPercent < 100) {
      const both = print.topMm > limits.shellMaxMm + SMALL_MM;
      return {
        measured: print.shellMm,
        limit: limits.shellMaxMm,
        basis: basisOf('shellMaxMm', recipe),
        says: `; a shell of more than ${say(limits.shellMaxMm, 2)} mm costs time without need`,
        remedy: `Reduce ${both ? 'shell and top' : 'the shell'} to ${say(limits.shellMaxMm, 2)} mm.`,
      };
    }
    return null;
  };
  if (!hollow && print.infillPercent >= 100) {
    const message = 'The recipe prints it solid, so there is no shell to give way.';
    return { id: 'shell', status: 'pass', measured: null, limit: null, unit: 'mm', basis, message, remedy: '', places: [] }; // prettier-ignore
  }
  const found = find();
  const what = hollow ? 'The hollow template has walls' : 'The recipe prints walls';
  return {
    id: 'shell',
    status: found ? 'caution' : 'pass',
    measured: found ? found.measured : Math.min(wall, top),
    limit: found ? found.limit : least,
    unit: 'mm',
    basis: found ? found.basis : basis,
    message: `${what} of ${say(wall, 2)} mm and a top of ${say(top, 2)} mm${found ? found.says : ': enough for its size'}.`,
    remedy: found ? found.remedy : '',
    places: [],
  };
}
