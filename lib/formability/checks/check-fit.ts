import type { Check } from '../report';
import { roundDown, say } from './basis';
import type { CheckInput } from './check-input';

/** Does it fit the machine's bed with the clamp frame's margin, and under its height? */
export function checkFit({ recipe, sizeMm }: CheckInput): Check {
  const { formingAreaMm, maxHeightMm, frameMarginMm, frameMm } = recipe.machine;
  const [bedX, bedY] = frameMm ?? formingAreaMm;
  const room = frameMm ? 0 : 2 * frameMarginMm;
  const straight = Math.max((sizeMm[0] + room) / bedX, (sizeMm[1] + room) / bedY);
  const turned = Math.max((sizeMm[1] + room) / bedX, (sizeMm[0] + room) / bedY);
  const turnHelps = straight > 1 && turned <= 1;
  const [a, b] = turned < straight ? [sizeMm[1], sizeMm[0]] : [sizeMm[0], sizeMm[1]];
  const parts = [
    { name: 'width', size: a + room, limit: bedX },
    { name: 'depth', size: b + room, limit: bedY },
    { name: 'height', size: sizeMm[2], limit: maxHeightMm },
  ];
  const worst = parts.reduce((w, part) => (part.size / part.limit > w.size / w.limit ? part : w));
  const fits = worst.size <= worst.limit + 1e-6;
  const scale = Math.min((bedX - room) / a, (bedY - room) / b, maxHeightMm / sizeMm[2]);
  const area = frameMm ? 'clamp frame' : `forming area with ${say(frameMarginMm)} mm of frame margin`;
  const needs = `a forming area of ${say(a + room)} × ${say(b + room)} mm and ${say(sizeMm[2])} mm of height`;
  return {
    id: 'fit',
    status: fits ? (turnHelps ? 'caution' : 'pass') : 'fail',
    measured: worst.size,
    limit: worst.limit,
    unit: 'mm',
    basis: { source: "the machine's own forming area and height, from the recipe", kind: 'computed' },
    message: fits
      ? `The template fits the ${area} and stands below ${say(maxHeightMm)} mm${turnHelps ? ' when turned by 90° on the bed' : ''}.`
      : `The template does not fit: its ${worst.name} needs ${say(worst.size)} mm, the machine has ${say(worst.limit)} mm.`,
    remedy: fits
      ? turnHelps
        ? 'Turn the template by 90° on the bed.'
        : ''
      : scale > 0
        ? `Shrink it to ${say(roundDown(scale * 100, 0.1))} %, or use a machine with ${needs}.`
        : `Use a machine with ${needs}; the margin alone fills this one.`,
    places: [],
  };
}
