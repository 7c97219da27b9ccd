import { describe, expect, it } from 'vitest';
import type { RecipeInput } from '@/lib/formability/recipe';
import type { CheckId, CheckStatus, Report } from '@/lib/formability/report';
import { frustum } from '../../fixtures/meshes/solids';
import { reportOn } from './run-engine';

const coarse = { grid: { cellMm: 0.6 } };
const mesh = frustum(120, 90, 40, 8);
const weak: RecipeInput = { ...coarse, print: { material: 'pc', topMm: 1, infillPercent: 10 } };
const rank: Record<CheckStatus, number> = { fail: 2, caution: 1, pass: 0, 'not-run': 0 };

function statuses(report: Report): Map<CheckId, number> {
  return new Map(report.checks.map(({ id, status }) => [id, rank[status]]));
}

/** The recipe with the change of a piece of advice laid over it. */
function changed(recipe: RecipeInput, change: RecipeInput): RecipeInput {
  return {
    ...recipe,
    print: { ...recipe.print, ...change.print },
    sheet: { ...recipe.sheet, ...change.sheet },
    run: { ...recipe.run, ...change.run },
  };
}

describe('advice', () => {
  const report = reportOn(mesh, weak);

  it('names three changes at most, each of another kind, the one that mends most first', () => {
    expect(report.advice.length).toBeGreaterThan(1);
    expect(report.advice.length).toBeLessThanOrEqual(3);
    const kinds = report.advice.map(({ change }) => JSON.stringify(Object.values(change).map(Object.keys)));
    expect(new Set(kinds).size).toBe(kinds.length);
    expect(report.advice[0].mends).toEqual(expect.arrayContaining(['skin', 'heat']));
  });

  it('does what it says when it is followed: mends those checks, worsens none, costs that much', () => {
    const before = statuses(report);
    for (const advice of report.advice) {
      const after = reportOn(mesh, changed(weak, advice.change));
      const now = statuses(after);
      const better = [...now].filter(([id, status]) => status < (before.get(id) ?? 0)).map(([id]) => id);
      expect(better, advice.text).toEqual(advice.mends);
      expect(
        [...now].some(([id, status]) => status > (before.get(id) ?? 0)),
        advice.text,
      ).toBe(false);
      expect(after.print.timeS - report.print.timeS).toBeCloseTo(advice.costS, 3);
      expect(after.print.massG - report.print.massG).toBeCloseTo(advice.costG, 3);
    }
  });

  it('follows what the checks say of layers and sanding too', () => {
    const thick = reportOn(mesh, { ...coarse, print: { layerMm: 0.3 } });
    expect(thick.advice[0]).toMatchObject({ change: { print: { layerMm: 0.2 } }, mends: ['layers'] });
    expect(thick.advice[0].costS).toBeGreaterThan(3600);
    const steep = reportOn(frustum(120, 90, 40, 6), coarse);
    const sand = steep.advice.find(({ change }) => change.print?.sanded);
    expect(sand?.mends).toContain('draft');
    expect(sand).toMatchObject({ costS: 0, costG: 0 });
  });

  it('has nothing to say where all is in order, and when only geometry was asked for', async () => {
    const fine = reportOn(frustum(120, 90, 20, 10), {
      ...coarse,
      print: { sanded: true },
      sheet: { gaugeMm: 0.8, minFormedMm: 0.1 },
      limits: { edgeRadiusGauges: 0 },
    });
    expect(fine.checks.filter(({ status }) => status === 'fail' || status === 'caution')).toEqual([]);
    expect(fine.advice).toEqual([]);
    const { analyse } = await import('@/lib/formability/analyse');
    const { binaryStl } = await import('../../fixtures/meshes/write-stl');
    expect(analyse(binaryStl(mesh), weak, { geometryOnly: true }).report.advice).toEqual([]);
  });
});
