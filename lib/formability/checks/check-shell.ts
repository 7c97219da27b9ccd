import type { Check } from '../report';
import { basisOf, say } from './basis';
import type { CheckInput } from './check-input';

/** Are shell and top thick enough, and alike? From the recipe, and from the mesh where that is hollow itself. */
export function checkShell({ recipe, report, sizeMm }: CheckInput): Check {
  const { limits, print } = recipe;
  const large = Math.max(sizeMm[0], sizeMm[1]) >= limits.largeTemplateMm;
  const least = large ? limits.shellMinMm : 2 * print.lineMm;
  const { hollow, minMm, topMm } = report.walls;
  const wall = hollow && minMm !== null ? Math.min(minMm, print.shellMm) : print.shellMm;
  const top = hollow && topMm !== null ? Math.min(topMm, print.topMm) : print.topMm;
  const thin = Math.min(wall, top) < least - 1e-6;
  const unlike = large && top < wall - print.layerMm - 1e-6;
  const heavy = large && print.shellMm > limits.shellMaxMm && print.infillPercent < 100;
  const basis = basisOf('shellMinMm', recipe);
  if (!large) basis.source = 'common practice, no source: two lines side by side on a small template';
  const what = hollow ? 'The hollow template has walls' : 'The recipe prints walls';
  return {
    id: 'shell',
    status: thin || unlike || heavy ? 'caution' : 'pass',
    measured: Math.min(wall, top),
    limit: least,
    unit: 'mm',
    basis,
    message: `${what} of ${say(wall, 2)} mm and a top of ${say(top, 2)} mm${
      thin
        ? `, less than the ${say(least, 2)} mm that ${large ? 'a template of this size' : 'two lines'} needs`
        : unlike
          ? '; the top is thinner than the walls and will sink first'
          : heavy
            ? `; more than ${say(limits.shellMaxMm, 1)} mm costs time without need`
            : ': enough for its size'
    }.`,
    remedy: thin
      ? `Make ${wall < least ? `the walls ${say(least, 2)} mm` : ''}${wall < least && top < least ? ' and ' : ''}${top < least ? `the top ${say(Math.max(least, wall), 2)} mm` : ''} thick.`
      : unlike
        ? `Make the top ${say(wall, 2)} mm thick, like the walls.`
        : heavy
          ? `Reduce the shell to ${say(limits.shellMaxMm, 1)} mm.`
          : '',
    places: [],
  };
}
