import { bulgeMm, cuspMm, nubDraftDeg, roughnessUm, stepThroughMm } from '../physics/layer-surface';
import type { EffectiveRecipe } from '../recipe';
import type { LayerShowReport, ThicknessFrom } from '../report-forming';
import { MPA_PER_BAR, showsMm } from './estimate-skin';
import { HOT_MPA } from './estimate-vent-marks';
import type { Slope } from './survey-slopes';

/** Finest layer that is looked for, mm. */
const FINEST_MM = 0.02;

/**
 * Do the layers' steps come through the sheet? On each slope the cusp, at the wavelength of its tread, through the formed
 * thickness: the thinnest found on slopes of that draft where the sheet was run, the mean of the areal draw ratio otherwise.
 * And how deep the hot sheet bulges between beads, which is what grips on steep walls.
 */
export function showLayers(recipe: EffectiveRecipe, slopes: Slope[], meanMm: number): LayerShowReport {
  const { sheet, print, machine } = recipe;
  const limitMm = showsMm(sheet.gaugeMm);
  const thicknessOf = (slope: Slope) => (slope.thinnest ? slope.thinnest.gauges * sheet.gaugeMm : meanMm);
  const through = (slope: Slope, layerMm: number) =>
    stepThroughMm(layerMm, slope.draftDeg, thicknessOf(slope));
  const worst = slopes.reduce<{ slope: Slope; mm: number } | null>((most, slope) => {
    const mm = through(slope, print.layerMm);
    return most && most.mm >= mm ? most : { slope, mm };
  }, null);
  const steepest = slopes[slopes.length - 1];
  const thicknessMm = worst ? thicknessOf(worst.slope) : meanMm;
  const from: ThicknessFrom = worst?.slope.thinnest ? 'sheet-run' : 'areal-mean';
  const bulge = bulgeMm(
    print.layerMm,
    machine.pressureBar * MPA_PER_BAR,
    steepest ? thicknessOf(steepest) : meanMm,
    HOT_MPA,
  );
  return {
    throughMm: worst?.mm ?? 0,
    draftDeg: worst?.slope.draftDeg ?? null,
    cuspMm: worst ? cuspMm(print.layerMm, worst.slope.draftDeg) : 0,
    at: worst?.slope.thinnest?.at ?? null,
    limitMm,
    areaMm2: slopes.reduce(
      (sum, slope) => sum + (through(slope, print.layerMm) > limitMm ? slope.areaMm2 : 0),
      0,
    ),
    thicknessMm,
    from,
    layerThatHidesMm: worst && worst.mm > limitMm ? thickestHidden(slopes, through, limitMm, recipe) : null,
    roughnessUm: slopes.reduce(
      (most, slope) => Math.max(most, roughnessUm(print.layerMm, slope.draftDeg)),
      0,
    ),
    // No deeper than the half-round of the beads themselves.
    bulgeMm: Math.min(bulge, print.layerMm / 2),
    bulgeDraftDeg: nubDraftDeg(print.layerMm, Math.min(bulge, print.layerMm / 2)),
  };
}

/** Thickest layer whose steps stay below the limit on every slope, mm; null where none fine enough is worth looking for. */
function thickestHidden(
  slopes: Slope[],
  through: (slope: Slope, layerMm: number) => number,
  limitMm: number,
  { print }: EffectiveRecipe,
): number | null {
  const holds = (layerMm: number) => slopes.every((slope) => through(slope, layerMm) <= limitMm);
  if (!holds(FINEST_MM)) return null;
  let [low, high] = [FINEST_MM, print.layerMm];
  for (let round = 0; round < 40; round++) {
    const middle = (low + high) / 2;
    if (holds(middle)) low = middle;
    else high = middle;
  }
  return low;
}
