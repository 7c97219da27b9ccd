import { VERTICAL_DEG } from '../measures/thresholds';
import type { Check } from '../report';
import { basisOf, say } from './basis';
import type { CheckInput } from './check-input';

/** Is a release agent advised? From draft, depth and layer texture. */
export function checkRelease({ recipe, report, walls }: CheckInput): Check {
  const limit = recipe.limits.releaseDraftDeg;
  const macro = report.draft.wallMinMacroDeg;
  const least = walls.stepped && macro !== null ? macro : walls.facetDeg;
  const reasons = [
    least !== null && least < limit && (walls.areaBelowMm2 > 0 || least < limit) ? (least < -VERTICAL_DEG ? 'walls that lean out' : `walls of ${say(Math.max(least, 0))}°`) : '', // prettier-ignore
    report.plan.depthRatio > 0.5 ? `a depth of ${say(report.plan.depthRatio, 2)} of the frame's width` : '',
    !recipe.print.sanded ? 'unsanded layers' : '',
    report.undercut.maxDepthMm > 0.01 ? 'overhangs' : '',
  ].filter(Boolean);
  const advised = reasons.length > 1 || (reasons.length === 1 && recipe.print.sanded);
  const force = report.life?.releaseForceN ?? 0;
  const draws =
    force >= 1
      ? ` Shrunk on, the part takes about ${say(force, 0)} N to draw off (derived; friction assumed); it comes by itself from ${say(report.life?.selfReleaseDeg ?? 0)}° of draft.`
      : '';
  const has = recipe.print.releaseAgent !== 'none';
  return {
    id: 'release',
    status: advised && !has ? 'caution' : 'pass',
    measured: least,
    limit,
    unit: 'deg',
    basis: basisOf('releaseDraftDeg', recipe),
    message: `${
      advised
        ? `A release agent is advised for ${reasons.join(', ')}${has ? '; the recipe has one' : ''}.`
        : 'The template should release dry.'
    }${draws}`,
    remedy: advised
      ? `${has ? 'Spray' : 'Add to the recipe: spray'} dry PTFE thinly and wipe it touch-dry before the first pull; do not overheat it, and use only food-grade agents where the part touches food.`
      : '',
    places: [],
  };
}
