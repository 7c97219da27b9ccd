import { describe, expect, it } from 'vitest';
import { fillRecipe } from '@/lib/formability/fill-recipe';
import { LIMIT_KEYS, type LimitKey } from '@/lib/formability/limits';
import { defaultRecipe, MM_PER_UNIT } from '@/lib/formability/recipe';
import { recipeSchema } from '@/lib/formability/recipe-schema';

describe('the recipe that stands where nothing is said', () => {
  it('is the one that the contract names', () => {
    expect(defaultRecipe()).toMatchObject({
      schema: 1,
      mesh: { unit: 'mm', up: [0, 0, 1], dropToBed: true },
      machine: {
        formingAreaMm: [450, 300],
        maxHeightMm: 120,
        frameMarginMm: 30,
        frameMm: null,
        pressureBar: 4,
        ventedBed: true,
      },
      // 144.5 °C: the middle of 140 to 149.
      sheet: { material: 'petg', gaugeMm: 0.8, formingC: 144.5, minFormedMm: 0.35 },
      print: {
        material: 'pa12-cf',
        nozzleMm: 0.4,
        layerMm: 0.15,
        shellMm: 4,
        topMm: 4,
        infillPercent: 35,
        infillPattern: 'grid',
        lineMm: 0.45,
        sanded: false,
        releaseAgent: 'dry-ptfe',
        holeModel: { slope: 1, offsetMm: -0.2, minOpenMm: 0.4 },
      },
      run: { pulls: 50, cycleS: 90, ambientC: 23 },
      grid: { cellMm: null, sheetNodes: 128 },
      // Example rates, to be replaced by the studio's own.
      costs: { materialPerKg: 25, machinePerHour: 1.5, labour: 7.5 },
    });
  });

  it('lays lines of 1.125 nozzles (common practice, no source)', () => {
    expect(fillRecipe({ print: { nozzleMm: 0.8 } }).print.lineMm).toBe(0.9);
  });
});

it('units are those of the 3MF core specification, §3.4', () => {
  expect(MM_PER_UNIT).toEqual({ mm: 1, cm: 10, m: 1000, in: 25.4, ft: 304.8, micron: 0.001 });
});

describe('what a recipe may say', () => {
  /** Least and greatest of each field. */
  const RANGES: [field: string, least: number, greatest: number][] = [
    ['machine.maxHeightMm', 1, 2000],
    ['machine.frameMarginMm', 0, 500],
    ['machine.pressureBar', 0, 20],
    ['sheet.gaugeMm', 0.05, 20],
    ['sheet.formingC', 20, 400],
    ['print.nozzleMm', 0.1, 3],
    ['print.layerMm', 0.01, 2],
    ['print.shellMm', 0.1, 200],
    ['print.topMm', 0.1, 200],
    ['print.infillPercent', 0, 100],
    ['print.lineMm', 0.05, 5],
    ['print.holeModel.slope', 0.1, 10],
    ['print.holeModel.offsetMm', -5, 5],
    ['print.holeModel.minOpenMm', 0, 10],
    ['run.cycleS', 1, 86_400],
    ['run.ambientC', -40, 100],
    ['grid.cellMm', 1e-4, 1000],
    ['costs.materialPerKg', 0, 100_000],
    ['costs.machinePerHour', 0, 100_000],
    ['costs.labour', 0, 1_000_000],
  ];
  const nest = (field: string, value: unknown): object =>
    field.split('.').reduceRight<unknown>((inner, key) => ({ [key]: inner }), value) as object;
  const taken = (recipe: object) => recipeSchema.safeParse(recipe).success;

  it.each(RANGES)('%s from %s to %s', (field, least, greatest) => {
    // The thinnest place may be thin, so that the gauge alone is judged.
    const withThin = (value: number) => {
      const recipe = nest(field, value) as { sheet?: object };
      return recipe.sheet ? { sheet: { ...recipe.sheet, minFormedMm: 0 } } : recipe;
    };
    expect([taken(withThin(least)), taken(withThin(greatest))]).toEqual([true, true]);
    const beyond = [least - Math.abs(least || 1) * 1e-3, greatest * 1.001];
    expect(beyond.map((value) => taken(withThin(value)))).toEqual([false, false]);
  });

  it('machine.formingAreaMm from 10 to 5000, machine.frameMm from 1 to 5000', () => {
    for (const [field, least] of [
      ['machine.formingAreaMm', 10],
      ['machine.frameMm', 1],
    ] as const) {
      // prettier-ignore
      expect(taken(nest(field, [least, 5000]))).toBe(true);
      for (const pair of [
        [least - 0.01, 90],
        [90, least - 0.01],
        [5000.1, 90],
        [90, 5000.1],
      ])
        // prettier-ignore
        expect(taken(nest(field, pair)), `${field} ${pair}`).toBe(false);
    }
  });

  it('sheet.minFormedMm from 0 to below the gauge, 20 at most', () => {
    const thin = (minFormedMm: number) => taken({ sheet: { gaugeMm: 20, minFormedMm } });
    expect([thin(0), thin(19.999), thin(20), thin(-0.001)]).toEqual([true, true, false, false]);
    const refused = recipeSchema.safeParse({ sheet: { gaugeMm: 20, minFormedMm: 20.1 } }).error?.issues;
    expect(refused?.map(({ message }) => message)).toContain('At most 20 mm.');
  });

  it('run.pulls from 1 to 10,000 and grid.sheetNodes from 8 to 1024, whole', () => {
    expect([1, 10_000].map((pulls) => taken({ run: { pulls } }))).toEqual([true, true]);
    expect([0, 10_001, 2.5].map((pulls) => taken({ run: { pulls } }))).toEqual([false, false, false]);
    expect([8, 1024].map((sheetNodes) => taken({ grid: { sheetNodes } }))).toEqual([true, true]);
    expect([7, 1025, 64.5].map((sheetNodes) => taken({ grid: { sheetNodes } }))).toEqual([false, false, false]); // prettier-ignore
  });

  it('schema 1 and no other', () => {
    expect([1, 2].map((schema) => taken({ schema }))).toEqual([true, false]);
  });

  it('mesh.up longer than a millionth', () => {
    const up = (z: number) => taken({ mesh: { up: [0, 0, z] } });
    expect([up(1.005e-6), up(0.995e-6)]).toEqual([true, false]);
  });
});

describe('limits that a studio moves', () => {
  /** Least and greatest that a recipe may say. */
  const RANGES: Record<LimitKey, [least: number, greatest: number]> = {
    draftMinDeg: [0, 45],
    draftFailDeg: [0, 45],
    layerGrooveMm: [0, 0.2],
    undercutDepthMm: [0, 20],
    layerMaxMm: [0.01, 1],
    layerMinMm: [0.01, 1],
    cuspMaxMm: [0.001, 1],
    arealDrawMax: [1, 20],
    arealDrawFail: [1, 20],
    depthRatioMax: [0.05, 10],
    linearDrawMax: [1, 20],
    heightOverGapMax: [0.05, 10],
    edgeRadiusGauges: [0, 10],
    airClearS: [0.01, 30],
    shellMinMm: [0.2, 50],
    shellMaxMm: [0.2, 100],
    largeTemplateMm: [10, 2000],
    smallTemplateMm: [5, 1000],
    overhangDeg: [10, 80],
    releaseDraftDeg: [0, 45],
  };
  const taken = (key: LimitKey, value: number) =>
    recipeSchema.safeParse({ limits: { [key]: value } }).success;

  it.each(LIMIT_KEYS)('%s may go from end to end of its range and no further', (key) => {
    const [least, greatest] = RANGES[key];
    expect([taken(key, least), taken(key, greatest)]).toEqual([true, true]);
    expect([taken(key, least - 1e-6), taken(key, greatest + 1e-6)]).toEqual([false, false]);
  });
});
