import type { Check } from '../report';
import { basisOf, say, sayPlace } from './basis';
import type { CheckInput } from './check-input';

/** Does anything lock the part? Undercuts shallower than the limit are surface texture. */
export function checkUndercut({ recipe, report }: CheckInput): Check {
  const limit = recipe.limits.undercutDepthMm;
  const { undercut } = report;
  const locking = undercut.regions.filter((region) => region.maxDepthMm > limit);
  const worst = locking[0];
  const fill = locking.reduce((sum, region) => sum + region.volumeMm3, 0);
  const lean = worst ? (Math.atan2(worst.maxDepthMm, worst.zMm[1] - worst.zMm[0]) * 180) / Math.PI : 0;
  return {
    id: 'undercut',
    status: worst ? 'fail' : 'pass',
    measured: undercut.maxDepthMm,
    limit,
    unit: 'mm',
    basis: basisOf('undercutDepthMm', recipe),
    message: worst
      ? `${locking.length === 1 ? 'One undercut locks' : `${locking.length} undercuts lock`} the part: the deepest reaches ${say(worst.maxDepthMm, 2)} mm under the part above it, at ${sayPlace(worst.at)}.`
      : undercut.maxDepthMm > 0
        ? `Nothing locks the part; the ${say(undercut.maxDepthMm, 2)} mm of overhang that there is counts as surface texture.`
        : 'Nothing locks the part: every surface can be seen from above.',
    remedy: worst
      ? `Fill the undercut down to the bed (${say(fill / 1000, 2)} cm³ in all), or lean its wall back by ${say(lean)}° and the draft, or split the template at z ${say(worst.zMm[1])} mm.`
      : '',
    places: locking.slice(0, 12).map((region) => ({ at: region.at, areaMm2: region.planAreaMm2 })),
  };
}
