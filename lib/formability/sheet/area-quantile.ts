import type { Stretches } from './measure-elements';

/** Element numbers by rising thickness; equal ones keep their order. */
export function orderByThickness({ thickness }: Stretches): Uint32Array {
  const order = new Uint32Array(thickness.length);
  for (let e = 0; e < order.length; e++) order[e] = e;
  return order.sort((a, b) => thickness[a] - thickness[b] || a - b);
}

/** Thickness that a share of the formed area lies below, mm. */
export function areaQuantile(
  { area, thickness, formedArea }: Pick<Stretches, 'area' | 'thickness' | 'formedArea'>,
  order: Uint32Array,
  share: number,
): number {
  let covered = 0;
  for (let k = 0; k < order.length; k++) {
    covered += area[order[k]];
    if (covered >= share * formedArea) return thickness[order[k]];
  }
  return thickness[order[order.length - 1]];
}
