import { describe, expect, it } from 'vitest';
import { defaultRecipe } from '@/lib/formability/recipe';
import { recipeSchema } from '@/lib/formability/recipe-schema';

/** What is said about a recipe, as `path: sentence`. */
const said = (recipe: unknown) =>
  (recipeSchema.safeParse(recipe).error?.issues ?? []).map(
    ({ path, message }) => `${path.join('.')}: ${message}`,
  );

describe('a recipe that is refused', () => {
  it.each([
    [{ print: { infillPercent: 120 } }, 'print.infillPercent: At most 100 %.'],
    [{ print: { nozzleMm: 0 } }, 'print.nozzleMm: At least 0.1 mm.'],
    [{ sheet: { formingC: 900 } }, 'sheet.formingC: At most 400 °C.'],
    [{ machine: { pressureBar: 21 } }, 'machine.pressureBar: At most 20 bar.'],
    [{ machine: { formingAreaMm: [null, 300] } }, 'machine.formingAreaMm.0: Write a figure.'],
    [{ run: { pulls: 20_000 } }, 'run.pulls: At most 10,000.'],
    [{ run: { pulls: 1.5 } }, 'run.pulls: Write a whole number.'],
    [{ run: { cycleS: 0 } }, 'run.cycleS: At least 1 s.'],
    [{ limits: { draftMinDeg: 60 } }, 'limits.draftMinDeg: At most 45°.'],
    [{ grid: { cellMm: 0.00001 } }, 'grid.cellMm: At least 0.0001 mm.'],
  ])('%j is told in our own words', (recipe, sentence) => expect(said(recipe)).toEqual([sentence]));
});

describe('the thinnest allowed place', () => {
  it('must be thinner than the sheet, whose gauge is named', () => {
    const sentence = (gauge: number) =>
      `sheet.minFormedMm: The sheet only thins as it is drawn: write less than its gauge of ${gauge} mm.`;
    expect(said({ sheet: { gaugeMm: 0.5, minFormedMm: 0.6 } })).toEqual([sentence(0.5)]);
    expect(said({ sheet: { gaugeMm: 0.5, minFormedMm: 0.5 } })).toEqual([sentence(0.5)]);
    expect(said({ sheet: { minFormedMm: 2 } })).toEqual([sentence(defaultRecipe().sheet.gaugeMm)]);
    expect(said({ sheet: { gaugeMm: 0.5, minFormedMm: 0.49 } })).toEqual([]);
    expect(said({ sheet: { gaugeMm: 0.2 } })).toEqual([]);
    expect(said(defaultRecipe())).toEqual([]);
  });
});
