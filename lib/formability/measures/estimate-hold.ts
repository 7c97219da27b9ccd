import { FILAMENTS } from '../materials/filaments';
import { infillSpanMm } from '../physics/infill';
import { modulusAt } from '../physics/modulus-at';
import { clampedPlate, ringCollapseMPa } from '../physics/plates';
import type { EffectiveRecipe } from '../recipe';
import type { HeatReport, WallsReport, WallsUnderPressureReport } from '../report';
import { hottestC } from './estimate-heat';
import { CREEP, MPA_PER_BAR, overInfill, POISSON } from './estimate-skin';

/** Printed walls are never ideal: share of the ideal buckling pressure (0.3 to 0.5: common practice, no source). */
const KNOCK_DOWN = 0.4;

/**
 * How far the walls give, and at which pressure they collapse. Filled, a wall spans from infill line to infill line and
 * cannot collapse as a ring; hollow by its mesh or printed empty, its flat sides span the whole face, and it may.
 * The wall bends across its layers, where prints are weaker.
 */
export function estimateHold(
  recipe: EffectiveRecipe,
  heat: HeatReport,
  walls: WallsReport,
  sizeMm: readonly [number, number, number],
): WallsUnderPressureReport {
  const { print, machine } = recipe;
  const filament = FILAMENTS[print.material];
  const modulusMPa = modulusAt(filament, hottestC(heat)) / CREEP;
  const pressureMPa = machine.pressureBar * MPA_PER_BAR;
  const empty = walls.hollow || print.infillPercent === 0;
  const thicknessMm = walls.hollow && walls.minMm !== null ? walls.minMm : print.shellMm;
  const plate = { thicknessMm, pressureMPa, modulusMPa, poisson: POISSON };
  const across = Math.max(sizeMm[0], sizeMm[1]);
  const answer = empty
    ? clampedPlate(plate, across, Math.max(sizeMm[2], thicknessMm))
    : overInfill(
        plate,
        print.infillPattern,
        infillSpanMm(print.infillPattern, print.lineMm, print.infillPercent / 100),
      );
  return {
    empty,
    wallMm: thicknessMm,
    sagMm: answer.sagMm,
    stressMPa: answer.stressMPa,
    strengthMPa:
      (filament.strengthZMPa.value * modulusAt(filament, hottestC(heat))) / filament.modulusMPa.value,
    collapseBar: empty
      ? (KNOCK_DOWN * ringCollapseMPa(modulusMPa, POISSON, thicknessMm, across / 2)) / MPA_PER_BAR
      : null,
  };
}
