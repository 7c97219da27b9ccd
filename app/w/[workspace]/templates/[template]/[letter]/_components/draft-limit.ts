import type { FindingView } from '@/lib/review/schemas';
import { limitOf } from './describe-recipe';

/**
 * Least draft (degrees) that the map, the section and the walls are marked by: the one that the draft check held the
 * walls against, with what unsanded layers add; before there is one, the recipe's own.
 */
export function draftLimit(
  findings: readonly Pick<FindingView, 'checkId' | 'limit'>[],
  recipe: Record<string, unknown>,
): number {
  const checked = findings.find(({ checkId, limit }) => checkId === 'draft' && limit !== null)?.limit;
  // Hundredths, downwards: a wall that was drawn with exactly the limit is not marked for its rounding.
  return Math.floor((checked ?? limitOf(recipe, 'draftMinDeg', 5)) * 100 + 1e-6) / 100;
}
