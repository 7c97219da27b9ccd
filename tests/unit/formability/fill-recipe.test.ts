import { describe, expect, it } from 'vitest';
import { fillRecipe } from '@/lib/formability/fill-recipe';
import { LIMIT_RULES } from '@/lib/formability/limits';
import { FILAMENTS } from '@/lib/formability/materials/filaments';
import { SHEETS } from '@/lib/formability/materials/sheets';
import { defaultRecipe } from '@/lib/formability/recipe';
import { refusal } from './run-engine';

describe('fillRecipe', () => {
  it('gives the defaults where nothing is said, and takes null for that', () => {
    expect(fillRecipe({})).toEqual(defaultRecipe());
    expect(fillRecipe(undefined)).toEqual(defaultRecipe());
    expect(fillRecipe({ sheet: { formingC: null, gaugeMm: null }, print: null })).toEqual(defaultRecipe());
  });

  it('refuses in one sentence', () => {
    const refused = refusal(() => fillRecipe({ print: { nozzleMm: 0 }, run: { cycleS: 0 } }));
    expect(refused.message).toBe(
      'the recipe cannot be used: print.nozzleMm: At least 0.1 mm; run.cycleS: At least 1 s. Correct these fields.',
    );
  });

  it('takes forming temperature from the sheet and line width from the nozzle', () => {
    expect(fillRecipe({ sheet: { material: 'abs' } }).sheet.formingC).toBe(151.5);
    expect(fillRecipe({ sheet: { material: 'abs', formingC: 160 } }).sheet.formingC).toBe(160);
    expect(fillRecipe({ print: { nozzleMm: 0.6 } }).print.lineMm).toBeCloseTo(0.675, 9);
  });

  it('fills a hole model or limits given in part', () => {
    expect(fillRecipe({ print: { holeModel: { offsetMm: -0.1 } } }).print.holeModel).toEqual({ slope: 1, offsetMm: -0.1, minOpenMm: 0.4 }); // prettier-ignore
    const { limits } = fillRecipe({ limits: { draftMinDeg: 4 } });
    expect(limits.draftMinDeg).toBe(4);
    expect(limits.draftFailDeg).toBe(LIMIT_RULES.draftFailDeg.value);
  });

  it.each([
    ['an unknown sheet', { sheet: { material: 'steel' } }, 'sheet.material: unknown sheet material "steel"'],
    ['an unknown filament', { print: { material: 'wood' } }, 'print.material: unknown filament "wood"'],
    ['a misspelt field', { print: { layer: 0.2 } }, 'print'],
    ['a string for a number', { sheet: { gaugeMm: '0.8' } }, 'sheet.gaugeMm'],
    ['a value out of range', { print: { infillPercent: 120 } }, 'print.infillPercent'],
    ['not a number', { print: { layerMm: NaN } }, 'print.layerMm'],
    ['an unknown unit', { mesh: { unit: 'furlong' } }, 'mesh.unit'],
    ['no direction', { mesh: { up: [0, 0, 0] } }, 'mesh.up'],
    ['an unknown limit', { limits: { beautyMin: 3 } }, 'limits'],
    ['a later schema', { schema: 2 }, 'schema'],
    ['a list', [], 'recipe'],
    ['a word', 'petg', 'recipe'],
  ])('refuses %s and names the field', (_, recipe, where) => {
    const found = refusal(() => fillRecipe(recipe));
    expect(found.code).toBe('invalid_recipe');
    expect(found.message).toContain(where);
  });
});

describe('material tables', () => {
  it('mark every figure and keep the value inside its range', () => {
    for (const material of [...Object.values(SHEETS), ...Object.values(FILAMENTS)]) {
      for (const figure of Object.values(material)) {
        if (typeof figure !== 'object') continue;
        expect(['confirmed', 'memory', 'derived', 'common practice']).toContain(figure.mark);
        if (figure.range)
          expect(figure.value >= figure.range[0] && figure.value <= figure.range[1]).toBe(true);
      }
    }
  });

  it('order the forming window: lower ≤ core ≤ upper', () => {
    for (const sheet of Object.values(SHEETS)) {
      expect(sheet.lowerC.value).toBeLessThan(sheet.formingC.value);
      expect(sheet.formingC.value).toBeLessThan(sheet.upperC.value);
    }
  });
});
