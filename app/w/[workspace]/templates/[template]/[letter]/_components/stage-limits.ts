import type { FindingView } from '@/lib/review/schemas';
import type { StageLimits } from '@/lib/stage-model/map-scale';
import { limitOf } from './describe-recipe';
import { draftLimit } from './draft-limit';

type Finding = Pick<FindingView, 'checkId' | 'limit'>;

/**
 * What the maps of the model are held against: the limits that the checks used, before there is one the recipe's own.
 * Steps do not matter on a template that is sanded.
 */
export function stageLimits(findings: readonly Finding[], recipe: Record<string, unknown>): StageLimits {
  const print = (recipe.print ?? {}) as Record<string, unknown>;
  const { layerMm, sanded } = print;
  const { minFormedMm } = (recipe.sheet ?? {}) as Record<string, unknown>;
  return {
    draftDeg: draftLimit(findings, recipe),
    layerMm: typeof layerMm === 'number' && layerMm > 0 ? layerMm : null,
    stepMm: sanded === true ? null : limitOf(recipe, 'cuspMaxMm', 0.1),
    wallMm: findings.find(({ checkId }) => checkId === 'shell')?.limit ?? limitOf(recipe, 'shellMinMm', 3),
    sheetMm: typeof minFormedMm === 'number' && minFormedMm > 0 ? minFormedMm : null,
  };
}
