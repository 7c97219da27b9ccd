import { FILAMENTS } from '../materials/filaments';
import { densityForSpan, infillSpanMm } from '../physics/infill';
import { modulusAt } from '../physics/modulus-at';
import { clampedDisc, clampedPlate, clampedStrip, type Plate, type PlateAnswer } from '../physics/plates';
import type { EffectiveRecipe } from '../recipe';
import type { HeatReport, SkinReport } from '../report';
import { hottestC } from './estimate-heat';

/** Creep under minutes of load in warmth: modulus divided by 3 (2 to 5: common practice, no source). */
export const CREEP = 3;
export const POISSON = 0.35;
/** Bar to MPa. */
export const MPA_PER_BAR = 0.1;
/** Sag that prints through a thin sheet, and a thick one, mm (common practice, no source). */
const SHOWS_THIN_MM = 0.05;
const SHOWS_THICK_MM = 0.1;
/** A sheet from this gauge on is thick, mm (common practice, no source). */
const THICK_GAUGE_MM = 1.5;

/** Sag and stress of a skin over one free cell of the infill. */
export function overInfill(
  plate: Plate,
  pattern: EffectiveRecipe['print']['infillPattern'],
  spanMm: number,
): PlateAnswer {
  switch (pattern) {
    case 'lines':
      return clampedStrip(plate, spanMm);
    case 'grid':
      return clampedPlate(plate, spanMm, spanMm);
    case 'triangles':
    case 'gyroid':
      return clampedDisc(plate, spanMm / 2);
  }
}

/** How far the top sinks between the lines of the infill under forming pressure, at the hottest pull. */
export function estimateSkin(recipe: EffectiveRecipe, heat: HeatReport): SkinReport {
  const { print, machine, sheet } = recipe;
  const atC = hottestC(heat);
  const modulusMPa = modulusAt(FILAMENTS[print.material], atC);
  const limitMm = sheet.gaugeMm < THICK_GAUGE_MM ? SHOWS_THIN_MM : SHOWS_THICK_MM;
  const density = print.infillPercent / 100;
  const spanMm = infillSpanMm(print.infillPattern, print.lineMm, density);
  const at = (thicknessMm: number, span: number) =>
    overInfill(
      {
        thicknessMm,
        pressureMPa: machine.pressureBar * MPA_PER_BAR,
        modulusMPa: modulusMPa / CREEP,
        poisson: POISSON,
      },
      print.infillPattern,
      span,
    );
  const spanned = Number.isFinite(spanMm)
    ? at(print.topMm, spanMm)
    : { sagMm: Infinity, stressMPa: Infinity };
  // Sag goes with span⁴ / thickness³.
  const spanThatHolds = spanMm * (limitMm / spanned.sagMm) ** 0.25;
  return {
    spanMm: finite(spanMm),
    modulusMPa,
    atC,
    sagMm: finite(spanned.sagMm),
    stressMPa: finite(spanned.stressMPa),
    limitMm,
    topThatHoldsMm: finite(print.topMm * (spanned.sagMm / limitMm) ** (1 / 3)),
    infillThatHoldsPercent:
      density > 0 && spanThatHolds > 0
        ? 100 * densityForSpan(print.infillPattern, print.lineMm, spanThatHolds)
        : null,
  };
}

/** JSON has no infinity: an empty template has no span at all. */
function finite(value: number): number | null {
  return Number.isFinite(value) ? value : null;
}
