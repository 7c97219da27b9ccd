import { describe, expect, it } from 'vitest';
import { checkSheet } from '@/lib/formability/checks/check-sheet';
import { fillRecipe } from '@/lib/formability/fill-recipe';
import { formSheet } from '@/lib/formability/sheet/form-sheet';
import { judgeSheet, type SheetJudgement } from '@/lib/formability/sheet/judge-sheet';
import type { Part } from '@/lib/formability/survey-part';
import { block, field } from './templates';

const template = field([60, 40], block(60, 40, 16, 8));

/** What the sheet needs of a surveyed part: its middle lies at 100, −50 in the file. */
const part = {
  columns: {
    grid: {
      cell: template.cellMm,
      nx: template.nx,
      ny: template.ny,
      x0: template.originX,
      y0: template.originY,
    },
  },
  holes: { surface: template.heights },
  prepared: { mesh: { centre: [100, -50] } },
  size: [60, 40, 16],
} as unknown as Part;

const recipeOf = (gaugeMm: number, minFormedMm: number) =>
  fillRecipe({ sheet: { gaugeMm, minFormedMm }, grid: { sheetNodes: 32 } });

describe('the sheet over a surveyed part', () => {
  const thick = recipeOf(2, 0.3);
  const judged = judgeSheet(part, thick, [100, 80]);

  it('is formed in the file’s own frame', () => {
    const plain = formSheet(
      { template, frameMm: [100, 80], gaugeMm: 2, minFormedMm: 0.3, centreMm: [0, 0] },
      { nodes: 32 },
    );
    expect(judged.formed!.report.q05Mm).toBeCloseTo(plain.report.q05Mm, 6);
    expect(judged.formed!.thicknessAt(100, -50)).toBeCloseTo(2, 6);
    expect(Math.abs(judged.formed!.report.minAt[0] - 100)).toBeLessThan(50);
    expect(judged.formed!.report.nodes).toEqual([33, 25]);
  });

  it('passes with the margin counted in, and then wants no remedy', () => {
    expect(judged.remedy).toBeNull();
    const check = checkSheet({ recipe: thick, sheet: judged })!;
    expect(check).toMatchObject({ id: 'sheet', status: 'pass', limit: 0.3, unit: 'mm', remedy: '' });
    const { minMm, marginPercent } = judged.formed!.report.part!;
    expect(check.measured).toBe(minMm);
    const least = (minMm * (1 - marginPercent / 100)).toFixed(2).replace(/0$/, '');
    expect(check.message).toContain(
      `with the model’s margin of ${marginPercent} % it is ${least} mm at least`,
    );
    expect(check.message).toContain('An estimate; prove it with a test pull.');
  });

  it('cautions within the margin, fails below the limit, with a gauge whose own run is enough', () => {
    const { minMm, marginPercent } = judged.formed!.report.part!;
    const near = recipeOf(2, minMm * (1 - marginPercent / 200));
    const caution = judgeSheet(part, near, [100, 80]);
    expect(checkSheet({ recipe: near, sheet: caution })!.status).toBe('caution');
    const far = recipeOf(2, minMm * 1.2);
    const fail = judgeSheet(part, far, [100, 80]);
    const check = checkSheet({ recipe: far, sheet: fail })!;
    expect(check.status).toBe('fail');
    expect(fail.remedy!.gaugeMm).toBeGreaterThan(2);
    expect(fail.remedy!.minMm).toBeGreaterThanOrEqual(fail.neededMm);
    expect(check.remedy).toMatch(/^Take a gauge of \d/);
    const mended = recipeOf(fail.remedy!.gaugeMm!, minMm * 1.2);
    expect(checkSheet({ recipe: mended, sheet: judgeSheet(part, mended, [100, 80]) })!.status).toBe('pass');
  });

  it('is cautious where the run is not to be relied on', () => {
    const shaken = (
      change: object,
      outcome: 'not-settled' | 'converged' | 'volume-lost' = 'converged',
    ): SheetJudgement => ({
      ...judged,
      formed: { ...judged.formed!, outcome, report: { ...judged.formed!.report, ...change } },
    });
    const say = (sheet: SheetJudgement) => checkSheet({ recipe: thick, sheet })!;
    expect(say(shaken({}, 'not-settled'))).toMatchObject({
      status: 'caution',
      message: expect.stringContaining('did not settle'),
    });
    expect(say(shaken({}, 'volume-lost'))).toMatchObject({
      status: 'caution',
      message: expect.stringContaining('lost sheet volume'),
    });
    const { part } = judged.formed!.report;
    expect(say(shaken({ part: { ...part, meshErrorPercent: 60 } }))).toMatchObject({
      status: 'caution',
      message: expect.stringContaining('differs there by 60 %'),
    });
    expect(say(shaken({ unclosedAreaMm2: 900 }))).toMatchObject({
      status: 'caution',
      message: expect.stringContaining('does not close onto the template'),
    });
    // Whatever asks for a look says what would help.
    const webAt = {
      ...shaken({ unclosedAreaMm2: 900 }).formed!,
      webAt: [1, 2, 3] as [number, number, number],
    };
    expect(say({ ...judged, formed: webAt }).remedy).toBe(
      'So that the sheet closes at x 1, y 2, z 3, give it a wider gap, less height or more draft beside it, or a larger radius.',
    );
    for (const unsure of [
      shaken({}, 'not-settled'),
      shaken({}, 'volume-lost'),
      shaken({ part: { ...part, meshErrorPercent: 60 } }),
    ])
      // prettier-ignore
      expect(say(unsure).remedy).toContain('on a finer grid (grid.sheetNodes 64 on the command line), or measure it');
    // A foot for which no usual gauge does is told so, not sent for 9 mm of sheet.
    const radius = { radiusMm: null, triedMm: 8, minMm: 0.05, runs: 0 };
    const foot = (gaugeMm: number) => say({ ...judged, footRemedy: { gaugeMm, radius } }).remedy;
    expect(foot(8)).toContain('or take a gauge of 8 mm.');
    expect(foot(8.05)).toContain('does not do it (8 mm would leave about 0.05 mm), nor does a usual gauge.');
    const sliver = say(shaken({ part: { ...part, minMm: 0.004 }, foot: { ...part, minMm: 0.002 } })).message;
    expect(sliver).toContain('forms to less than 0.01 mm at its thinnest');
    expect(sliver).toMatch(/it is next to nothing, against .* thins to less than 0.01 mm\./);
    // One mesh alone below the limit is no failure; both of them are.
    const thinPart = { ...part, minMm: 0.25, q05Mm: 0.4 };
    expect(say(shaken({ part: { ...thinPart, meshErrorPercent: 50 } })).status).toBe('caution');
    expect(say(shaken({ part: { ...thinPart, meshErrorPercent: 10 } })).status).toBe('fail');
  });

  it('tells the foot apart: too thin there is for a look, with what to do about it', () => {
    const steep = { ...part, holes: { surface: field([60, 40], block(60, 40, 16, 1)).heights } } as Part;
    const bare = judgeSheet(steep, recipeOf(1, 0.01), [100, 80]).formed!.report;
    expect(bare.foot!.minMm).toBeLessThan(bare.part!.minMm);
    expect(bare.foot!.minAt[2]).toBeLessThanOrEqual(bare.footHeightMm);
    expect(bare.part!.minAt[2]).toBeGreaterThan(bare.footHeightMm);
    // Between the two, and with room for the margin above the foot.
    const wanted = bare.foot!.minMm * 1.02;
    const recipe = recipeOf(1.6 * 1, wanted * 1.6);
    const seen = judgeSheet(steep, recipe, [100, 80]);
    const check = checkSheet({ recipe, sheet: seen })!;
    expect(check.status).toBe('caution');
    expect(check.measured).toBe(seen.formed!.report.part!.minMm);
    expect(check.message).toContain('usually trimmed off');
    expect(check.remedy).toContain('the thin foot is waste');
    const { radiusMm, minMm } = seen.footRemedy!.radius;
    expect(radiusMm).toBeGreaterThan(1.5);
    expect(minMm).toBeGreaterThanOrEqual(wanted * 1.6);
    expect(check.places).toHaveLength(2);
  });

  it('says so where no gauge mends it', () => {
    const recipe = recipeOf(2, 1.99);
    const hopeless = checkSheet({ recipe, sheet: judgeSheet(part, recipe, [66, 46]) })!;
    expect(hopeless.status).toBe('fail');
    expect(hopeless.remedy).toMatch(/^No usual gauge mends this: .* would take about \d+(\.\d)? mm of sheet/);
  });

  it('is not formed in a frame without room, and says along which side', () => {
    const tight = judgeSheet(part, thick, [60, 80]);
    expect(tight).toMatchObject({ formed: null, remedy: null });
    const check = checkSheet({ recipe: thick, sheet: tight })!;
    expect(check).toMatchObject({ status: 'not-run', measured: null });
    expect(check.message).toMatch(/leaves no room round the template along x\.$/);
    expect(checkSheet({ recipe: thick, sheet: null })).toBeNull();
  });
});
