import { estimateHeat } from './measures/estimate-heat';
import { estimateHold } from './measures/estimate-hold';
import { estimateSkin } from './measures/estimate-skin';
import type { EffectiveRecipe } from './recipe';
import type { Point, Report } from './report';

type Physics = Pick<Report, 'heat' | 'skin' | 'wallsUnderPressure'>;

/** Sections that follow from recipe and measured figures alone: heat, skin, walls. Estimates, to be proven by a test pull. */
export function writePhysics(recipe: EffectiveRecipe, report: Pick<Report, 'walls'>, sizeMm: Point): Physics {
  const heat = estimateHeat(recipe);
  return {
    heat,
    skin: estimateSkin(recipe, heat),
    wallsUnderPressure: estimateHold(recipe, heat, report.walls, sizeMm),
  };
}
