import { judgePullLog } from '../life/judge-pull-log';
import type { LoggedTemplate } from '../life/pull-log';
import { successRun } from '../life/survival';
import { FILAMENTS } from '../materials/filaments';
import { SHEETS } from '../materials/sheets';
import { releaseForceN, selfReleaseDeg } from '../physics/shrink-grip';
import type { EffectiveRecipe } from '../recipe';
import type { DraftReport, PlanReport, UndercutReport } from '../report';
import type {
  HeatReport,
  LifeMargin,
  LifeReport,
  LifeWay,
  PullLogReport,
  SkinReport,
  WallsUnderPressureReport,
} from '../report-forming';
import { hottestC } from './estimate-heat';
import { WALL_GIVES_MM } from './estimate-hold';

/** Friction of a set sheet on a print, bare and with a dry film (common practice, no source). */
const FRICTION = { none: 0.3, 'dry-ptfe': 0.15 } as const;

/** Reliability and confidence that a log should show. */
const PROVEN = 0.9;

export interface LifeInput {
  heat: HeatReport;
  skin: SkinReport;
  wallsUnderPressure: WallsUnderPressureReport;
  draft: Pick<DraftReport, 'wallMinMacroDeg' | 'wantedDeg'>;
  undercut: Pick<UndercutReport, 'maxDepthMm'>;
  plan: Pick<PlanReport, 'arealDrawRatio'>;
}

/**
 * What limits the template: its margin against heat, sinking skin, giving walls and gripping part, and how many pulls there
 * is reason to expect. No formula gives a template's life: what holds in all four is expected to come through the planned
 * pulls, and no more is known until a pull log says so.
 * @param heightMm of the walls that the part grips
 * @param log of templates of this kind, where the studio has one
 */
export function estimateLife(
  recipe: EffectiveRecipe,
  report: LifeInput,
  heightMm: number,
  log: LoggedTemplate[] | null,
): LifeReport {
  const { heat, skin, wallsUnderPressure: hold } = report;
  const { sheet, print, run, machine } = recipe;
  const friction = FRICTION[print.releaseAgent];
  const polymer = SHEETS[sheet.material];
  const draftDeg = report.draft.wallMinMacroDeg;
  const grip = gripMargin(draftDeg, report.draft.wantedDeg);
  const margins = [
    heatMargin(heat.limitC, Math.max(hottestC(heat), heat.transient.peakC), run.ambientC),
    skinMargin(skin),
    wallsMargin(hold, machine.pressureBar),
    grip,
  ];
  const known = (one: LifeMargin) => one.ratio ?? Infinity;
  const worst = margins
    .filter((one) => one.ratio !== null)
    .reduce<LifeMargin | null>((least, one) => (least && known(least) <= known(one) ? least : one), null);
  const judged = log && judgePullLog(log, run.pulls);
  const soft = heat.transient.surfaceC.findIndex((surface) => surface > heat.limitC);
  const beforeSoft = Math.min(heat.pullsBeforeRest, soft < 0 ? Infinity : soft);
  const locked = report.undercut.maxDepthMm > recipe.limits.undercutDepthMm;
  const pulls = judged ? fromLog(judged) : locked ? 0 : expectedPulls(margins, beforeSoft, run.pulls);
  return {
    limitedBy: worst?.way ?? null,
    margins,
    releaseForceN:
      draftDeg === null
        ? null
        : releaseForceN(
            {
              modulusMPa: polymer.modulusMPa.value,
              shrinkage: polymer.shrinkPercent.value / 100,
              wallMm: sheet.gaugeMm / report.plan.arealDrawRatio,
            },
            heightMm,
            draftDeg,
            friction,
          ),
    selfReleaseDeg: selfReleaseDeg(friction),
    pulls,
    basis: judged ? 'pull-log' : 'estimate',
    text: `${limiting(worst, FILAMENTS[print.material].name)} ${judged ? logText(judged, run.pulls) : locked ? LOCKED : startText(pulls, run.pulls, (grip.ratio ?? 1) > 0.999)}`,
    log: judged,
  };
}

/** Of the rise above the air, since that is what the pulls cause. */
function heatMargin(limitC: number, peakC: number, ambientC: number): LifeMargin {
  const ratio = peakC > ambientC ? Math.max(0, (limitC - ambientC) / (peakC - ambientC)) : null;
  return {
    way: 'heat',
    demand: peakC,
    holds: limitC,
    unit: '°C',
    margin: limitC - peakC,
    ratio,
    text: 'hottest surface against softening',
  };
}

function marginOf(
  way: LifeWay,
  demand: number | null,
  holds: number,
  unit: string,
  text: string,
): LifeMargin {
  return {
    way,
    demand,
    holds,
    unit,
    margin: demand === null ? null : holds - demand,
    ratio: demand === null ? null : demand > 0 ? holds / demand : null,
    text,
  };
}

/** A top that nothing carries has nothing left. */
function skinMargin({ sagMm, limitMm }: SkinReport): LifeMargin {
  const margin = marginOf('skin', sagMm, limitMm, 'mm', 'sag of the top between infill lines');
  return sagMm === null ? { ...margin, ratio: 0 } : margin;
}

/** The nearest of giving, breaking across the layers, and buckling. */
function wallsMargin(hold: WallsUnderPressureReport, bar: number): LifeMargin {
  const ways = [
    marginOf('walls', hold.sagMm, WALL_GIVES_MM, 'mm', 'give of the walls'),
    marginOf('walls', hold.stressMPa, hold.strengthMPa, 'MPa', 'bending of the walls across the layers'),
  ];
  if (hold.collapseBar !== null)
    ways.push(marginOf('walls', bar, hold.collapseBar, 'bar', 'pressure against buckling'));
  if (hold.infill)
    ways.push(
      marginOf('walls', hold.infill.stressMPa, hold.infill.bucklesMPa, 'MPa', 'buckling of the infill'),
    );
  return ways.reduce((least, one) => ((one.ratio ?? Infinity) < (least.ratio ?? Infinity) ? one : least));
}

/** More draft is less grip: the wall's own against what it needs. */
function gripMargin(draftDeg: number | null, wantedDeg: number): LifeMargin {
  return {
    way: 'grip',
    demand: draftDeg === null ? null : wantedDeg,
    holds: draftDeg ?? 90,
    unit: '°',
    margin: draftDeg === null ? null : draftDeg - wantedDeg,
    ratio: draftDeg === null || wantedDeg <= 0 ? null : Math.max(0, draftDeg / wantedDeg),
    text: 'draft of the walls against what they need',
  };
}

/**
 * Heat spoils it by the first pull too many: skin and walls were reckoned at a heat that a rest before keeps away. Where heat
 * holds, walls that give, or a top that sinks to twice what shows, are spoilt by the first pull.
 */
function expectedPulls(margins: LifeMargin[], beforeSoft: number, planned: number): number {
  if (beforeSoft < planned) return beforeSoft;
  const ratio = (way: LifeWay) => margins.find((one) => one.way === way)?.ratio ?? 1;
  return ratio('walls') < 1 || ratio('skin') < 0.5 ? 0 : planned;
}

function fromLog({ weibull, meanAtLeastPulls }: PullLogReport): number | null {
  return weibull ? Math.floor(weibull.b10Pulls) : meanAtLeastPulls && Math.floor(meanAtLeastPulls);
}

const WAYS: Record<LifeWay, string> = {
  heat: 'heat: its surface softens before anything else gives',
  skin: 'its skin: the top sinks between the infill lines first',
  walls: 'its walls: they give under pressure first',
  grip: 'grip: the part shrinks onto its walls and wears them as it is drawn off',
};

function limiting(worst: LifeMargin | null, name: string): string {
  if (!worst) return 'Nothing that was reckoned limits it.';
  const { demand, holds, unit, ratio } = worst;
  const figures =
    demand === null || ratio === null
      ? ''
      : ` (${unit === 'mm' && demand > 5 ? 'more than 5' : short(demand)} ${unit} asked of ${short(holds)} ${unit}${ratio < 1 ? '' : `, ${short(ratio)} times over`})`;
  return `In ${name} it is limited by ${WAYS[worst.way]}${worst.way === 'grip' ? '' : figures}.`;
}

const LOCKED =
  'An undercut locks the first part on it: until that is mended it comes through no pull that can be counted on.';

function startText(pulls: number | null, planned: number, comesOff: boolean): string {
  if (pulls === 0) return 'As planned it does not come through the first pull.';
  if (pulls !== null && pulls < planned)
    return `It should come through ${pulls} of the ${planned} planned pulls before it needs a rest.`;
  return `It should come through the ${planned} planned pulls${comesOff ? '' : ', if each part can be drawn off its walls'}; how many more is unknown, for no formula tells wear. Log the pulls: the log then stands in the place of this estimate. ${successRun(PROVEN, PROVEN)} templates that come so far without a failure would show that nine in ten do, with 90 % confidence.`;
}

function logText({ templates, failures, weibull, meanAtLeastPulls }: PullLogReport, planned: number): string {
  const seen = `${templates} logged ${templates === 1 ? 'template' : 'templates'}, ${failures} of them worn out`;
  if (weibull)
    return `By ${seen}, one in ten is worn out after ${short(weibull.b10Pulls)} pulls, and the mean is ${short(weibull.meanPulls)}; ${planned} are planned.`;
  return `By ${seen}, the mean is at least ${short(meanAtLeastPulls ?? 0)} pulls with 90 % confidence: too few failures to say more.`;
}

function short(value: number): string {
  return String(Number(value.toPrecision(3)));
}
