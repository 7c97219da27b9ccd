import { SHEETS } from './materials/sheets';
import { defaultRecipe, type EffectiveRecipe, type RecipeInput } from './recipe';
import { recipeSchema } from './recipe-schema';
import { UnusableInput } from './unusable-input';

/** Bead width of a nozzle where the recipe gives none: nozzle × 1.125 (common practice, no source). */
const LINE_PER_NOZZLE = 1.125;

function fillFrom<T extends object>(defaults: T, given: { [K in keyof T]?: unknown } | null | undefined): T {
  const filled = { ...defaults };
  for (const key of Object.keys(given ?? {}) as (keyof T)[]) {
    const value = given?.[key];
    if (value !== null && value !== undefined) filled[key] = value as T[keyof T];
  }
  return filled;
}

/**
 * The effective recipe: what was given, defaults elsewhere.
 * @throws UnusableInput `invalid_recipe` naming every field that is unknown, of the wrong kind or out of range.
 */
export function fillRecipe(given: RecipeInput | unknown): EffectiveRecipe {
  const parsed = recipeSchema.safeParse(given ?? {});
  if (!parsed.success) {
    const reasons = parsed.error.issues.map(
      (issue) => `${issue.path.join('.') || 'recipe'}: ${issue.message}`,
    );
    throw new UnusableInput('invalid_recipe', `the recipe cannot be used: ${reasons.map((one) => one.replace(/\.$/, '')).join('; ')}. Correct these fields.`, reasons); // prettier-ignore
  }
  const input = parsed.data;
  const base = defaultRecipe();
  const sheet = fillFrom(base.sheet, input.sheet);
  const print = fillFrom(base.print, input.print);
  if (input.sheet?.formingC == null) sheet.formingC = SHEETS[sheet.material].formingC.value;
  if (input.print?.lineMm == null) print.lineMm = Number((print.nozzleMm * LINE_PER_NOZZLE).toFixed(4));
  return {
    schema: 1,
    mesh: fillFrom(base.mesh, input.mesh),
    machine: fillFrom(base.machine, input.machine),
    sheet,
    print: { ...print, holeModel: fillFrom(base.print.holeModel, input.print?.holeModel) },
    run: fillFrom(base.run, input.run),
    grid: fillFrom(base.grid, input.grid),
    costs: fillFrom(base.costs, input.costs),
    limits: fillFrom(base.limits, input.limits as Record<string, unknown> | null | undefined),
  };
}
