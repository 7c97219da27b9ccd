import { formatNumber, mmPerInch } from '../format-figure';
import type { Units } from '../preferences';

/** `124 mm²`, `12.4 cm²` or `1.92 in²`: three figures, in the reader's units. */
export function formatArea(mm2: number, units: Units): string {
  if (units === 'in') return `${threeFigures(mm2 / mmPerInch ** 2)}\u00a0in²`;
  if (mm2 >= 1000) return `${threeFigures(mm2 / 100)}\u00a0cm²`;
  return `${threeFigures(mm2)}\u00a0mm²`;
}

/** A share in percent, without calling a trace nothing. */
export function formatShare(part: number, whole: number): string {
  const percent = whole > 0 ? (part / whole) * 100 : 0;
  if (percent > 0 && percent < 0.1) return 'under 0.1\u00a0%';
  return `${formatNumber(percent, percent < 10 ? 1 : 0)}\u00a0%`;
}

function threeFigures(value: number): string {
  if (value === 0) return '0';
  return formatNumber(value, Math.max(0, 2 - Math.floor(Math.log10(Math.abs(value)))));
}
