import { convertLength, formatNumber } from '@/app/_components/format-figure';
import type { Units } from '@/app/_components/preferences';

/** A place on the model in figures: `x 12.0, y −4.0, z 20.0 mm`, z being the height above the bed. */
export function placeWords(at: readonly number[], units: Units): string {
  const [x, y, z] = at.map((mm) => convertLength(mm, units, 1));
  const figure = (part: { value: number; digits: number }) => formatNumber(part.value, part.digits);
  return `x ${figure(x)}, y ${figure(y)}, z ${figure(z)} ${x.unit}`;
}
