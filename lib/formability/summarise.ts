import { FILAMENTS } from './materials/filaments';
import { SHEETS } from './materials/sheets';
import type { Advice, Check, CheckStatus, Report } from './report';

const WIDTH = 100;
const MARK: Record<CheckStatus, string> = { pass: 'ok  ', caution: 'LOOK', fail: 'FAIL', 'not-run': '--  ' };

/** The report as a page that a designer reads: title, figures, then what must be settled, then the rest. */
export function summarise(report: Report, name: string): string {
  const lines = [title(report, name), '', ...figures(report), ''];
  const order: CheckStatus[] = ['fail', 'caution', 'pass', 'not-run'];
  for (const status of order)
    lines.push(...report.checks.filter((c) => c.status === status).flatMap(checkLines));
  lines.push(...adviceLines(report.advice), '', verdict(report.checks));
  lines.push('Every figure is an estimate, to be proven by a test pull. Mind hot sheet, pressure and fumes.');
  return `${lines.join('\n')}\n`;
}

function title(report: Report, name: string): string {
  const { input, recipe } = report;
  const file = `${name}  ${input.triangles} facets, ${input.format}, ${input.unit}, sha256 ${input.sha256.slice(0, 12)}`;
  const { sheet, print } = recipe;
  const job = `${sheet.gaugeMm} mm ${SHEETS[sheet.material].name} over ${FILAMENTS[print.material].name}, ${print.layerMm} mm layers, ${print.sanded ? 'sanded' : 'not sanded'}`; // prettier-ignore
  const { deflectionMm, leftOut } = input;
  const cut = deflectionMm === undefined ? [] : [`curved surfaces cut into facets within ${fixed(deflectionMm, 3)} mm`]; // prettier-ignore
  return [file, job, ...cut, ...(leftOut ?? []).map((one) => `left out: ${one}`)].join('\n');
}

function figures(report: Report): string[] {
  const { mesh, draft, plan, undercut, airTraps, vents, layers, print } = report;
  const size = mesh.boundsMm.max.map((max, k) => fixed(max - mesh.boundsMm.min[k], 1));
  const trapped = airTraps.filter((trap) => trap.trapsAir).length;
  const rows: [string, string][] = [
    ['size', `${size.join(' × ')} mm`],
    ['volume', `${fixed(mesh.unionVolumeMm3 / 1000, 2)} cm³, ${mesh.shells} ${mesh.shells === 1 ? 'shell' : 'shells'}, ${mesh.watertight ? 'watertight' : 'not watertight'}`], // prettier-ignore
    ['least draft', `${degrees(draft.minUpFacingDeg)}, walls as a whole ${degrees(draft.wallMinMacroDeg)}, vertical ${fixed(draft.verticalAreaMm2, 0)} mm²`], // prettier-ignore
    ['undercut', undercut.maxDepthMm > 0 ? `${fixed(undercut.maxDepthMm, 2)} mm deep, ${fixed(undercut.undercutVolumeMm3 / 1000, 2)} cm³` : 'none'], // prettier-ignore
    ['draw', `${fixed(plan.arealDrawRatio, 2)} areal, ${fixed(plan.linearDrawRatioX, 2)} × ${fixed(plan.linearDrawRatioY, 2)} linear, ${fixed(plan.depthRatio, 2)} depth`], // prettier-ignore
    ['pockets', `${airTraps.length}, of which ${trapped} trap air; ${vents.length} ${vents.length === 1 ? 'vent' : 'vents'}`], // prettier-ignore
    ...sheetFigures(report),
    ['layers', `cusp up to ${fixed(layers.cuspMaxMm, 3)} mm, median ${fixed(layers.cuspMedianMm, 3)} mm`],
    ['print', `${fixed(print.timeS / 3600, 1)} h, ${fixed(print.massG, 0)} g, ${print.layers} layers`],
  ];
  return rows.map(([key, value]) => `  ${key.padEnd(12)} ${value}`);
}

function sheetFigures({ sheet }: Report): [string, string][] {
  if (!sheet) return [];
  const { minMm, q05Mm, meanMm, marginPercent } = sheet;
  return [['sheet', `${fixed(minMm, 2)} mm at its thinnest, a twentieth below ${fixed(q05Mm, 2)} mm, ${fixed(meanMm, 2)} mm on average, ± ${marginPercent} %`]]; // prettier-ignore
}

function checkLines(check: Check): string[] {
  const head = `${MARK[check.status]} ${check.id.padEnd(9)} `;
  const text = check.remedy ? `${check.message} ${check.remedy}` : check.message;
  return wrap(text, WIDTH - head.length).map((line, i) => (i === 0 ? head : ' '.repeat(head.length)) + line);
}

function adviceLines(advice: Advice[]): string[] {
  if (advice.length === 0) return [];
  return [
    '',
    'What buys most, tried with all checks:',
    ...advice.flatMap(({ text, mends, costS, costG }, k) => {
      const cost = `${signed(costS / 3600, 1)} h, ${signed(costG, 0)} g`;
      return wrap(`${text} Mends ${mends.join(', ')}; print ${cost}.`, WIDTH - 5).map(
        (line, i) => (i === 0 ? `  ${k + 1}. ` : '     ') + line,
      );
    }),
  ];
}

function signed(value: number, digits: number): string {
  const text = fixed(Math.abs(value), digits);
  return Number(text) === 0 ? '±0' : `${value < 0 ? '−' : '+'}${text}`;
}

function verdict(checks: Check[]): string {
  const count = (status: CheckStatus) => checks.filter((check) => check.status === status).length;
  return `${count('fail')} to settle, ${count('caution')} to look at, ${count('pass')} in order, ${count('not-run')} not run.`;
}

function wrap(text: string, width: number): string[] {
  const lines = [''];
  for (const word of text.split(' ')) {
    const last = lines[lines.length - 1];
    if (last && last.length + 1 + word.length > width) lines.push(word);
    else lines[lines.length - 1] = last ? `${last} ${word}` : word;
  }
  return lines;
}

function fixed(value: number, digits: number): string {
  return value.toFixed(digits);
}

function degrees(value: number | null): string {
  return value === null ? 'none' : `${value.toFixed(2)}°`;
}
