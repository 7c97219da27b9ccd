export const statusWord: Record<string, string> = {
  pass: 'holds',
  caution: 'look at this',
  fail: 'fails',
  'not-run': 'not run',
};

/** Units as they are written beside a figure; what the figure already says is left out. */
const units: Record<string, string> = {
  ratio: '',
  warnings: '',
  'height/gap': '',
  deg: '°',
  mm2: 'mm²',
  mm3: 'mm³',
  C: '°C',
};

/** A figure of a check with its unit; up to three decimals, fewer for large ones. */
export function figure(value: number | null, unit: string): string {
  if (value === null) return '–';
  const size = Math.abs(value);
  const digits = Number.isInteger(value) || size >= 1000 ? 0 : size >= 100 ? 1 : size >= 1 ? 2 : 3;
  const text = value.toFixed(digits).replace(/^-/, '\u2212');
  const word = units[unit] ?? unit;
  return word === '°' ? `${text}°` : word ? `${text}\u00a0${word}` : text;
}

/** Bytes with thin groups, as in a list of files: `12 345 678`. */
export const grouped = (n: number) => String(n).replace(/\B(?=(\d{3})+$)/g, '\u00a0');
