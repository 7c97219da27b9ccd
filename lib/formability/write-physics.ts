import { estimateAir } from './measures/estimate-air';
import { estimateHeat } from './measures/estimate-heat';
import { estimateHold } from './measures/estimate-hold';
import { estimateSkin } from './measures/estimate-skin';
import { estimateVentMarks } from './measures/estimate-vent-marks';
import type { EffectiveRecipe } from './recipe';
import type { Point, Report } from './report';
import type { SheetJudgement } from './sheet/judge-sheet';
import type { Part } from './survey-part';

type Physics = Pick<Report, 'sheet' | 'air' | 'ventMarks' | 'heat' | 'skin' | 'wallsUnderPressure'>;

/**
 * Sections of the forming itself: air, vent marks, heat, skin, walls. Estimates, to be proven by a test pull.
 * @param knownAir reckoned before, where the recipe's change does not touch it
 */
export function writePhysics(
  part: Part,
  recipe: EffectiveRecipe,
  geometric: Pick<Report, 'walls' | 'plan'>,
  sheet: SheetJudgement | null,
  knownAir?: Report['air'],
): Physics {
  const { traps, holes, columns, prepared, size } = part;
  const heat = estimateHeat(recipe);
  const { centre } = prepared.mesh;
  const here = (at: Point): Point => [at[0] + centre[0], at[1] + centre[1], at[2]];
  const flow = () =>
    estimateAir(
      recipe,
      { traps, vents: holes.vents, surface: holes.surface, grid: columns.grid },
      recipe.limits.airClearS,
    ).map((one) => ({ ...one, ventPlaces: one.ventPlaces.map(here) }));
  const meanMm = recipe.sheet.gaugeMm / geometric.plan.arealDrawRatio;
  const formed = sheet?.formed;
  // Over a vent as the sheet was formed; without that, its mean.
  const over = ([x, y, z]: Point) => {
    const there = formed ? formed.thicknessAt(x, y, z) : NaN;
    return there > 0 ? there : meanMm;
  };
  return {
    sheet: formed?.report ?? null,
    air: knownAir ?? flow(),
    ventMarks: estimateVentMarks(recipe, holes.vents, (vent) => over(here(vent.at))),
    heat,
    skin: estimateSkin(recipe, heat),
    wallsUnderPressure: estimateHold(recipe, heat, geometric.walls, size),
  };
}
