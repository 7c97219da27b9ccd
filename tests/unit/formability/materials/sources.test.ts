import { describe, expect, it } from 'vitest';
import { analyse } from '@/lib/formability/analyse';
import { fillRecipe } from '@/lib/formability/fill-recipe';
import { FILAMENTS, FILAMENT_IDS } from '@/lib/formability/materials/filaments';
import { SHEETS } from '@/lib/formability/materials/sheets';
import type { MaterialValue } from '@/lib/formability/materials/value';
import { frustum } from '../../../fixtures/meshes/solids';
import { binaryStl } from '../../../fixtures/meshes/write-stl';
import { refusal } from '../run-engine';

const valuesOf = (material: object): [string, MaterialValue][] =>
  Object.entries(material).filter((entry): entry is [string, MaterialValue] => typeof entry[1] === 'object');

describe('tables of materials', () => {
  it.each([
    ...Object.entries(FILAMENTS),
    ...Object.entries(SHEETS).map(([id, one]) => [`sheet ${id}`, one] as const),
  ])(
    '%s: every value has a unit, a source or says that it is from memory, and a range that holds it',
    (_, material) => {
      const values = valuesOf(material);
      expect(values.length).toBeGreaterThanOrEqual(9);
      for (const [name, { value, range, unit, source, mark }] of values) {
        expect(Number.isFinite(value), name).toBe(true);
        expect(unit, name).not.toBe('');
        expect(source.length, name).toBeGreaterThan(10);
        expect(mark, name).toBe(source === 'from memory' ? 'memory' : 'confirmed');
        if (range) expect(range[0] <= value && value <= range[1], name).toBe(true);
      }
    },
  );

  it('across its layers a filament is no stronger than along, and hot it deflects earlier under more load', () => {
    for (const id of FILAMENT_IDS) {
      const { strengthXyMPa, strengthZMPa, hdtAC, hdtBC } = FILAMENTS[id];
      expect(strengthZMPa.value, id).toBeLessThanOrEqual(strengthXyMPa.value);
      expect(hdtAC.value, id).toBeLessThan(hdtBC.value);
    }
  });
});

describe('a material that is not in the library is an error, never a default', () => {
  it.each([
    [
      { print: { material: 'unobtainium' } },
      'print.material: unknown filament "unobtainium"; the library has pla, petg',
    ],
    [
      { sheet: { material: 'vellum' } },
      'sheet.material: unknown sheet material "vellum"; the library has hips, petg',
    ],
    [{ print: { material: '' } }, 'unknown filament ""'],
    [{ sheet: { material: 'PETG' } }, 'unknown sheet material "PETG"'],
    [{ sheet: { material: 'pa12-cf' } }, 'unknown sheet material'],
    [{ print: { material: 'constructor' } }, 'unknown filament'],
    [{ print: { material: '__proto__' } }, 'unknown filament'],
  ])('%j', (recipe, message) => {
    const { code, message: said } = refusal(() => analyse(binaryStl(frustum(40, 40, 10, 8)), recipe));
    expect(code).toBe('invalid_recipe');
    expect(said).toContain(message);
  });

  it('left out, the default is named in the effective recipe', () => {
    expect(fillRecipe({})).toMatchObject({ sheet: { material: 'petg' }, print: { material: 'pa12-cf' } });
    expect(fillRecipe({ sheet: { material: null } }).sheet.material).toBe('petg');
  });
});
