import { estimateAir } from './measures/estimate-air';
import { estimateHeat } from './measures/estimate-heat';
import { estimateHold } from './measures/estimate-hold';
import { estimateSkin } from './measures/estimate-skin';
import { estimateVentMarks } from './measures/estimate-vent-marks';
import type { EffectiveRecipe } from './recipe';
import type { Point, Report } from './report';
import type { Part } from './survey-part';

type Physics = Pick<Report, 'air' | 'ventMarks' | 'heat' | 'skin' | 'wallsUnderPressure'>;

/** Sections of the forming itself: air, vent marks, heat, skin, walls. Estimates, to be proven by a test pull. */
export function writePhysics(
  part: Part,
  recipe: EffectiveRecipe,
  geometric: Pick<Report, 'walls' | 'plan'>,
): Physics {
  const { traps, holes, columns, prepared, size } = part;
  const heat = estimateHeat(recipe);
  const { centre } = prepared.mesh;
  const here = (at: Point): Point => [at[0] + centre[0], at[1] + centre[1], at[2]];
  const flows = estimateAir(
    recipe,
    { traps, vents: holes.vents, surface: holes.surface, grid: columns.grid },
    recipe.limits.airClearS,
  );
  // Without a run of the sheet the formed thickness is taken to be its mean.
  const meanMm = recipe.sheet.gaugeMm / geometric.plan.arealDrawRatio;
  return {
    air: flows.map((flow) => ({ ...flow, ventPlaces: flow.ventPlaces.map(here) })),
    ventMarks: estimateVentMarks(recipe, holes.vents, () => meanMm),
    heat,
    skin: estimateSkin(recipe, heat),
    wallsUnderPressure: estimateHold(recipe, heat, geometric.walls, size),
  };
}
