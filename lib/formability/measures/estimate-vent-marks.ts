import { heightAtPressure } from '../physics/inflate-membrane';
import { clampedDisc } from '../physics/plates';
import type { EffectiveRecipe } from '../recipe';
import type { Vent, VentMark } from '../report';
import { MPA_PER_BAR } from './estimate-skin';

/** Modulus of a sheet at forming temperature, MPa (1 to 5 is the usual rubbery range: common practice, no source). */
const HOT_MPA = 3;
const HOT_POISSON = 0.5;
const SHEAR_SHARE = 5 / 6;

/**
 * Height of the mark that the sheet blows into an open vent. A sheet thinner than half the bore is a membrane (Adkins and
 * Rivlin, C₁ = E/6), a thicker one a clamped plate that also shears; the smaller holds, and one that nothing holds goes as
 * deep as the bore is wide.
 * @param thicknessAt formed thickness over the vent, mm
 */
export function estimateVentMarks(
  recipe: EffectiveRecipe,
  vents: Vent[],
  thicknessAt: (vent: Vent) => number,
): VentMark[] {
  const known = new Map<string, number>();
  return vents.flatMap((vent, id) => {
    if (!vent.printable) return [];
    const thicknessMm = thicknessAt(vent);
    const key = `${vent.printedMm.toFixed(3)} ${thicknessMm.toFixed(3)}`;
    const heightMm =
      known.get(key) ?? markHeight(recipe.machine.pressureBar * MPA_PER_BAR, vent.printedMm / 2, thicknessMm);
    known.set(key, heightMm);
    return [{ vent: id, heightMm, thicknessMm }];
  });
}

/** @param radius of the open bore, mm */
export function markHeight(pressureMPa: number, radius: number, thicknessMm: number): number {
  const blown = heightAtPressure((pressureMPa * radius) / ((HOT_MPA / 6) * thicknessMm));
  const membrane = blown === null ? 2 * radius : blown * radius;
  if (thicknessMm < radius) return membrane;
  const bent = clampedDisc(
    { thicknessMm, pressureMPa, modulusMPa: HOT_MPA, poisson: HOT_POISSON },
    radius,
  ).sagMm;
  const sheared = (pressureMPa * radius ** 2) / (4 * SHEAR_SHARE * (HOT_MPA / 3) * thicknessMm);
  return Math.min(bent + sheared, membrane);
}
