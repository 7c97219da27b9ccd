import { describe, expect, it } from 'vitest';
import { emptiedFigures } from '@/app/w/[workspace]/templates/[template]/post/_components/emptied-figures';
import { recipeResolver } from '@/app/w/[workspace]/templates/[template]/post/_components/recipe-resolver';
import { defaultRecipe } from '@/lib/formability/recipe';

const judge = async (recipe: object) =>
  (await recipeResolver(recipe as never, undefined, { fields: {}, shouldUseNativeValidation: false })).errors;

describe('a figure that was emptied', () => {
  it('is marked where it stands, unless empty has a meaning', async () => {
    const recipe = defaultRecipe();
    expect(emptiedFigures(recipe)).toEqual([]);
    expect(await judge(recipe)).toEqual({});
    const emptied = {
      ...recipe,
      print: { ...recipe.print, infillPercent: null },
      sheet: { ...recipe.sheet, formingC: null },
    };
    expect(emptiedFigures(emptied)).toEqual([['print', 'infillPercent']]);
    expect(await judge(emptied)).toMatchObject({ print: { infillPercent: { message: 'Write a figure.' } } });
    expect((await judge(emptied)).sheet).toBeUndefined();
  });

  it('is marked in a pair too', async () => {
    const recipe = defaultRecipe();
    const errors = await judge({ ...recipe, machine: { ...recipe.machine, formingAreaMm: [450, null] } });
    expect(errors).toMatchObject({ machine: { formingAreaMm: [undefined, { message: 'Write a figure.' }] } });
  });
});
