/** Plan sizes, in mm, between which a template is taken to be one. */
const LEAST_MM = 20;
const MOST_MM = 2000;
const TARGET: [number, number] = [30, 800];

/** Factors that a wrong unit asks for: inches, centimetres, metres, feet, microns, and millimetres read as these. */
const FACTORS = [25.4, 10, 1000, 304.8, 1 / 25.4, 0.1, 0.001];

/**
 * The factor that would make an implausible size plausible, or null where the size is plausible. Of several, the
 * one that gives dimensions in whole millimetres wins, then the usual order (inches below 10, centimetres above).
 * @param sizes of the box, in mm
 */
export function suggestScale(sizes: readonly number[]): number | null {
  const largest = Math.max(...sizes);
  if (largest >= LEAST_MM && largest <= MOST_MM) return null;
  const fitting = FACTORS.filter((f) => largest * f >= TARGET[0] && largest * f <= TARGET[1]);
  if (fitting.length === 0) return null;
  const order = largest < 10 ? fitting : [...fitting].sort((a, b) => Math.abs(a - 10) - Math.abs(b - 10));
  const offRound = (factor: number) => sizes.filter((size) => !isRound(size * factor)).length;
  return order.reduce((best, factor) => (offRound(factor) < offRound(best) ? factor : best));
}

function isRound(mm: number): boolean {
  return Math.abs(mm * 2 - Math.round(mm * 2)) < 0.002;
}
