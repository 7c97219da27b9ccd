import type { LoggedTemplate } from './life/pull-log';
import { estimateAir } from './measures/estimate-air';
import { estimateHeat } from './measures/estimate-heat';
import { estimateHold } from './measures/estimate-hold';
import { estimateLife } from './measures/estimate-life';
import { estimatePulls } from './measures/estimate-pulls';
import { estimateSkin } from './measures/estimate-skin';
import { estimateThinning } from './measures/estimate-thinning';
import { estimateVentMarks } from './measures/estimate-vent-marks';
import { estimateWeb } from './measures/estimate-web';
import { showLayers } from './measures/show-layers';
import { surveySlopes, type Slopes } from './measures/survey-slopes';
import type { FollowedPulls } from './physics/follow-pulls';
import type { EffectiveRecipe } from './recipe';
import type { Point, Report } from './report';
import type { ThicknessFrom, WebReport } from './report-forming';
import type { SheetJudgement } from './sheet/judge-sheet';
import type { ThicknessAt } from './sheet/thickness-at';
import type { Part } from './survey-part';

type Physics = Pick<
  Report,
  | 'sheet'
  | 'layers'
  | 'air'
  | 'ventMarks'
  | 'heat'
  | 'skin'
  | 'wallsUnderPressure'
  | 'web'
  | 'thinning'
  | 'life'
>;

/** What does not hang on the recipe's print, sheet gauge and run, and so is reckoned once for all advice. */
export interface KnownPhysics {
  /** That the sheet was run with; in its model thickness goes with the gauge. */
  gaugeMm: number;
  slopes: Slopes;
  web: WebReport;
  /** Sequences of pulls followed so far, by what went into them. */
  pulls: Map<string, FollowedPulls>;
  log: LoggedTemplate[] | null;
}

export function surveyPhysics(
  part: Part,
  { frameMm }: Report['plan'],
  sheet: SheetJudgement | null,
  gaugeMm: number,
  log: LoggedTemplate[] | null,
): KnownPhysics {
  const { holes, columns, spacing, size } = part;
  return {
    gaugeMm,
    slopes: surveySlopes(part, sheet?.formed ? { sheet: sheet.formed, gaugeMm } : null),
    web: estimateWeb({ surface: holes.surface, grid: columns.grid, spacing, size }, frameMm),
    pulls: new Map(),
    log,
  };
}

/**
 * Sections of the forming itself: layers through the sheet, air, vent marks, heat, skin, walls, web, thinning by rule, life.
 * Estimates, to be proven by a test pull.
 * @param knownAir reckoned before, where the recipe's change does not touch it
 */
export function writePhysics(
  part: Part,
  recipe: EffectiveRecipe,
  geometric: Pick<Report, 'walls' | 'plan' | 'layers' | 'draft' | 'undercut' | 'airTraps' | 'spacing'>,
  sheet: SheetJudgement | null,
  known: KnownPhysics,
  knownAir?: Report['air'],
): Physics {
  const { traps, holes, columns, prepared, size } = part;
  const { centre } = prepared.mesh;
  const here = (at: Point): Point => [at[0] + centre[0], at[1] + centre[1], at[2]];
  const flow = () =>
    estimateAir(
      recipe,
      { traps, vents: holes.vents, surface: holes.surface, grid: columns.grid },
      recipe.limits.airClearS,
    ).map((one) => ({ ...one, ventPlaces: one.ventPlaces.map(here) }));
  const formed = sheet?.formed ?? null;
  const { gaugeMm } = recipe.sheet;
  const meanMm = gaugeMm / geometric.plan.arealDrawRatio;
  const thicknessAt: ThicknessAt | null =
    formed && ((x, y, z) => (formed.thicknessAt(x, y, z) * gaugeMm) / known.gaugeMm);
  const lumped = estimateHeat(recipe);
  const heat = { ...lumped, transient: estimatePulls(recipe, lumped, size[2], known.pulls) };
  const skin = estimateSkin(recipe, heat);
  const wallsUnderPressure = estimateHold(recipe, heat, geometric.walls, size);
  return {
    sheet: formed?.report ?? null,
    layers: { ...geometric.layers, show: showLayers(recipe, known.slopes.slopes, meanMm) },
    air: knownAir ?? flow(),
    ventMarks: estimateVentMarks(recipe, holes.vents, (vent) => over(here(vent.at))),
    heat,
    skin,
    wallsUnderPressure,
    web: known.web,
    thinning: estimateThinning(
      { ...geometric, traps: geometric.airTraps, size, topAreaMm2: known.slopes.topAreaMm2 },
      gaugeMm,
      thicknessAt,
    ),
    life: estimateLife(recipe, { ...geometric, heat, skin, wallsUnderPressure }, size[2], known.log),
  };

  /** Over a vent as the sheet was formed; without that, its mean. */
  function over([x, y, z]: Point): { thicknessMm: number; from: ThicknessFrom } {
    const there = thicknessAt ? thicknessAt(x, y, z) : NaN;
    return there > 0
      ? { thicknessMm: there, from: 'sheet-run' }
      : { thicknessMm: meanMm, from: 'areal-mean' };
  }
}
