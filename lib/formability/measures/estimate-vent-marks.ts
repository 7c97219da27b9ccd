import { stateAtPressure } from '../physics/inflate-membrane';
import { clampedDisc } from '../physics/plates';
import type { EffectiveRecipe } from '../recipe';
import type { Vent } from '../report';
import type { ThicknessFrom, VentMark } from '../report-forming';
import { MPA_PER_BAR } from './estimate-skin';

/** Modulus of a sheet at forming temperature, MPa (1 to 5 is the usual rubbery range: common practice, no source). */
export const HOT_MPA = 3;
const HOT_POISSON = 0.5;
const SHEAR_SHARE = 5 / 6;

/**
 * Height of the mark that the sheet blows into an open vent. A sheet thinner than half the bore is a membrane (Adkins and
 * Rivlin, C₁ = E/6), a thicker one a clamped plate that also shears; the smaller holds, and one that nothing holds goes as
 * deep as the bore is wide.
 * A vent no wider than the sheet is thick there leaves no mark worth speaking of: that thickness is its limit.
 * @param formedAt formed thickness over the vent, mm, and where it is known from
 */
export function estimateVentMarks(
  recipe: EffectiveRecipe,
  vents: Vent[],
  formedAt: (vent: Vent) => { thicknessMm: number; from: ThicknessFrom },
): VentMark[] {
  const known = new Map<string, Mark>();
  return vents.flatMap((vent, id) => {
    if (!vent.printable) return [];
    const { thicknessMm, from } = formedAt(vent);
    const key = `${vent.printedMm.toFixed(3)} ${thicknessMm.toFixed(3)}`;
    const mark =
      known.get(key) ?? markIn(recipe.machine.pressureBar * MPA_PER_BAR, vent.printedMm / 2, thicknessMm);
    known.set(key, mark);
    return [{ vent: id, ...mark, thicknessMm, from, limitMm: thicknessMm }];
  });
}

/** Height of the nub, and thickness of its tip; null where nothing holds the sheet and it may burst. */
export interface Mark {
  heightMm: number;
  tipMm: number | null;
}

/** @param radius of the open bore, mm */
export function markIn(pressureMPa: number, radius: number, thicknessMm: number): Mark {
  const blown = stateAtPressure((pressureMPa * radius) / ((HOT_MPA / 6) * thicknessMm));
  const membrane = blown === null ? 2 * radius : blown.height * radius;
  const tipMm = blown && blown.poleThickness * thicknessMm;
  if (thicknessMm < radius) return { heightMm: membrane, tipMm };
  const bent = clampedDisc(
    { thicknessMm, pressureMPa, modulusMPa: HOT_MPA, poisson: HOT_POISSON },
    radius,
  ).sagMm;
  const sheared = (pressureMPa * radius ** 2) / (4 * SHEAR_SHARE * (HOT_MPA / 3) * thicknessMm);
  const held = bent + sheared;
  return held < membrane ? { heightMm: held, tipMm: thicknessMm } : { heightMm: membrane, tipMm };
}
