import { describe, expect, it } from 'vitest';
import { analyse } from '@/lib/formability/analyse';
import type { RecipeInput } from '@/lib/formability/recipe';
import { frustum } from '../../../fixtures/meshes/solids';
import { binaryStl } from '../../../fixtures/meshes/write-stl';
import { checkOf } from '../run-engine';

const bytes = binaryStl(frustum(80, 60, 25, 10));
const coarse: RecipeInput = { grid: { cellMm: 0.8, sheetNodes: 48 } };
const formed = (recipe: RecipeInput = {}) => analyse(bytes, { ...coarse, ...recipe }, { sheet: true }).report;

describe('the sheet in the report', () => {
  it('is formed only when asked for, and says so', () => {
    const { report } = analyse(bytes, coarse);
    expect(report.sheet).toBeNull();
    expect(checkOf(report, 'sheet')).toMatchObject({ status: 'not-run' });
    const geometry = analyse(bytes, coarse, { sheet: true, geometryOnly: true }).report;
    expect(geometry.sheet).toBeNull();
    expect(checkOf(geometry, 'sheet').message).toContain('only geometry');
  });

  it('thins as a whole like the areal ratio says, keeps its volume, doubles with the gauge', () => {
    const one = formed({ sheet: { gaugeMm: 0.8, minFormedMm: 0.1 } });
    expect((one.sheet?.meanMm ?? 0) / (0.8 / one.plan.arealDrawRatio)).toBeCloseTo(1, 1);
    expect(Math.abs(one.sheet?.volumeErrorPercent ?? 1)).toBeLessThan(1e-4);
    const two = formed({ sheet: { gaugeMm: 1.6, minFormedMm: 0.1 } });
    expect((two.sheet?.minMm ?? 0) / (one.sheet?.minMm ?? 1)).toBeCloseTo(2, 6);
  });

  it('a sheet too thin everywhere fails, and the advised gauge, tried as a whole run, holds', () => {
    const recipe: RecipeInput = { sheet: { gaugeMm: 0.8, minFormedMm: 0.45 }, run: { pulls: 5 } };
    const report = formed(recipe);
    expect(checkOf(report, 'sheet').status).toBe('fail');
    const advice = report.advice.find(({ change }) => change.sheet?.gaugeMm);
    expect(advice?.mends).toContain('sheet');
    const thicker = { ...recipe, sheet: { ...recipe.sheet, ...advice?.change.sheet } };
    expect(checkOf(formed(thicker), 'sheet').status).toBe('pass');
  });

  it('a corner within the margin is for a look, not a failure', () => {
    const { minMm = 0, marginPercent = 0 } =
      formed({ sheet: { gaugeMm: 0.8, minFormedMm: 0.1 } }).sheet?.part ?? {};
    const wanted = minMm * (1 - marginPercent / 200);
    expect(checkOf(formed({ sheet: { gaugeMm: 0.8, minFormedMm: wanted } }), 'sheet').status).toBe('caution');
  });

  it('reports progress through the run and stops when told', () => {
    const shares: number[] = [];
    analyse(bytes, coarse, {
      sheet: true,
      onProgress: (stage, share) => stage === 'sheet' && shares.push(share),
    });
    expect(shares.length).toBeGreaterThan(5);
    expect([...shares].sort((a, b) => a - b)).toEqual(shares);
    let asked = 0;
    const shouldStop = () => ++asked > 20;
    expect(() => analyse(bytes, coarse, { sheet: true, shouldStop })).toThrow(/stopped/);
  });
});
