import { areaQuantile } from './area-quantile';
import { findThinnest, type Keep, type Thinnest } from './find-thinnest';
import type { Stretches } from './measure-elements';
import type { Membrane } from './membrane';

export interface ZoneFigures extends Thinnest {
  q05Mm: number;
  areaMm2: number;
  belowLimitAreaMm2: number;
}

/**
 * Figures of a zone of the formed sheet; null where none of it lies there. Areas and the quantile count elements by
 * their middles, the least thickness counts points, so that an element across the border gives each side its own.
 * @param thinFirst element numbers by rising thickness
 */
export function measureZone(
  sheet: Membrane,
  stretches: Stretches,
  thinFirst: Uint32Array,
  keep: Keep,
  limitMm: number,
): ZoneFigures | null {
  const { corners, at } = sheet;
  const { area, thickness } = stretches;
  const kept = (n: number) => keep(at[3 * n], at[3 * n + 1], at[3 * n + 2]);
  const inside: number[] = [];
  let [areaMm2, belowLimitAreaMm2] = [0, 0];
  const touching = thinFirst.filter((e) => {
    const [a, b, c] = [corners[3 * e], corners[3 * e + 1], corners[3 * e + 2]];
    const middle = (axis: number) => (at[3 * a + axis] + at[3 * b + axis] + at[3 * c + axis]) / 3;
    const mine = keep(middle(0), middle(1), middle(2));
    if (mine) {
      inside.push(e);
      areaMm2 += area[e];
      if (thickness[e] < limitMm) belowLimitAreaMm2 += area[e];
    }
    return mine || kept(a) || kept(b) || kept(c);
  });
  if (inside.length === 0) return null;
  const order = Uint32Array.from(inside);
  return {
    ...findThinnest(sheet, stretches, touching, keep),
    q05Mm: areaQuantile({ area, thickness, formedArea: areaMm2 }, order, 0.05),
    areaMm2,
    belowLimitAreaMm2,
  };
}
