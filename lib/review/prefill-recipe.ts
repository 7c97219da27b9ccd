import { fillRecipe } from '@/lib/formability/fill-recipe';
import { SHEETS, type SheetId } from '@/lib/formability/materials/sheets';
import type { RecipeInput } from '@/lib/formability/recipe';
import type { LibraryDefaults } from './library-data';

type Section = Record<string, unknown>;

/**
 * A recipe as a form begins with it: every field filled, except those that follow from others while they are
 * left empty (forming temperature, bead width) and those that are not the designer's (limits, unit of the file).
 */
function asForm(recipe: Record<string, unknown>): Record<string, unknown> {
  const { schema: _schema, limits: _limits, grid: _grid, mesh, sheet, print, ...rest } = recipe;
  const { unit: _unit, ...stands } = mesh as Section;
  const { formingC, ...sheetRest } = sheet as Section & { material: SheetId };
  const { lineMm: _lineMm, ...printRest } = print as Section;
  const usual = SHEETS[sheetRest.material]?.formingC.value;
  const sheetForm = formingC === usual ? sheetRest : { ...sheetRest, formingC };
  return { ...rest, mesh: stands, sheet: sheetForm, print: printRest };
}

/** The first draft of a template: what the studio's library has as its defaults, the engine's elsewhere. */
export function recipeFromLibrary({
  machine,
  printer,
  sheet,
  filament,
}: LibraryDefaults): Record<string, unknown> {
  const given: RecipeInput = {
    machine: machine
      ? {
          formingAreaMm: [machine.formingXMm, machine.formingYMm],
          maxHeightMm: machine.maxHeightMm,
          frameMarginMm: machine.frameMarginMm,
          pressureBar: machine.pressureBar,
        }
      : {},
    sheet: sheet ? { material: sheet.material, gaugeMm: sheet.gaugeMm, minFormedMm: sheet.minFormedMm } : {},
    print: {
      ...(printer ? { nozzleMm: printer.nozzleMm, layerMm: printer.layerMm } : {}),
      ...(filament
        ? {
            material: filament.material,
            shellMm: filament.shellMm,
            topMm: filament.topMm,
            infillPercent: filament.infillPercent,
          }
        : {}),
    },
  };
  return asForm({ ...fillRecipe(given) });
}

/** A later draft begins where the revision before it stands. */
export const recipeFromRevision = (body: Record<string, unknown>): Record<string, unknown> => asForm(body);
