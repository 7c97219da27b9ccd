/**
 * Refuses a figure that a formula does not cover, saying which and what it takes.
 * @throws RangeError for what is no number, or not between the two (`low` itself only where `closed`)
 */
export function inRange(name: string, value: number, low: number, high = Infinity, closed = false): number {
  if (Number.isNaN(value) || value > high || value < low || (!closed && value === low))
    throw new RangeError(
      `${name} is ${value}: give a figure ${closed ? 'from' : 'above'} ${low}${high === Infinity ? '' : ` to ${high}`}`,
    );
  return value;
}
