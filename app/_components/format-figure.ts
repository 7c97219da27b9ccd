import type { Units } from './preferences';

/** One inch is exactly 25.4 mm (International yard and pound agreement of 1959; ISO 80000-3). */
export const mmPerInch = 25.4;

/** A number with fixed decimals and a true minus; `–` when there is no number. */
export function formatNumber(value: number | null | undefined, digits = 2): string {
  if (value == null || !Number.isFinite(value)) return '–';
  const text = value.toFixed(digits);
  return Number(text) === 0 ? text.replace('-', '') : text.replace('-', '\u2212');
}

/** Millimetres in the reader's units; inches carry one more decimal so that about the same step stays visible. */
export function convertLength(
  mm: number,
  units: Units,
  digits: number,
): { value: number; unit: Units; digits: number } {
  return units === 'in'
    ? { value: mm / mmPerInch, unit: 'in', digits: digits + 1 }
    : { value: mm, unit: 'mm', digits };
}

/** `1.20 mm` or `0.047 in`, with a no-break space. */
export function formatLength(mm: number, units: Units, digits = 2): string {
  const converted = convertLength(mm, units, digits);
  return `${formatNumber(converted.value, converted.digits)}\u00a0${converted.unit}`;
}

/** Bytes in the SI units that file managers show: `482 B`, `3.4 MB`. */
export function formatBytes(bytes: number): string {
  const names = ['B', 'kB', 'MB', 'GB', 'TB'];
  let size = bytes;
  let step = 0;
  while (size >= 999.5 && step < names.length - 1) {
    size /= 1000;
    step += 1;
  }
  return `${step === 0 || size >= 99.95 ? Math.round(size) : size.toFixed(1)}\u00a0${names[step]}`;
}
