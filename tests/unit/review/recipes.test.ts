import { describe, expect, it } from 'vitest';
import { AppError } from '@/lib/errors/app-error';
import { fillRecipe } from '@/lib/formability/fill-recipe';
import { DEFAULT_LIMITS } from '@/lib/formability/limits';
import { SHEETS } from '@/lib/formability/materials/sheets';
import { effectiveRecipe } from '@/lib/review/effective-recipe';
import { recipeFromLibrary, recipeFromRevision } from '@/lib/review/prefill-recipe';
import { recipeLines } from '@/lib/review/recipe-lines';

const nothing = { machine: null, printer: null, sheet: null, filament: null };

function refusal(run: () => unknown): AppError {
  try {
    run();
  } catch (error) {
    if (error instanceof AppError) return error;
  }
  throw new Error('it was not refused');
}

describe('a draft’s recipe', () => {
  it('is the engine’s default where the studio’s library is empty, and fills to it', () => {
    const draft = recipeFromLibrary(nothing);
    expect(fillRecipe(draft)).toEqual(fillRecipe({}));
    expect(Object.keys(draft).sort()).toEqual(['costs', 'machine', 'mesh', 'print', 'run', 'sheet']);
  });

  it('lets what follows from other fields follow, unless it was set', () => {
    const usual = recipeFromRevision({ ...fillRecipe({ sheet: { material: 'abs' } }) });
    expect(usual.sheet).not.toHaveProperty('formingC');
    expect(usual.print).not.toHaveProperty('lineMm');
    const set = recipeFromRevision({ ...fillRecipe({ sheet: { material: 'abs', formingC: 140 } }) });
    expect(set.sheet).toMatchObject({ formingC: 140 });
    expect(fillRecipe(usual).sheet.formingC).toBe(SHEETS.abs.formingC.value);
  });
});

describe('the effective recipe', () => {
  it('takes the studio’s limits, drops those that the engine no longer knows, and the file’s unit', () => {
    const recipe = effectiveRecipe({ mesh: { unit: null } }, { draftMinDeg: 9, gone: 1 }, 'in');
    expect(recipe.limits).toEqual({ ...DEFAULT_LIMITS, draftMinDeg: 9 });
    expect(recipe.mesh.unit).toBe('in');
  });

  it('names every field that is not right by its pointer', () => {
    const error = refusal(() =>
      effectiveRecipe(
        { sheet: { gaugeMm: 'thick' }, machine: { formingAreaMm: [1, 300] }, colour: 'red' },
        {},
        'mm',
      ),
    );
    expect(error.code).toBe('invalid');
    expect(error.errors.map(({ pointer }) => pointer).sort()).toEqual([
      '/recipe',
      '/recipe/machine/formingAreaMm/0',
      '/recipe/sheet/gaugeMm',
    ]);
    expect(error.errors.every(({ detail }) => detail.length > 5)).toBe(true);
  });

  it('refuses a unit that is not the one the file was read in', () => {
    const error = refusal(() => effectiveRecipe({ mesh: { unit: 'in' } }, {}, 'mm'));
    expect(error.errors).toEqual([
      {
        pointer: '/recipe/mesh/unit',
        detail:
          'The file was read in mm, the recipe says in. Set it to mm, or send the file again and say that it is in in.',
      },
    ]);
  });

  it('lets the unit of a file that names its own stand against the draft’s', () => {
    expect(effectiveRecipe({ mesh: { unit: 'in' } }, {}, 'mm', true).mesh.unit).toBe('mm');
  });
});

describe('a recipe in words', () => {
  it('says materials by name and figures with units', () => {
    const lines = recipeLines({ ...fillRecipe({ sheet: { material: 'hips', gaugeMm: 1.2 } }) });
    expect(lines[0]).toEqual({ label: 'Sheet', value: 'HIPS, 1.2 mm' });
    expect(lines.every(({ label, value }) => label && value && !/undefined|NaN/.test(value))).toBe(true);
    const of = (label: string) => lines.find((line) => line.label === label)?.value;
    expect(of('Rates')).toBe('25 per kg, 1.5 per hour, 7.5 for handling, in the studio’s currency');
    expect(of('Holes print')).toBe('1 × drawn − 0.2 mm, open from 0.4 mm');
    expect(of('Clamp frame')).toBe('30 mm of free sheet round the template');
    expect(of('Limits')).toBe('as the engine has them');
  });

  it('names the limits that the studio moved', () => {
    const lines = recipeLines({ ...fillRecipe({ limits: { draftMinDeg: 9 } }) });
    expect(lines.find(({ label }) => label === 'Limits')?.value).toMatch(/draft.*: 9 deg$/);
  });
});
