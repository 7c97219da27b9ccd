import { FILAMENTS, type FilamentMaterial } from '../materials/filaments';
import { densityForSpan, infillSpanMm } from '../physics/infill';
import { modulusAt } from '../physics/modulus-at';
import {
  clampedDisc,
  clampedPlate,
  clampedStrip,
  supportedDisc,
  supportedRectangle,
  supportedStrip,
  supportedTriangle,
  type Plate,
  type PlateAnswer,
} from '../physics/plates';
import type { EffectiveRecipe } from '../recipe';
import type { HeatReport, SkinReport } from '../report-forming';
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
  // Solid: no cell is free.
  if (spanMm === 0) return { sagMm: 0, stressMPa: 0 };
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

/**
 * The same where the lines hold the skin up but let its edges turn: the most that it can sag. Clamped is right for an even
 * load on a skin that runs on over the next cells; the truth of a printed one lies between. A triangle is 1.5 spans high.
 */
function overYieldingInfill(
  plate: Plate,
  pattern: EffectiveRecipe['print']['infillPattern'],
  spanMm: number,
): PlateAnswer {
  switch (pattern) {
    case 'lines':
      return supportedStrip(plate, spanMm);
    case 'grid':
      return supportedRectangle(plate, spanMm, spanMm);
    case 'triangles':
      return supportedTriangle(plate, 1.5 * spanMm);
    case 'gyroid':
      return supportedDisc(plate, spanMm / 2);
  }
}

/** Sag that shows in a sheet of a gauge, mm. */
export function showsMm(gaugeMm: number): number {
  return gaugeMm < THICK_GAUGE_MM ? SHOWS_THIN_MM : SHOWS_THICK_MM;
}

/** How far the top sinks between the lines of the infill under forming pressure, at the hottest pull. */
export function estimateSkin(
  recipe: EffectiveRecipe,
  heat: Pick<HeatReport, 'peakC' | 'contactC'>,
): SkinReport {
  const { print, machine, sheet } = recipe;
  const atC = hottestC(heat);
  const filament = FILAMENTS[print.material];
  const modulusMPa = modulusAt(filament, atC);
  const limitMm = showsMm(sheet.gaugeMm);
  const density = print.infillPercent / 100;
  const spanMm = infillSpanMm(print.infillPattern, print.lineMm, density);
  const plate: Plate = {
    thicknessMm: print.topMm,
    pressureMPa: machine.pressureBar * MPA_PER_BAR,
    modulusMPa: modulusMPa / CREEP,
    poisson: POISSON,
  };
  const carried = Number.isFinite(spanMm);
  const endless = { sagMm: Infinity, stressMPa: Infinity };
  const spanned = carried ? overInfill(plate, print.infillPattern, spanMm) : endless;
  const yielding = carried && spanMm > 0 ? overYieldingInfill(plate, print.infillPattern, spanMm) : spanned;
  const strengthMPa = strengthAt(filament, 'strengthXyMPa', atC);
  // Sag goes with span⁴ / thickness³, stress with span² / thickness²; from 1 mm, for an empty print has no span of its own.
  const bent = spanned.stressMPa / strengthMPa;
  const one = overInfill(plate, print.infillPattern, 1);
  const spanThatHolds = Math.min((limitMm / one.sagMm) ** 0.25, (strengthMPa / one.stressMPa) ** 0.5);
  return {
    spanMm: finite(spanMm),
    modulusMPa,
    atC,
    sagMm: finite(spanned.sagMm),
    stressMPa: finite(spanned.stressMPa),
    limitMm,
    creepFactor: CREEP,
    sagMostMm: finite(yielding.sagMm),
    strengthMPa,
    topThatHoldsMm: finite(print.topMm * Math.max((spanned.sagMm / limitMm) ** (1 / 3), bent ** 0.5)),
    infillThatHoldsPercent:
      spanMm > 0 && spanThatHolds < Infinity
        ? 100 * densityForSpan(print.infillPattern, print.lineMm, spanThatHolds)
        : null,
  };
}

/** Strength of a print at a temperature, MPa: falls as its modulus does (assumed, no source). */
export function strengthAt(
  filament: FilamentMaterial,
  direction: 'strengthXyMPa' | 'strengthZMPa',
  celsius: number,
): number {
  return filament[direction].value * Math.min(1, modulusAt(filament, celsius) / filament.modulusMPa.value);
}

/** JSON has no infinity: an empty template has no span at all. */
function finite(value: number): number | null {
  return Number.isFinite(value) ? value : null;
}
