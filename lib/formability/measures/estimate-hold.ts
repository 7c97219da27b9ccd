import { FILAMENTS } from '../materials/filaments';
import { densityForSpan, infillSpanMm } from '../physics/infill';
import { modulusAt } from '../physics/modulus-at';
import { clampedPlate, clampedStrip, ribBucklingMPa, ringCollapseMPa, type Plate } from '../physics/plates';
import type { EffectiveRecipe } from '../recipe';
import type { WallsReport } from '../report-walls';
import type { HeatReport, WallsUnderPressureReport } from '../report-forming';
import { hottestC } from './estimate-heat';
import { CREEP, MPA_PER_BAR, overInfill, POISSON, strengthAt } from './estimate-skin';

/** Printed walls are never ideal: share of the ideal buckling pressure (0.3 to 0.5: common practice, no source). */
export const KNOCK_DOWN = 0.4;
/** Give of a wall that moves the part's size, mm (common practice, no source). */
export const WALL_GIVES_MM = 0.1;

/**
 * How far the walls give, and at which pressure they collapse. Filled, a wall spans from infill line to infill line and
 * cannot collapse as a ring; hollow by its mesh or printed empty, its flat sides span the whole face, and it may.
 * The wall bends across its layers, where prints are weaker. The top's load goes down the infill's own walls, p / density,
 * which buckle as long plates of one line's width between the lines that cross them.
 */
export function estimateHold(
  recipe: EffectiveRecipe,
  heat: Pick<HeatReport, 'peakC' | 'contactC'>,
  walls: WallsReport,
  sizeMm: readonly [number, number, number],
): WallsUnderPressureReport {
  const { print, machine } = recipe;
  const filament = FILAMENTS[print.material];
  const atC = hottestC(heat);
  const modulusMPa = modulusAt(filament, atC) / CREEP;
  const pressureMPa = machine.pressureBar * MPA_PER_BAR;
  const empty = walls.hollow || print.infillPercent === 0;
  const thicknessMm = walls.hollow && walls.minMm !== null ? walls.minMm : print.shellMm;
  const plate = { thicknessMm, pressureMPa, modulusMPa, poisson: POISSON };
  const across = Math.max(sizeMm[0], sizeMm[1]);
  const spanMm = infillSpanMm(print.infillPattern, print.lineMm, print.infillPercent / 100);
  const answer = empty
    ? clampedPlate(plate, across, Math.max(sizeMm[2], thicknessMm))
    : overInfill(plate, print.infillPattern, spanMm);
  return {
    empty,
    wallMm: thicknessMm,
    sagMm: answer.sagMm,
    stressMPa: answer.stressMPa,
    strengthMPa: strengthAt(filament, 'strengthZMPa', atC),
    collapseBar: empty
      ? (KNOCK_DOWN * ringCollapseMPa(modulusMPa, POISSON, thicknessMm, across / 2)) / MPA_PER_BAR
      : null,
    infill:
      print.infillPercent > 0 && spanMm > 0
        ? {
            stressMPa: pressureMPa / (print.infillPercent / 100),
            bucklesMPa: KNOCK_DOWN * ribBucklingMPa(modulusMPa, POISSON, print.lineMm, spanMm),
          }
        : null,
    ribSpacingMm: empty ? ribSpacing(plate, strengthAt(filament, 'strengthZMPa', atC)) : null,
    infillThatHoldsPercent: infillThatHolds({ ...plate, thicknessMm: print.shellMm }, print),
  };
}

/** Widest spacing of ribs between which an empty wall gives no more than the limit and does not break, mm: a clamped strip. */
function ribSpacing(plate: Plate, strengthMPa: number): number | null {
  if (plate.pressureMPa === 0) return null;
  // Sag goes with span⁴, stress with span².
  const { sagMm, stressMPa } = clampedStrip(plate, 1);
  return Math.min((WALL_GIVES_MM / sagMm) ** 0.25, (strengthMPa / stressMPa) ** 0.5);
}

/** Infill at which the walls give no more than the limit and its own walls do not buckle, %; null where none does. */
function infillThatHolds(plate: Plate, { infillPattern, lineMm }: EffectiveRecipe['print']): number | null {
  // Sag goes with span⁴; stress p / ρ against a buckling stress that goes with ρ².
  const spanMm = (WALL_GIVES_MM / overInfill(plate, infillPattern, 1).sagMm) ** 0.25;
  const forSag = densityForSpan(infillPattern, lineMm, spanMm);
  const half = infillSpanMm(infillPattern, lineMm, 0.5);
  const atHalf = KNOCK_DOWN * ribBucklingMPa(plate.modulusMPa, plate.poisson, lineMm, half);
  const forRibs = 0.5 * (plate.pressureMPa / 0.5 / atHalf) ** (1 / 3);
  const percent = 100 * Math.max(forSag, forRibs);
  return percent <= 100 ? percent : null;
}
