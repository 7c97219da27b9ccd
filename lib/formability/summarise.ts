import { folds } from './checks/say-web';
import { FILAMENTS } from './materials/filaments';
import { SHEETS } from './materials/sheets';
import type { Advice, Check, CheckStatus, Report } from './report';
import { SURE_SECTIONS, type SurenessKind, type SureSection } from './report-forming';

const WIDTH = 100;
/** Rules of thinning told on the page; the rest are in the report. */
const SAID_RULES = 3;
const MARK: Record<CheckStatus, string> = { pass: 'ok  ', caution: 'LOOK', fail: 'FAIL', 'not-run': '--  ' };

/** The report as a page that a designer reads: title, figures, then what must be settled, then the rest. */
export function summarise(report: Report, name: string): string {
  const lines = [
    title(report, name),
    '',
    ...figures(report),
    '',
    ...lifeLines(report),
    ...surenessLines(report),
  ];
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
    ...physicsFigures(report),
    ['print', `${print.timeS < 3600 ? `${Math.ceil(print.timeS / 60)} min` : `${fixed(print.timeS / 3600, 1)} h`}, ${fixed(print.massG, print.massG < 1 ? 2 : 0)} g, ${print.layers} layers`], // prettier-ignore
  ];
  return rows.map(([key, value]) => `  ${key.padEnd(12)} ${value}`);
}

function sheetFigures({ sheet }: Report): [string, string][] {
  if (!sheet) return [];
  const { minMm, minAt, q05Mm, marginPercent } = sheet.part ?? sheet;
  const where = minAt.map((mm) => fixed(mm, 1)).join(', ');
  const foot = sheet.foot ? `, foot along the bed ${fixed(sheet.foot.minMm, 2)} mm` : '';
  return [['sheet', `${fixed(minMm, 2)} mm at the part's thinnest (${where}), ± ${marginPercent} %, a twentieth of it below ${fixed(q05Mm, 2)} mm${foot}`]]; // prettier-ignore
}

/** Each figure of the forming itself, marked with how sure it is. */
function physicsFigures({
  heat,
  skin,
  wallsUnderPressure: hold,
  web,
  ventMarks,
  thinning,
  sureness,
}: Report): [string, string][] {
  if (!heat || !skin || !hold || !web) return [];
  const mark = (section: SureSection) => `(${SURE[sureness[section].kind]})`;
  const { transient } = heat;
  const rows: [string, string][] = [
    ['heat', `${fixed(heat.contactC, 0)} °C at the first touch, ${fixed(Math.max(...heat.peakC.slice(-1), heat.contactC), 0)} °C by build-up, ${fixed(transient.peakC, 0)} °C pull by pull, holds ${fixed(heat.limitC, 0)} °C ${mark('heat')}`], // prettier-ignore
    ['skin', skin.sagMm === null ? 'nothing carries the top' : `sinks ${figure(skin.sagMm)} mm, ${fixed(skin.limitMm, 2)} mm show ${mark('skin')}`], // prettier-ignore
    ['walls', `give ${figure(hold.sagMm)} mm${hold.collapseBar === null ? '' : `, buckle at ${fixed(hold.collapseBar, 2)} bar`} ${mark('wallsUnderPressure')}`], // prettier-ignore
  ];
  const rules = (thinning ?? []).map(
    ({ rule, ruleMm }) => `${rule.replace('-', ' ')} ${fixed(ruleMm, 2)} mm`,
  );
  if (rules.length > 0)
    rows.push(['by rule', `${rules.slice(0, SAID_RULES).join(', ')} ${mark('thinning')}`]);
  const highest = ventMarks.reduce((most, one) => Math.max(most, one.heightMm), 0);
  if (ventMarks.length > 0)
    rows.push(['vent marks', `up to ${fixed(highest, 2)} mm high ${mark('ventMarks')}`]);
  if (folds(web.outside) || folds(web.neighbours))
    rows.push(['web', `may fold at the corners ${mark('web')}`]);
  return rows;
}

const SURE: Record<SurenessKind, string> = {
  source: 'from a source',
  calibrated: 'calibrated by the studio',
  estimate: 'estimate',
};

function lifeLines({ life }: Report): string[] {
  if (!life) return [];
  const rows = life.margins.map(({ way, demand, holds, unit, ratio, text }) => {
    const left =
      demand === null
        ? 'not known'
        : `${figure(demand)} of ${figure(holds)}${unit === '°' ? '' : ' '}${unit}`;
    const over = ratio === null ? '' : ratio < 1 ? ', falls short' : `, ${figure(ratio)} times over`;
    return `  ${way.padEnd(12)} ${text}: ${left}${over}`;
  });
  return ['Life of the template:', ...rows, ...wrap(life.text, WIDTH - 2).map((line) => `  ${line}`), ''];
}

function figure(value: number): string {
  if (Math.abs(value) >= 1000) return 'over 1000';
  return value !== 0 && Math.abs(value) < 0.001 ? 'under 0.001' : String(Number(value.toPrecision(3)));
}

/** Sections by how sure they are; why is in the report. */
function surenessLines({ sureness, heat }: Report): string[] {
  if (!heat) return [];
  const of = (kind: SurenessKind) => SURE_SECTIONS.filter((section) => sureness[section].kind === kind);
  const lines = (['source', 'calibrated', 'estimate'] as const)
    .map((kind): [string, readonly SureSection[]] => [SURE[kind], of(kind)])
    .filter(([, sections]) => sections.length > 0)
    .flatMap(([label, sections]: [string, readonly SureSection[]]) =>
      wrap(`${label}: ${sections.map((one) => SECTION[one]).join(', ')}.`, WIDTH - 2).map(
        (line) => `  ${line}`,
      ),
    );
  return ['How sure the figures are:', ...lines, ''];
}

const SECTION: Record<SureSection, string> = {
  draft: 'draft',
  plan: 'draw',
  web: 'web',
  thinning: 'thinning by rule',
  sheet: 'sheet',
  layers: 'layers',
  air: 'air',
  ventMarks: 'vent marks',
  heat: 'heat',
  skin: 'skin',
  wallsUnderPressure: 'walls',
  life: 'life',
  print: 'print',
};

function checkLines(check: Check): string[] {
  const head = `${MARK[check.status]} ${check.id.padEnd(9)} `;
  const sure =
    check.status === 'not-run' || !check.basis.sureness ? '' : ` [${SURE[check.basis.sureness.kind]}]`;
  const text = `${check.message}${check.remedy ? ` ${check.remedy}` : ''}${sure}`;
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
