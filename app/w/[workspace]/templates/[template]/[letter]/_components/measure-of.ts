import { formatNumber, mmPerInch } from '@/app/_components/format-figure';
import type { Units } from '@/app/_components/preferences';
import type { FindingView } from '@/lib/review/schemas';

export interface Measure {
  value: number;
  limit: number;
  /** As it is shown: `mm`, `in`, `°`, `%`, … */
  unit: string;
  sense: 'at-least' | 'at-most';
  digits: number;
}

const powerOf: Record<string, number> = { mm: 1, mm2: 2, 'mm²': 2, mm3: 3, 'mm³': 3 };
/** Ratios and counts: their check's sentence says of what. */
const bare = new Set(['ratio', 'height/gap', 'warnings']);
const inInches: Record<number, string> = { 1: 'in', 2: 'in²', 3: 'in³' };
const inMillimetres: Record<number, string> = { 1: 'mm', 2: 'mm²', 3: 'mm³' };

/** A figure of a check in the reader's units. */
export function figureOf(
  value: number,
  unit: string,
  units: Units,
): { value: number; unit: string; digits: number } {
  const power = powerOf[unit];
  if (power) {
    const shown = units === 'in' ? value / mmPerInch ** power : value;
    return {
      value: shown,
      unit: (units === 'in' ? inInches : inMillimetres)[power],
      digits: digitsOf(shown) + (units === 'in' && power === 1 ? 1 : 0),
    };
  }
  if (unit === 's' && value >= 7200) return { value: value / 3600, unit: 'h', digits: 1 };
  if (bare.has(unit)) return { value, unit: '', digits: Number.isInteger(value) ? 0 : 2 };
  if (unit === 'deg' || unit === '°') return { value, unit: '°', digits: 1 };
  if (Number.isInteger(value)) return { value, unit, digits: 0 };
  return { value, unit, digits: digitsOf(value) };
}

function digitsOf(value: number): number {
  const size = Math.abs(value);
  if (size === 0 || size >= 100) return 0;
  return size >= 10 ? 1 : 2;
}

/** Which side of its limit each check wants; others say it by the finding itself. */
const wanted: Record<string, Measure['sense']> = {
  draft: 'at-least',
  edges: 'at-least',
  vents: 'at-least',
  shell: 'at-least',
  sheet: 'at-least',
  undercut: 'at-most',
  layers: 'at-most',
  spacing: 'at-most',
  draw: 'at-most',
  overhang: 'at-most',
  fit: 'at-most',
  nozzle: 'at-most',
  release: 'at-least',
};

type Judged = Pick<FindingView, 'checkId' | 'measured' | 'limit' | 'unit' | 'status'>;

/**
 * Which side of the limit is wanted; null where the two figures do not show the breach that the finding tells of (a
 * pocket without any vent beside wide vents).
 */
function senseOf({ checkId, measured, limit, unit, status }: Judged): Measure['sense'] | null {
  const isBreach = status === 'fail' || status === 'caution';
  if (isBreach && measured === limit) return null;
  const isShort = measured! < limit!;
  // The draw check tells of a ratio, or of the mean thickness where that is what falls short.
  const known = checkId === 'draw' && unit === 'mm' ? 'at-least' : wanted[checkId];
  const sense = known ?? (isShort === isBreach ? 'at-least' : 'at-most');
  return isBreach && isShort !== (sense === 'at-least') ? null : sense;
}

/** Measured against limit in words, `measured 4.2°, at least 6.8° wanted`; null where the two say nothing together. */
export function pairWords(finding: Judged, units: Units): string | null {
  const { measured, limit, unit, status } = finding;
  if (measured === null || limit === null || status === 'not-run' || unit === 'warnings') return null;
  const sense = senseOf(finding);
  if (!sense) return null;
  const least = sense === 'at-least' ? 'at least' : 'at most';
  return `measured ${figureWords(measured, unit, units)}, ${least} ${figureWords(limit, unit, units)} wanted`;
}

/** The same as few words as a mark on the model has room for: `4.2, least 6.8°`. */
export function pairMark(finding: Judged, units: Units): string | null {
  const { measured, limit, unit } = finding;
  const sense = pairWords(finding, units) === null ? null : senseOf(finding);
  if (measured === null || limit === null || !sense) return null;
  const { value, digits } = figureOf(measured, unit, units);
  const bound = figureWords(limit, unit, units);
  return `${formatNumber(value, digits)}, ${sense === 'at-least' ? 'least' : 'most'} ${bound}`;
}

/** One figure with its unit: `4.2°`, `0.31 mm`. */
export function figureWords(value: number, unit: string, units: Units): string {
  const shown = figureOf(value, unit, units);
  const space = shown.unit === '°' || shown.unit === '' ? '' : '\u202f';
  return `${formatNumber(shown.value, shown.digits)}${space}${shown.unit}`;
}

/** Both figures for a bar from zero: known, above zero, and showing the breach if there is one. */
export function measureOf(finding: Judged, units: Units): Measure | null {
  const { measured, limit, unit } = finding;
  if (measured === null || limit === null || measured <= 0 || limit <= 0) return null;
  if (!Number.isFinite(measured) || !Number.isFinite(limit)) return null;
  const sense = senseOf(finding);
  if (!sense) return null;
  const value = figureOf(measured, unit, units);
  const bound = figureOf(limit, unit, units);
  const digits = Math.max(value.digits, bound.digits);
  return { value: value.value, limit: bound.value, unit: value.unit, sense, digits };
}
