import { describe, expect, it } from 'vitest';
import { candidateChanges } from '@/lib/formability/candidate-changes';
import { fillRecipe } from '@/lib/formability/fill-recipe';
import { FILAMENTS } from '@/lib/formability/materials/filaments';
import type { RecipeInput } from '@/lib/formability/recipe';
import type { CheckId } from '@/lib/formability/report';

type Known = Parameters<typeof candidateChanges>[1];

/** Figures of a template that only those asked for make bad. */
const FIGURES = {
  heat: { cycleThatHoldsS: null, pullsBeforeRest: 0, contactC: 60, peakC: [60] },
  skin: { topThatHoldsMm: 2, infillThatHoldsPercent: 20 },
  layers: { cuspMaxMm: 0.05 },
  plan: { arealDrawRatio: 2 },
  wallsUnderPressure: { empty: false },
};

/** The changes that are tried where one check fails. */
function tried(id: CheckId, recipe: RecipeInput = {}, figures: object = {}, provenMm?: number) {
  const known = { ...FIGURES, ...figures } as unknown as Known;
  return candidateChanges(fillRecipe(recipe), known, new Map([[id, 'fail']]), provenMm).map(
    ({ change }) => change,
  );
}

describe('changes that are tried', () => {
  it('for heat: the cycle and the pulls that hold, and filaments that do', () => {
    const heat = { ...FIGURES.heat, cycleThatHoldsS: 140, pullsBeforeRest: 7 };
    const changes = tried('heat', { print: { material: 'petg' } }, { heat });
    expect(changes.slice(0, 2)).toEqual([{ run: { cycleS: 140 } }, { run: { pulls: 7 } }]);
    const named = changes.slice(2).map((change) => change.print?.material);
    expect(named).toContain('pps-cf');
    expect(named.every((id) => id! in FILAMENTS && id !== 'petg' && id !== 'resin-ht')).toBe(true);
  });

  it('for a soft skin: a top in tenths of a millimetre, up to four times as thick', () => {
    const top = (topThatHoldsMm: number) =>
      tried('skin', { print: { topMm: 5 } }, { skin: { topThatHoldsMm, infillThatHoldsPercent: null } })
        .map((change) => change.print?.topMm)
        .filter((mm) => mm !== undefined);
    // 15.03 up to 15.1; steps of 0.101 mm would say 15.049.
    expect(top(15.03)).toContain(15.1);
    expect(top(19.94)).toContain(20);
    expect(top(20.05)).toEqual([]);
  });

  it('for a soft skin: the infill that holds, up to 100 %; 35 % where it is below 25 %', () => {
    const infill = (percent: number, holds: number) =>
      tried(
        'skin',
        { print: { infillPercent: percent } },
        { skin: { topThatHoldsMm: 2, infillThatHoldsPercent: holds } },
      )
        .map((change) => change.print?.infillPercent)
        .filter((value) => value !== undefined);
    expect(infill(40, 99.5)).toEqual([100]);
    expect(infill(40, 100.5)).toEqual([]);
    expect(infill(25, 20)).toEqual([]);
    expect(infill(24.9, 20)).toEqual([35]);
  });

  it('for walls of an empty print: 25 % of infill', () => {
    const figures = {
      skin: { topThatHoldsMm: null, infillThatHoldsPercent: null },
      wallsUnderPressure: { empty: true },
    };
    const changes = tried('walls', { print: { infillPercent: 0 } }, figures);
    expect(changes).toContainEqual({ print: { infillPercent: 25 } });
  });

  it('for the shell: the ends and the middle of 3 to 5 mm', () => {
    const shells = tried('shell', { print: { shellMm: 2 } }).flatMap((change) => change.print?.shellMm ?? []);
    expect(shells).toEqual([3, 4, 5]);
  });

  it('for layers: sanding, the layer for the wanted cusp in hundredths, 0.1 and 0.2 mm', () => {
    const layers = (layerMm: number, cuspMaxMm: number, nozzleMm = 0.4) =>
      tried('layers', { print: { layerMm, nozzleMm } }, { layers: { cuspMaxMm } }).map(
        (change) => change.print?.layerMm ?? 'sanded',
      );
    // 0.15 × 0.1 / 0.125 = 0.12 mm.
    expect(layers(0.15, 0.1249)).toEqual(['sanded', 0.12, 0.1, 0.2]);
    // 0.04 mm is the finest that is tried: 0.15 × 0.1 / 0.3749 = 0.04001, / 0.3751 = 0.03999 mm.
    expect(layers(0.15, 0.3749)).toEqual(['sanded', 0.04, 0.1, 0.2]);
    expect(layers(0.15, 0.3751)).toEqual(['sanded', 0.1, 0.2]);
    const thinnest = (layerMinMm: number) =>
      tried('layers', { limits: { layerMinMm } }).flatMap((change) => change.print?.layerMm ?? []);
    expect([thinnest(0.0402), thinnest(0.0398)]).toEqual([[0.3, 0.0402, 0.2], [0.3, 0.2]]); // prettier-ignore
    // No layer is thicker than 0.8 nozzles: 0.2 mm from 0.25 mm on.
    expect(layers(0.15, 0.1249, 0.2505)).toContain(0.2);
    expect(layers(0.15, 0.1249, 0.2495)).not.toContain(0.2);
  });

  it('for the gauge: the proven one, the one that averages the wanted thickness, a quarter and a half more', () => {
    const gauges = (recipe: RecipeInput, proven?: number, arealDrawRatio = 2) =>
      tried('draw', recipe, { plan: { arealDrawRatio } }, proven).map((change) => change.sheet?.gaugeMm);
    // 0.5 × 2.405 = 1.2025, up to 1.25; 1.25 × 0.8 = 1; 1.5 × 0.8 = 1.2.
    expect(gauges({ sheet: { gaugeMm: 0.8, minFormedMm: 0.5 } }, 1.35, 2.405)).toEqual([1.35, 1.25, 1, 1.2]);
    // 1.25 × 10.04 = 12.55 and 1.5 × 10.04 = 15.06, to the next 0.05 mm.
    expect(gauges({ sheet: { gaugeMm: 10.04, minFormedMm: 0.35 } })).toEqual([12.55, 15.05]);
  });

  it('for the nozzle: those that are sold (common practice, no source) and lay the layer within 0.8 of their width', () => {
    const nozzles = (layerMm: number) =>
      tried('nozzle', { print: { nozzleMm: 0.5, layerMm } }).map((change) => change.print?.nozzleMm);
    expect(nozzles(0.1)).toEqual([0.25, 0.4, 0.6, 0.8]);
    expect([nozzles(0.1995), nozzles(0.2005)]).toEqual([[0.25, 0.4, 0.6, 0.8], [0.4, 0.6, 0.8]]); // prettier-ignore
  });

  it('for the release: a dry PTFE film where the recipe has none', () => {
    const agent = (releaseAgent: 'none' | 'dry-ptfe') => tried('release', { print: { releaseAgent } });
    expect(agent('none')).toEqual([{ print: { releaseAgent: 'dry-ptfe' } }]);
    expect(agent('dry-ptfe')).toEqual([]);
  });

  it('nothing where every check passes', () => {
    expect(candidateChanges(fillRecipe({}), FIGURES as unknown as Known, new Map())).toEqual([]);
  });
});
