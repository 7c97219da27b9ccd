import type { Check } from '../report';
import { basisOf, roundUp, say } from './basis';
import type { CheckInput } from './check-input';

/** Is the sheet asked to stretch too far? Areal, linear and depth ratios; the areal one decides failure. */
export function checkDraw({ recipe, report, sizeMm }: CheckInput): Check {
  const { limits, sheet } = recipe;
  const { plan } = report;
  const linear = Math.max(plan.linearDrawRatioX, plan.linearDrawRatioY);
  const over = {
    areal: plan.arealDrawRatio > limits.arealDrawMax,
    linear: linear > limits.linearDrawMax,
    depth: plan.depthRatio > limits.depthRatioMax,
  };
  const bad = over.areal || over.linear || over.depth;
  const mean = sheet.gaugeMm / plan.arealDrawRatio;
  const [measured, key] = over.areal
    ? ([plan.arealDrawRatio, 'arealDrawMax'] as const)
    : over.linear
      ? ([linear, 'linearDrawMax'] as const)
      : over.depth
        ? ([plan.depthRatio, 'depthRatioMax'] as const)
        : ([plan.arealDrawRatio, 'arealDrawMax'] as const);
  const lower = Math.min(
    over.areal ? (limits.arealDrawMax - 1) / (plan.arealDrawRatio - 1) : 1,
    over.linear ? (limits.linearDrawMax - 1) / (linear - 1) : 1,
    over.depth ? limits.depthRatioMax / plan.depthRatio : 1,
  );
  const gauge = roundUp(sheet.minFormedMm * plan.arealDrawRatio, 0.05);
  const thin = mean < sheet.minFormedMm;
  const margin = roundUp(marginFor(plan.formedAreaMm2 - plan.frameAreaMm2, limits.arealDrawMax, sizeMm), 1);
  return {
    id: 'draw',
    status: plan.arealDrawRatio > limits.arealDrawFail ? 'fail' : bad || thin ? 'caution' : 'pass',
    measured,
    limit: limits[key],
    unit: 'ratio',
    basis: basisOf(key, recipe),
    message: `The sheet stretches to ${say(plan.arealDrawRatio, 2)} times its area, to ${say(linear, 2)} times its length on the longest section, so its mean thickness falls from ${say(sheet.gaugeMm, 2)} to ${say(mean, 2)} mm.`,
    remedy:
      bad || thin
        ? [
            bad ? `Lower the template to ${say(sizeMm[2] * lower)} mm` : '',
            over.areal && margin > 0 ? `widen the frame margin to ${say(margin, 0)} mm` : '',
            thin ? `take a gauge of ${say(gauge, 2)} mm, which averages ${say(sheet.minFormedMm, 2)} mm` : '',
          ]
            .filter(Boolean)
            .join(', or ')
            .replace(/^./, (first) => first.toUpperCase()) + '.'
        : '',
    places: [],
  };
}

/** Frame margin at which the same extra area gives the wanted ratio: (W + 2m)(D + 2m) = extra / (ratio − 1). */
function marginFor(extra: number, ratio: number, [w, d]: readonly number[]): number {
  const wanted = extra / Math.max(ratio - 1, 1e-6);
  const half = (w + d) / 2;
  return (-half + Math.sqrt(half * half + wanted - w * d)) / 2;
}
