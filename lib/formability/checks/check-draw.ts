import type { LimitKey } from '../limits';
import type { Basis, Check } from '../report';
import { basisOf, roundDown, roundUp, say } from './basis';
import type { CheckInput } from './check-input';

type Plan = CheckInput['report']['plan'];
type Limits = CheckInput['recipe']['limits'];

/** Mean thickness of an incompressible sheet that stretches over the formed area. */
const MEAN_BASIS: Basis = {
  source:
    'R. J. Crawford, Plastics Engineering, 3rd ed. 1998, eq. 4.28: mean thickness = gauge / areal draw ratio',
  kind: 'handbook',
};

/**
 * Is the sheet asked to stretch too far? A mean below the wanted least thickness fails: the thinnest place is thinner
 * still. Then areal, linear and depth ratios, of which the areal one decides failure.
 */
export function checkDraw({ recipe, report, sizeMm }: CheckInput): Check {
  const { limits, sheet } = recipe;
  const { plan } = report;
  const linear = Math.max(plan.linearDrawRatioX, plan.linearDrawRatioY);
  const mean = sheet.gaugeMm / plan.arealDrawRatio;
  const thin = mean < sheet.minFormedMm;
  const ratios: { measured: number; key: LimitKey; over: boolean; lower: number }[] = [
    {
      measured: plan.arealDrawRatio,
      key: 'arealDrawMax',
      over: plan.arealDrawRatio > limits.arealDrawMax,
      lower: (limits.arealDrawMax - 1) / (plan.arealDrawRatio - 1),
    },
    {
      measured: linear,
      key: 'linearDrawMax',
      over: linear > limits.linearDrawMax,
      lower: (limits.linearDrawMax - 1) / (linear - 1),
    },
    {
      measured: plan.depthRatio,
      key: 'depthRatioMax',
      over: plan.depthRatio > limits.depthRatioMax,
      lower: limits.depthRatioMax / plan.depthRatio,
    },
  ];
  const over = ratios.filter((ratio) => ratio.over);
  const [judged] = over.length > 0 ? over : ratios;
  const compared = thin
    ? { measured: mean, limit: sheet.minFormedMm, unit: 'mm', basis: MEAN_BASIS }
    : {
        measured: judged.measured,
        limit: limits[judged.key],
        unit: 'ratio',
        basis: basisOf(judged.key, recipe),
      };
  const fails = thin || plan.arealDrawRatio > limits.arealDrawFail;
  return {
    id: 'draw',
    status: fails ? 'fail' : over.length > 0 ? 'caution' : 'pass',
    ...compared,
    message: `The sheet stretches to ${say(plan.arealDrawRatio, 2)} times its area, to ${say(linear, 2)} times its length on the longest section, so its mean thickness falls from ${say(sheet.gaugeMm, 2)} to ${say(mean, 2)} mm${thin ? `, below the ${say(sheet.minFormedMm, 2)} mm wanted at its thinnest` : ''}.`,
    remedy: waysOut(
      Math.min(1, ...over.map((ratio) => ratio.lower)),
      thin,
      Math.min(limits.arealDrawMax, sheet.gaugeMm / sheet.minFormedMm),
      { sizeMm, plan, limits, minFormedMm: sheet.minFormedMm },
    ),
    places: [],
  };
}

/**
 * Height, frame or gauge, each of which alone would do.
 * @param lower share of the height that the ratios allow
 * @param wanted areal ratio at which area and mean thickness are both in order
 */
function waysOut(
  lower: number,
  thin: boolean,
  wanted: number,
  part: { sizeMm: CheckInput['sizeMm']; plan: Plan; limits: Limits; minFormedMm: number },
): string {
  const { sizeMm, plan, limits, minFormedMm } = part;
  const ways: string[] = [];
  const share = Math.min(lower, (wanted - 1) / (plan.arealDrawRatio - 1));
  if (share < 1 && share > 0) ways.push(`lower the template to ${say(roundDown(sizeMm[2] * share, 0.1))} mm`);
  const margin = roundUp(Math.max(...marginsFor(plan, wanted, limits, sizeMm)), 1);
  if (share < 1 && Number.isFinite(margin)) ways.push(`widen the frame margin to ${say(margin, 0)} mm`);
  if (thin && lower >= 1) {
    const gauge = roundUp(minFormedMm * plan.arealDrawRatio, 0.05);
    ways.push(`take a gauge of ${say(gauge, 2)} mm, which averages ${say(minFormedMm, 2)} mm`);
  }
  return ways.length > 0 ? `${ways.join(', or ').replace(/^./, (first) => first.toUpperCase())}.` : '';
}

/**
 * Frame margins at which the same profile keeps each ratio: (W + 2m)(D + 2m) = extra area / (ratio − 1); along a section,
 * side = extra length / (ratio − 1); shorter side = height / ratio.
 */
function marginsFor(plan: Plan, areal: number, limits: Limits, [w, d, h]: readonly number[]): number[] {
  const [frameX, frameY] = plan.frameMm;
  const extra = (plan.formedAreaMm2 - plan.frameAreaMm2) / (areal - 1);
  const half = (w + d) / 2;
  const along = limits.linearDrawMax - 1;
  return [
    areal > 1 ? (-half + Math.sqrt(half * half + extra - w * d)) / 2 : Infinity,
    (((plan.linearDrawRatioX - 1) * frameX) / along - w) / 2,
    (((plan.linearDrawRatioY - 1) * frameY) / along - d) / 2,
    (h / limits.depthRatioMax - Math.min(w, d)) / 2,
  ];
}
