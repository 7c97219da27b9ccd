import { describe, expect, it } from 'vitest';
import { checkAir } from '@/lib/formability/checks/check-air';
import { checkDraw } from '@/lib/formability/checks/check-draw';
import { checkEdges } from '@/lib/formability/checks/check-edges';
import type { CheckInput } from '@/lib/formability/checks/check-input';
import { checkLayers } from '@/lib/formability/checks/check-layers';
import { checkNozzle } from '@/lib/formability/checks/check-nozzle';
import { checkRelease } from '@/lib/formability/checks/check-release';
import { checkShell } from '@/lib/formability/checks/check-shell';
import { checkSpacing } from '@/lib/formability/checks/check-spacing';
import { checkUndercut } from '@/lib/formability/checks/check-undercut';
import { LIMIT_RULES, type LimitKey } from '@/lib/formability/limits';
import type { Check, CheckStatus } from '@/lib/formability/report';
import { extrude, frustum } from '../../fixtures/meshes/solids';
import { checkWith } from './checks/check-with';
import { checkOf, reportOn } from './run-engine';

const PRACTICE = 'common practice, no source';
const FORMERS = 'public design guidelines of custom formers';

/** Half a per cent to either side: a limit that moves by one changes a verdict. */
const LESS = 0.995;
const MORE = 1.005;

interface Edge {
  limit: LimitKey;
  /** The published value. */
  at: number;
  source: string;
  judge(input: CheckInput): Check | null;
  /** Sets what the limit is held against. */
  set(input: CheckInput, value: number): void;
  below: CheckStatus;
  above: CheckStatus;
}

const EDGES: Edge[] = [
  {
    limit: 'undercutDepthMm',
    at: 0.2,
    source: `${PRACTICE}: shallower is surface texture`,
    judge: checkUndercut,
    set: ({ report }, maxDepthMm) => {
      const region = { at: [0, 0, 5], zMm: [2, 6], maxDepthMm, planAreaMm2: 4, volumeMm3: 8 };
      report.undercut = { ...report.undercut, maxDepthMm, regions: [region as never] };
    },
    below: 'pass',
    above: 'fail',
  },
  {
    limit: 'layerMaxMm',
    at: 0.2,
    source: PRACTICE,
    judge: checkLayers,
    set: ({ recipe }, layerMm) => (recipe.print.layerMm = layerMm),
    below: 'pass',
    above: 'caution',
  },
  {
    limit: 'cuspMaxMm',
    at: 0.1,
    source: PRACTICE,
    judge: checkLayers,
    set: ({ report }, cuspMaxMm) => (report.layers.cuspMaxMm = cuspMaxMm),
    below: 'pass',
    above: 'caution',
  },
  {
    limit: 'arealDrawMax',
    at: 3,
    source: PRACTICE,
    judge: checkDraw,
    set: (input, ratio) => drawTo(input, { arealDrawRatio: ratio }),
    below: 'pass',
    above: 'caution',
  },
  {
    limit: 'arealDrawFail',
    at: 5,
    source: PRACTICE,
    judge: checkDraw,
    set: (input, ratio) => drawTo(input, { arealDrawRatio: ratio }),
    below: 'caution',
    above: 'fail',
  },
  {
    limit: 'depthRatioMax',
    at: 1,
    source: `${FORMERS}: depth to width below 1:1`,
    judge: checkDraw,
    set: (input, depthRatio) => drawTo(input, { depthRatio }),
    below: 'pass',
    above: 'caution',
  },
  {
    limit: 'linearDrawMax',
    at: 3,
    source: PRACTICE,
    judge: checkDraw,
    set: (input, linearDrawRatioY) => drawTo(input, { linearDrawRatioY }),
    below: 'pass',
    above: 'caution',
  },
  {
    limit: 'heightOverGapMax',
    at: 1,
    source: `${PRACTICE}: clear gap at least the height of the shorter neighbour`,
    judge: checkSpacing,
    set: ({ report }, ratio) => {
      const between: [never, never] = [[0, 0, 0] as never, [20, 0, 0] as never];
      report.spacing = [{ gapMm: 20, gapAtBedMm: 20, heightMm: 20 * ratio, heightOverGap: ratio, between }];
    },
    below: 'pass',
    above: 'caution',
  },
  {
    limit: 'edgeRadiusGauges',
    at: 1,
    source: `${FORMERS}: radius at least the sheet gauge`,
    judge: checkEdges,
    set: ({ report, recipe }, gauges) => {
      report.edges.minConvexRadiusMm = gauges * recipe.sheet.gaugeMm;
      report.edges.minConcaveRadiusMm = null;
    },
    below: 'caution',
    above: 'pass',
  },
  {
    limit: 'airClearS',
    at: 0.5,
    source: `${PRACTICE}: the sheet sets against a cool template within about a second`,
    judge: checkAir,
    set: ({ report }, clearS) => {
      report.airTraps = [{ floor: [0, 0, 3], planAreaMm2: 9 } as never];
      report.air = [{ trap: 0, clearS, ventsNeeded: 1, ventDiameterMm: 0.4, ventPlaces: [] } as never];
    },
    below: 'pass',
    above: 'caution',
  },
  {
    limit: 'shellMinMm',
    at: 3,
    source: `${PRACTICE}: shells of 3 to 5 mm on large hollow templates`,
    judge: checkShell,
    set: (input, shellMm) => shell(input, shellMm, 200),
    below: 'caution',
    above: 'pass',
  },
  {
    limit: 'shellMaxMm',
    at: 5,
    source: `${PRACTICE}: shells of 3 to 5 mm on large hollow templates`,
    judge: checkShell,
    set: (input, shellMm) => shell(input, shellMm, 200),
    below: 'pass',
    above: 'caution',
  },
  {
    limit: 'largeTemplateMm',
    at: 150,
    source: PRACTICE,
    judge: checkShell,
    set: (input, sideMm) => shell(input, 2, sideMm),
    below: 'pass',
    above: 'caution',
  },
  {
    limit: 'smallTemplateMm',
    at: 60,
    source: PRACTICE,
    judge: checkNozzle,
    set: (input, sideMm) => {
      input.sizeMm = [sideMm, 20, 20];
      Object.assign(input.recipe.print, { nozzleMm: 0.5, lineMm: 0.5625 });
      Object.assign(input.report.detail, { smallestFeatureMm: null, smallestGapMm: null });
    },
    below: 'caution',
    above: 'pass',
  },
  {
    limit: 'releaseDraftDeg',
    at: 7,
    source: PRACTICE,
    judge: checkRelease,
    set: ({ recipe, walls }, facetDeg) => {
      walls.facetDeg = facetDeg;
      Object.assign(recipe.print, { sanded: true, releaseAgent: 'none' });
    },
    below: 'caution',
    above: 'pass',
  },
];

function drawTo({ report, recipe }: CheckInput, ratios: Partial<CheckInput['report']['plan']>): void {
  recipe.sheet.gaugeMm = 5;
  const low = { arealDrawRatio: 1.5, linearDrawRatioX: 1.2, linearDrawRatioY: 1.2, depthRatio: 0.4 };
  Object.assign(report.plan, low, ratios);
}

function shell(input: CheckInput, mm: number, sideMm: number): void {
  input.sizeMm = [sideMm, 60, 30];
  Object.assign(input.recipe.print, { shellMm: mm, topMm: mm });
}

describe('limits: a verdict changes at the published value', () => {
  it.each(EDGES)('$limit at $at ($source)', ({ limit, at, source, judge, set, below, above }) => {
    const status = (value: number) => checkWith(judge, (input) => set(input, value)).status;
    expect([status(LESS * at), status(MORE * at)]).toEqual([below, above]);
    expect(LIMIT_RULES[limit].source).toBe(source);
  });

  const draft = (deg: number, sanded: boolean) =>
    checkOf(reportOn(frustum(60, 50, 20, deg), { grid: { cellMm: 1 }, print: { sanded } }), 'draft').status;

  it(`draftMinDeg and draftFailDeg: 5° (${PRACTICE}) and 3° (${FORMERS}: 3° minimum on male tools), sanded`, () => {
    expect([draft(4.97, true), draft(5.03, true)]).toEqual(['caution', 'pass']);
    expect([draft(2.98, true), draft(3.02, true)]).toEqual(['fail', 'caution']);
  });

  it('layerGrooveMm: unsanded layers of 0.15 mm with grooves of 0.01 mm ask for 3° + atan(0.01 / 0.15) = 6.814°', () => {
    expect([draft(6.78, false), draft(6.83, false)]).toEqual(['caution', 'pass']);
    // 0.0099 mm would ask for 6.776°, 0.0101 mm for 6.852°.
  });

  it(`overhangDeg: 45° from vertical prints without support (${PRACTICE})`, () => {
    const overhang = (deg: number) => {
      const out = 10 * Math.tan((deg * Math.PI) / 180);
      const ring = [[-10, 0], [10, 0], [10, 10], [10 + out, 20], [10 + out, 22], [-10, 22]] as [number, number][]; // prettier-ignore
      return checkOf(reportOn(extrude(ring, 30), { grid: { cellMm: 1 } }), 'overhang').status;
    };
    expect([overhang(44.8), overhang(45.2)]).toEqual(['pass', 'caution']);
  });

  it(`layerMinMm: finer layers than 0.1 mm are not asked for (${PRACTICE})`, () => {
    const remedy = (wantedCuspMm: number) =>
      checkWith(checkLayers, ({ recipe, report }) => {
        recipe.print.layerMm = report.layers.cuspMaxMm = 0.2;
        recipe.limits.cuspMaxMm = wantedCuspMm;
      }).remedy;
    // On a slope of 90° the layer is the cusp, in whole hundredths: 0.1 and 0.09 mm.
    expect(remedy(0.1001)).toMatch(/^Print in layers of 0.1 mm/);
    expect(remedy(0.0999)).toMatch(/^Sand the slopes/);
  });
});
