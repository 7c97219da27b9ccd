import type { Check } from '../report';
import { basisOf, roundUp, say } from './basis';
import type { CheckInput } from './check-input';

/** Beyond this multiple of the limit a web is to be expected, not only possible (common practice, no source). */
const CERTAIN = 1.75;

/** Will the sheet web between neighbours? Height of the lower one over the gap between the two at the bed. */
export function checkSpacing({ recipe, report }: CheckInput): Check {
  const limit = recipe.limits.heightOverGapMax;
  const worst = report.spacing[0];
  const tight = report.spacing.filter((pair) => pair.heightOverGap > limit + 1e-9);
  return {
    id: 'spacing',
    status: tight.length === 0 ? 'pass' : worst.heightOverGap > CERTAIN * limit ? 'fail' : 'caution',
    measured: worst ? worst.heightOverGap : null,
    limit,
    unit: 'height/gap',
    basis: basisOf('heightOverGapMax', recipe),
    message: !worst
      ? 'No two features stand apart, so no web can hang between them.'
      : tight.length === 0
        ? `Neighbours stand far enough apart: the tightest gap is ${say(worst.gapAtBedMm)} mm for ${say(worst.heightMm)} mm of height.`
        : `${tight.length === 1 ? 'A gap is' : `${tight.length} gaps are`} too narrow for the height beside it: the sheet bridges ${say(worst.gapAtBedMm)} mm between features ${say(worst.heightMm)} mm high and may fold into a web.`,
    remedy: tight.length > 0 ? `Widen the gap to ${say(roundUp(worst.heightMm / limit, 0.5))} mm, or lower the shorter neighbour to ${say(worst.gapAtBedMm * limit)} mm.` : '', // prettier-ignore
    places: tight
      .slice(0, 12)
      .map((pair) => ({ at: pair.between[0], areaMm2: pair.gapAtBedMm * pair.heightMm })),
  };
}
