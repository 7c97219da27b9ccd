import type { Check } from '../report';
import { basisOf, roundUp, say } from './basis';
import type { CheckInput } from './check-input';
import { withWeb } from './say-web';

/** Beyond this multiple of the limit a web is to be expected, not only possible (common practice, no source). */
const CERTAIN = 1.75;

/** Sides whose gap at the foot is below this share of that at the top meet in a groove: no floor lies between them. */
const GROOVE = 0.1;

/**
 * Will the sheet web between neighbours? Height of the lower one over the gap between the two at the bed; in a groove,
 * whose sides meet, over its opening, since the sheet sinks in evenly from there.
 */
export function checkSpacing({ recipe, report }: CheckInput): Check {
  const limit = recipe.limits.heightOverGapMax;
  const pairs = report.spacing
    .map((pair) => {
      const gapMm = pair.gapAtBedMm < GROOVE * pair.gapMm ? pair.gapMm : pair.gapAtBedMm;
      return { pair, gapMm, ratio: pair.heightMm / gapMm };
    })
    .sort((a, b) => b.ratio - a.ratio);
  const worst = pairs[0];
  const tight = pairs.filter(({ ratio }) => ratio > limit + 1e-9);
  const [gap, height] = worst ? [say(worst.gapMm), say(worst.pair.heightMm)] : ['', ''];
  return {
    id: 'spacing',
    status: tight.length === 0 ? 'pass' : worst.ratio > CERTAIN * limit ? 'fail' : 'caution',
    measured: worst ? worst.ratio : null,
    limit,
    unit: 'height/gap',
    basis: basisOf('heightOverGapMax', recipe),
    message: withWeb(
      !worst
        ? 'No two features stand apart, so no web can hang between them.'
        : tight.length === 0
          ? `Neighbours stand far enough apart: the tightest gap is ${gap} mm for ${height} mm of height.`
          : `${tight.length === 1 ? 'A gap is too narrow for the height beside it' : `${tight.length} gaps are too narrow for the heights beside them`}: the sheet bridges ${gap} mm between features ${height} mm high and may fold into a web.`,
      report.web,
    ),
    remedy: tight.length > 0 ? `Widen the gap to ${say(roundUp(worst.pair.heightMm / limit, 0.5))} mm, or lower the shorter neighbour to ${say(worst.gapMm * limit)} mm.` : '', // prettier-ignore
    places: tight
      .slice(0, 12)
      .map(({ pair, gapMm }) => ({ at: pair.between[0], areaMm2: gapMm * pair.heightMm })),
  };
}
