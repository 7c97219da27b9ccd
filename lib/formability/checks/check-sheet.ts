import type { EffectiveRecipe } from '../recipe';
import type { Basis, Check, CheckStatus, Place } from '../report';
import type { SheetZone } from '../report-sheet';
import type { FormedSheet } from '../sheet/form-sheet';
import { isUsualGauge, type ThinRemedy } from '../sheet/gauge-for';
import type { FootRemedy, SheetJudgement } from '../sheet/judge-sheet';
import { say, sayPlace } from './basis';
import type { CheckInput } from './check-input';

const BASIS: Basis = {
  source:
    'incompressible neo-Hookean membrane, full stick, computed; held against its differential equation and the no-slip strip; margin: own estimate, no experiment; trimmed at or above the foot: common practice, no source',
  kind: 'computed',
};

/** Share of the sheet that does not close onto the template from which that is said, and looked at. */
const OPEN_PERCENT = 0.5;

/** The most nodes that a recipe may ask for. */
const FINEST_NODES = 512;

const PLACES: Record<SheetZone['place'], string> = {
  flat: 'on a flat',
  wall: 'on a wall',
  'inner-corner': 'in an inner corner',
  pit: 'in a pit',
  web: 'in a web',
};

const LOCALLY: Record<ThinRemedy, string> = {
  gauge: '',
  radius: 'a larger radius in that inner corner',
  gap: 'more room there (a wider gap or pocket, or less height beside it)',
  height: 'less height or more draft of that wall',
};

type Input = Pick<CheckInput, 'recipe' | 'sheet'> & { report?: Pick<CheckInput['report'], 'undercut'> };

/**
 * Is the formed part thick enough everywhere, with the honest margin of the model? The foot along the bed is told
 * apart: it is trimmed off, unless the flange is kept. Null where nothing was formed.
 */
export function checkSheet({ recipe, sheet, report }: Input): Check | null {
  if (!sheet) return null;
  const limit = recipe.sheet.minFormedMm;
  const { formed } = sheet;
  if (!formed) {
    const message = `Not formed: ${sheet.why}.`;
    const remedy = 'Widen the frame, or make the template smaller.';
    return { id: 'sheet', status: 'not-run', measured: null, limit, unit: 'mm', basis: BASIS, message, remedy, places: [] }; // prettier-ignore
  }
  const part = zoneOf(formed);
  const status = statusOf(formed, part, limit, sheet.neededMm);
  const bridged = (report?.undercut.maxDepthMm ?? 0) > recipe.limits.undercutDepthMm;
  return {
    id: 'sheet',
    status,
    measured: part.minMm,
    limit,
    unit: 'mm',
    basis: BASIS,
    message: messageOf(formed, part, recipe, bridged),
    remedy: [
      remedyOf(sheet, part),
      openWords(formed, sheet.remedy),
      footWords(formed, sheet.footRemedy, recipe.sheet.gaugeMm),
      status === 'caution' ? surerWords(formed, part, recipe.grid.sheetNodes) : '',
    ]
      .filter(Boolean)
      .join(' '),
    places: placesOf(formed, part, limit),
  };
}

/** The part, or the whole sheet over a template that stands no higher than a foot. */
function zoneOf({ report, minPlace, formedAreaMm2 }: FormedSheet): SheetZone {
  return report.part ?? { ...report, place: minPlace, areaMm2: formedAreaMm2 };
}

/** Both meshes must see a failure: one alone may be the mesh's doing. */
function statusOf(
  { outcome, report, formedAreaMm2 }: FormedSheet,
  part: SheetZone,
  limit: number,
  neededMm: number,
): CheckStatus {
  if (outcome === 'volume-lost') return 'caution';
  const coarseMm = part.minMm * (1 + part.meshErrorPercent / 100);
  if (part.minMm < limit && (!isMeshLimited(part) || coarseMm < limit || part.q05Mm < limit)) return 'fail';
  const sure = outcome === 'converged' && !isMeshLimited(part) && openPercent(report, formedAreaMm2) < OPEN_PERCENT; // prettier-ignore
  const footHolds = !report.foot || report.foot.minMm >= limit;
  return sure && footHolds && part.minMm >= neededMm ? 'pass' : 'caution';
}

/** Where half the nodes differ by more than the model's own margin, the figure is the mesh's as much as the sheet's. */
function isMeshLimited({ meshErrorPercent, marginPercent }: SheetZone): boolean {
  return meshErrorPercent > marginPercent;
}

function openPercent({ unclosedAreaMm2 }: FormedSheet['report'], formedAreaMm2: number): number {
  return (100 * unclosedAreaMm2) / formedAreaMm2;
}

function messageOf(formed: FormedSheet, part: SheetZone, recipe: EffectiveRecipe, bridged: boolean): string {
  const { report, outcome, formedAreaMm2 } = formed;
  const { gaugeMm, minFormedMm } = recipe.sheet;
  if (outcome === 'volume-lost')
    return 'The run lost sheet volume, so its figures are not to be used. Prove the thickness with a test pull.';
  const { foot } = report;
  const leastMm = part.minMm * (1 - part.marginPercent / 100);
  const parts = [
    `From ${say(gaugeMm, 2)} mm the part forms to ${about(part.minMm)} mm at its thinnest, ${PLACES[part.place]}; with the model’s margin of ${part.marginPercent} % it is ${least(leastMm)}, against ${say(minFormedMm, 2)} mm wanted.`,
  ];
  if (foot && foot.minMm < part.minMm)
    parts.push(
      `The foot, the ${say(report.footHeightMm)} mm along the bed that are usually trimmed off, thins to ${thick(foot.minMm)} mm.`,
    );
  const open = openPercent(report, formedAreaMm2);
  if (open >= OPEN_PERCENT)
    parts.push(
      `${say(open)} % of the sheet does not close onto the template: webs, or slots too tight for it.`,
    );
  if (isMeshLimited(part))
    parts.push(
      `That place is too sharp for the run: a mesh half as fine differs there by ${say(part.meshErrorPercent, 0)} %, more than the margin. Take the figure as a rough guide.`,
    );
  if (outcome === 'not-settled') parts.push('The run did not settle: take the figures as a rough guide.');
  if (bridged) parts.push('Beside the undercut the sheet is taken to hang straight down.');
  parts.push('An estimate; prove it with a test pull.');
  return parts.join(' ');
}

/** What runs say below a hundredth means no more than that. */
function thick(mm: number): string {
  return mm < 0.01 ? 'less than 0.01' : say(mm, 2);
}

function about(mm: number): string {
  return `${mm < 0.01 ? '' : 'about '}${thick(mm)}`;
}

function least(mm: number): string {
  return mm < 0.01 ? 'next to nothing' : `${say(mm, 2)} mm at least`;
}

function remedyOf({ remedy, neededMm }: SheetJudgement, { marginPercent }: SheetZone): string {
  if (!remedy) return '';
  const { gaugeMm, scaledMm, minMm, better } = remedy;
  if (gaugeMm === null) {
    const change =
      LOCALLY[better] || 'a template that draws less: lower, with wider gaps, more draft and larger radii';
    return `No usual gauge mends this: ${say(neededMm, 2)} mm would take about ${say(scaledMm, 1)} mm of sheet. It needs ${change}.`;
  }
  const gauge = `Take a gauge of ${say(gaugeMm, 2)} mm: a run with it leaves ${say(minMm, 2)} mm, enough with the margin of ${marginPercent} %`;
  const local = LOCALLY[better];
  return local === '' ? `${gauge}.` : `${gauge}; little of the part is thin, so ${local} serves better.`;
}

/** No gauge closes a web: room does. Said already where that serves better than gauge. */
function openWords({ report, formedAreaMm2, webAt }: FormedSheet, remedy: SheetJudgement['remedy']): string {
  if (openPercent(report, formedAreaMm2) < OPEN_PERCENT || remedy?.better === 'gap') return '';
  const where = webAt ? ` at ${sayPlace(webAt)}` : '';
  return `So that the sheet closes${where}, give it a wider gap, less height or more draft beside it, or a larger radius.`;
}

/** What makes a figure surer that is the run's as much as the sheet's. */
function surerWords({ outcome }: FormedSheet, part: SheetZone, nodes: number): string {
  if (outcome === 'converged' && !isMeshLimited(part)) return '';
  const finer =
    nodes < FINEST_NODES
      ? ` on a finer grid (grid.sheetNodes ${Math.min(FINEST_NODES, 2 * nodes)} on the command line)`
      : '';
  return `Round that place and form it again${finer}, or measure it on a test pull.`;
}

/** What the foot needs, which is nothing where it is cut off. */
function footWords({ report }: FormedSheet, remedy: FootRemedy | null, presentMm: number): string {
  if (!remedy) return '';
  const { radiusMm, triedMm, minMm, runs } = remedy.radius;
  const round =
    radiusMm === null
      ? `an inside radius there does not do it (${say(triedMm)} mm ${runs > 0 ? `leave ${thick(minMm)}` : `would leave ${about(minMm)}`} mm)`
      : `round the foot with ${say(radiusMm)} mm inside (a run with it leaves ${say(minMm, 2)} mm there)`;
  const gauge = isUsualGauge(remedy.gaugeMm, presentMm)
    ? `, or take a gauge of ${say(remedy.gaugeMm, 2)} mm`
    : radiusMm === null
      ? ', nor does a usual gauge'
      : '';
  return `Trim ${say(report.footHeightMm)} mm or more above the bed and the thin foot is waste; where the flange stays on the part, ${round}${gauge}.`;
}

function placesOf({ report, webAt }: FormedSheet, part: SheetZone, limit: number): Place[] {
  const { foot } = report;
  return [
    { at: part.minAt, areaMm2: part.belowLimitAreaMm2 },
    ...(foot && foot.minMm < limit ? [{ at: foot.minAt, areaMm2: foot.belowLimitAreaMm2 }] : []),
    ...(webAt && report.unclosedAreaMm2 > 0 ? [{ at: webAt, areaMm2: report.unclosedAreaMm2 }] : []),
  ];
}
