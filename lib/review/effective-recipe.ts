import { invalid } from '@/lib/errors/app-error';
import { fillRecipe } from '@/lib/formability/fill-recipe';
import { LIMIT_KEYS } from '@/lib/formability/limits';
import type { EffectiveRecipe } from '@/lib/formability/recipe';
import { UnusableInput } from '@/lib/formability/unusable-input';

/** One reason of the engine, `print.nozzleMm: …`, as a field of the draft. */
function fieldOf(reason: string): { pointer: string; detail: string } {
  const [path, ...rest] = reason.split(': ');
  const pointer = path === 'recipe' ? '/recipe' : `/recipe/${path.replaceAll('.', '/')}`;
  return { pointer, detail: rest.join(': ') };
}

/**
 * The recipe that a revision is posted and judged under: the draft's fields, the studio's limits, the unit in
 * which the file was read (a file's own, where `ownUnit`, whatever the draft says), the engine's defaults elsewhere. Throws `invalid` naming every field that is not right.
 */
export function effectiveRecipe(
  draft: Record<string, unknown>,
  studioLimits: Record<string, number>,
  meshUnit: string,
  ownUnit = false,
): EffectiveRecipe {
  const mesh = (draft.mesh ?? {}) as { unit?: string | null };
  if (!ownUnit && mesh.unit && mesh.unit !== meshUnit)
    throw invalid('The recipe and the file do not agree on the unit of length.', [
      {
        pointer: '/recipe/mesh/unit',
        detail: `The file was read in ${meshUnit}, the recipe says ${mesh.unit}. Set it to ${meshUnit}, or send the file again and say that it is in ${mesh.unit}.`,
      },
    ]);
  const known = new Set<string>(LIMIT_KEYS);
  const limits = Object.fromEntries(Object.entries(studioLimits).filter(([key]) => known.has(key)));
  try {
    return fillRecipe({ ...draft, mesh: { ...mesh, unit: meshUnit }, limits });
  } catch (error) {
    if (!(error instanceof UnusableInput)) throw error;
    throw invalid(
      'Some fields of the recipe are not right. Each says what it needs.',
      error.reasons.map(fieldOf),
    );
  }
}
