import { FILAMENTS } from '@/lib/formability/materials/filaments';
import { SHEETS } from '@/lib/formability/materials/sheets';

const checkNames: Record<string, string> = {
  mesh: 'Mesh',
  fit: 'Fit on the machine',
  draft: 'Draft',
  undercut: 'Undercut',
  layers: 'Layer lines',
  edges: 'Edges and corners',
  spacing: 'Spacing',
  draw: 'Draw ratio',
  sheet: 'Formed sheet',
  air: 'Trapped air',
  vents: 'Vents',
  shell: 'Shell',
  skin: 'Skin over the infill',
  walls: 'Walls under pressure',
  heat: 'Heat',
  nozzle: 'Nozzle',
  overhang: 'Overhang',
  release: 'Release',
  print: 'Print',
};
export const checkName = (id: string) => checkNames[id] ?? id;

export const statusWord: Record<string, string> = {
  pass: 'holds',
  caution: 'look at this',
  fail: 'fails',
  'not-run': 'not run',
};

const units: Record<string, string> = { deg: '°', mm2: 'mm²', mm3: 'mm³', C: '°C' };

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

type Loose = Record<string, unknown>;
const nameIn = (table: object, id: unknown) => (table as Record<string, { name: string }>)[String(id)]?.name;
const given = (value: unknown, unit: string) =>
  typeof value === 'number' ? `${value}\u00a0${unit}` : undefined;
const times = (value: unknown, unit: string) =>
  Array.isArray(value) ? `${value.join(' × ')}\u00a0${unit}` : undefined;

/** The frozen recipe in rows of label and value, as far as it says something. */
export function recipeRows(recipe: Loose): { label: string; value: string }[] {
  const part = (name: string) => (recipe[name] ?? {}) as Loose;
  const [machine, sheet, print, run] = ['machine', 'sheet', 'print', 'run'].map(part);
  const rows: [string, string | undefined][] = [
    ['Sheet', `${nameIn(SHEETS, sheet.material) ?? String(sheet.material ?? '')}`],
    ['Gauge', given(sheet.gaugeMm, 'mm')],
    ['Least formed thickness', given(sheet.minFormedMm, 'mm')],
    ['Forming temperature (estimate)', given(sheet.formingC, '°C')],
    ['Pressure difference', given(machine.pressureBar, 'bar')],
    ['Forming area', times(machine.formingAreaMm, 'mm')],
    ['Filament', nameIn(FILAMENTS, print.material) ?? String(print.material ?? '')],
    ['Nozzle', given(print.nozzleMm, 'mm')],
    ['Layer height', given(print.layerMm, 'mm')],
    ['Shell', given(print.shellMm, 'mm')],
    ['Top', given(print.topMm, 'mm')],
    ['Infill', `${given(print.infillPercent, '%') ?? ''} ${String(print.infillPattern ?? '')}`.trim()],
    ['Walls sanded', typeof print.sanded === 'boolean' ? (print.sanded ? 'yes' : 'no') : undefined],
    ['Release agent', typeof print.releaseAgent === 'string' ? print.releaseAgent : undefined],
    ['Pulls planned', given(run.pulls, '')?.trim()],
    ['Cycle', given(run.cycleS, 's')],
  ];
  return rows.flatMap(([label, value]) => (value ? [{ label, value }] : []));
}
