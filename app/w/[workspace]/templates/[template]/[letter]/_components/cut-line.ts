import type { Point } from '@/app/_components/stage/stage-props';
import type { SectionLine } from '@/lib/stage-model/section';
import type { Bounds } from './stage-pins';

const round = (mm: number) => Math.round(mm * 10) / 10;

/** The cut that a page opens with: along the template's longer side, through its middle. */
export function openingCut({ min, max }: Bounds): SectionLine {
  const axis = max[0] - min[0] >= max[1] - min[1] ? 'y' : 'x';
  const across = axis === 'y' ? 1 : 0;
  return { axis, atMm: round((min[across] + max[across]) / 2) };
}

/** Off an edge by this much, so that the cut shows what stands beside it. */
const OFF_EDGE_MM = 0.6;

/**
 * The cut through a place, a little inside: a place on an edge or at the rim would give a cut along the edge, or none.
 * `exact` stays on the place (a vent is missed a millimetre beside its middle) unless that is the very rim.
 */
export function cutThrough(at: Point, axis: 'x' | 'y', { min, max }: Bounds, exact: boolean): SectionLine {
  const across = axis === 'y' ? 1 : 0;
  const [low, high] = [min[across], max[across]];
  const middle = (low + high) / 2;
  const rim = Math.min(Math.max(0.5, (high - low) / 100), (high - low) / 2);
  const away = middle - at[across];
  const off = exact ? 0 : Math.sign(away) * Math.min(OFF_EDGE_MM, Math.abs(away));
  return { axis, atMm: round(Math.min(high - rim, Math.max(low + rim, at[across] + off))) };
}
