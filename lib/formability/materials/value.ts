/** Where a material figure comes from. Everything marked `memory` is a usual datasheet range, not a measurement. */
export type Mark = 'confirmed' | 'memory' | 'derived' | 'common practice';

/** One figure of a material: the value used, the usual range where known, its unit and its mark. */
export interface MaterialValue {
  value: number;
  range: [number, number] | null;
  unit: string;
  mark: Mark;
}

/** `low` alone is a single value; with `high` the middle is used unless `used` says otherwise. */
export function materialValue(
  unit: string,
  mark: Mark,
  low: number,
  high = low,
  used = (low + high) / 2,
): MaterialValue {
  return { value: used, range: high === low ? null : [low, high], unit, mark };
}
