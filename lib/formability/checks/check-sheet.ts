import type { EffectiveRecipe } from '../recipe';
import type { Basis, Check, CheckStatus } from '../report';
import type { FormedSheet } from '../sheet/form-sheet';
import type { GaugeRemedy, ThinRemedy } from '../sheet/gauge-for';
import { say, sayPlace } from './basis';
import type { CheckInput } from './check-input';

const BASIS: Basis = {
  source:
    'incompressible neo-Hookean membrane, full stick, computed; held against its differential equation and the no-slip strip; margin: own estimate, no experiment',
  kind: 'computed',
};

/** Change of the 5 % quantile against half the nodes above which the figures are the mesh's as much as the sheet's. */
const COARSE_PERCENT = 25;

const PLACES = {
  flat: 'on a flat',
  wall: 'on a wall',
  'inner-corner': 'in an inner corner',
  pit: 'in a pit',
  web: 'in a web',
} as const;

const LOCALLY: Record<ThinRemedy, string> = {
  gauge: '',
  radius: 'a larger radius in that inner corner',
  gap: 'more room there (a wider gap, or a lower neighbour)',
  height: 'less height or more draft of that wall',
};

/** Is the formed part thick enough everywhere, with the honest margin of the model? Null where nothing was formed. */
export function checkSheet({ recipe, sheet }: Pick<CheckInput, 'recipe' | 'sheet'>): Check | null {
  if (!sheet) return null;
  const limit = recipe.sheet.minFormedMm;
  const { formed } = sheet;
  if (!formed) {
    const message = `Not formed: ${sheet.why}.`;
    const remedy = 'Widen the frame, or make the template smaller.';
    return { id: 'sheet', status: 'not-run', measured: null, limit, unit: 'mm', basis: BASIS, message, remedy, places: [] }; // prettier-ignore
  }
  const { report } = formed;
  return {
    id: 'sheet',
    status: statusOf(formed, limit, sheet.neededMm),
    measured: report.minMm,
    limit,
    unit: 'mm',
    basis: BASIS,
    message: messageOf(formed, recipe),
    remedy: sheet.remedy ? remedyOf(sheet.remedy, sheet.neededMm, report.marginPercent) : '',
    places: [{ at: report.minAt, areaMm2: report.belowLimitAreaMm2 }],
  };
}

function statusOf({ outcome, report }: FormedSheet, limit: number, neededMm: number): CheckStatus {
  if (outcome === 'volume-lost') return 'caution';
  // Too thin whatever the model's margin, or over more than a corner.
  if (report.minMm * (1 + report.marginPercent / 100) < limit || report.q05Mm < limit) return 'fail';
  const sure = outcome === 'converged' && report.meshErrorPercent <= COARSE_PERCENT;
  return sure && report.minMm >= neededMm ? 'pass' : 'caution';
}

function messageOf(
  { report, outcome, minPlace, formedAreaMm2 }: FormedSheet,
  recipe: EffectiveRecipe,
): string {
  const { gaugeMm, minFormedMm } = recipe.sheet;
  const parts = [
    `A ${say(gaugeMm, 2)} mm sheet forms to ${say(report.minMm, 2)} mm at its thinnest, ${PLACES[minPlace]} at ${sayPlace(report.minAt)} (mean over 3 mm, give or take ${report.marginPercent} %); a twentieth of it is thinner than ${say(report.q05Mm, 2)} mm, against ${say(minFormedMm, 2)} mm wanted.`,
  ];
  const open = (100 * report.unclosedAreaMm2) / formedAreaMm2;
  if (open >= 0.5) parts.push(`${say(open)} % of it does not close onto the template: webs.`);
  if (report.meshErrorPercent > COARSE_PERCENT)
    parts.push(
      `Half the nodes give figures ${say(report.meshErrorPercent, 0)} % away: take them as a rough guide.`,
    );
  if (outcome === 'not-settled') parts.push('The run did not settle: take the figures as a rough guide.');
  if (outcome === 'volume-lost') parts.push('The run lost sheet volume: its figures are not to be used.');
  parts.push('An estimate; prove it with a test pull.');
  return parts.join(' ');
}

function remedyOf(remedy: GaugeRemedy, neededMm: number, marginPercent: number): string {
  const { gaugeMm, scaledMm, minMm, better } = remedy;
  if (gaugeMm === null) {
    const change =
      LOCALLY[better] || 'a template that draws less: lower, with wider gaps, more draft and larger radii';
    return `No usual gauge mends this: ${say(neededMm, 2)} mm would take about ${say(scaledMm, 1)} mm of sheet. It needs ${change}.`;
  }
  const gauge = `Take a gauge of ${say(gaugeMm, 2)} mm: a run with it leaves ${say(minMm, 2)} mm, enough with the margin of ${marginPercent} %`;
  const local = LOCALLY[better];
  return local === '' ? `${gauge}.` : `${gauge}; little of the sheet is thin, so ${local} serves better.`;
}
