import type { Check } from '../report';
import { basisOf, say, sayPlace } from './basis';
import type { CheckInput } from './check-input';

/** Does it print base-down without support? Faces that lean out further from vertical than the limit. */
export function checkOverhang({ recipe, overhangs }: CheckInput): Check {
  const limit = recipe.limits.overhangDeg;
  const found = overhangs.areaMm2 > 0;
  return {
    id: 'overhang',
    status: found ? 'caution' : 'pass',
    measured: overhangs.worstDeg,
    limit,
    unit: 'deg',
    basis: basisOf('overhangDeg', recipe),
    message: found
      ? `${say(overhangs.areaMm2, 0)} mm² lean out by up to ${say(overhangs.worstDeg)}° from vertical and print only over support.`
      : 'It prints base-down without support.',
    remedy: found
      ? `Chamfer these faces to ${say(limit, 0)}° from vertical, fill below them, or plan supports; the largest is at ${sayPlace(overhangs.places[0].at)}.`
      : '',
    places: overhangs.places,
  };
}
