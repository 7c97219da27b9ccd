/** Where a material figure comes from. Everything marked `memory` is a usual datasheet range, not a measurement. */
export type Mark = 'confirmed' | 'memory';

/** What a figure from memory says for its source. */
export const FROM_MEMORY = 'from memory';

/** One figure of a material: the value used, the usual range where known, its unit, its source and mark. */
export interface MaterialValue {
  value: number;
  range: [number, number] | null;
  unit: string;
  source: string;
  mark: Mark;
}

/** `low` alone is a single value; with `high` the middle is used unless `used` says otherwise. */
export function materialValue(
  unit: string,
  source: string,
  low: number,
  high = low,
  used = (low + high) / 2,
): MaterialValue {
  const mark = source === FROM_MEMORY ? 'memory' : 'confirmed';
  return { value: used, range: high === low ? null : [low, high], unit, source, mark };
}
