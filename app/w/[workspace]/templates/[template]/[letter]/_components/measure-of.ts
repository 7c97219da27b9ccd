import { mmPerInch } from '@/app/_components/format-figure';
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
};

/**
 * What was measured against its limit, where a bar from zero says something: both known, none negative, a limit
 * above zero, and a breach that the two figures show (a pocket without any vent is none that they would show).
 */
export function measureOf(
  finding: Pick<FindingView, 'checkId' | 'measured' | 'limit' | 'unit' | 'status'>,
  units: Units,
): Measure | null {
  const { checkId, measured, limit, unit, status } = finding;
  if (measured === null || limit === null || measured < 0 || limit <= 0) return null;
  if (!Number.isFinite(measured) || !Number.isFinite(limit)) return null;
  const isBreach = status === 'fail' || status === 'caution';
  if (isBreach && measured === limit) return null;
  const isShort = measured < limit;
  const sense = wanted[checkId] ?? (isShort === isBreach ? 'at-least' : 'at-most');
  if (isBreach && isShort !== (sense === 'at-least')) return null;
  const value = figureOf(measured, unit, units);
  const bound = figureOf(limit, unit, units);
  const digits = Math.max(value.digits, bound.digits);
  return { value: value.value, limit: bound.value, unit: value.unit, sense, digits };
}
