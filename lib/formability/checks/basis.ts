import { LIMIT_RULES, type LimitKey } from '../limits';
import type { EffectiveRecipe } from '../recipe';
import type { Basis } from '../report';

/** The basis of a limit, saying whether the recipe moved it away from its default. */
export function basisOf(key: LimitKey, recipe: EffectiveRecipe): Basis {
  const rule = LIMIT_RULES[key];
  const moved = recipe.limits[key] !== rule.value;
  return {
    source: moved
      ? `the studio's own limit; the default ${rule.value} rests on: ${rule.source}`
      : rule.source,
    kind: rule.kind,
    limitKey: key,
    movedByRecipe: moved,
  };
}

/** A figure for a sentence: as many digits as mean something. */
export function say(value: number, digits = 1): string {
  return value.toFixed(digits).replace(/\.0+$|(\.\d*?)0+$/, '$1');
}

/** A deflection in mm for a sentence: formulas of small bending say nothing beyond a few millimetres. */
export function sayGive(mm: number): string {
  return mm > 5 ? 'more than 5' : mm < 0.001 ? 'less than 0.001' : say(mm, 3);
}

/** A place for a sentence, in whole tenths of a millimetre. */
export function sayPlace(at: readonly number[]): string {
  return `x ${say(at[0])}, y ${say(at[1])}, z ${say(at[2])}`;
}

/** Rounds up, or down, to a step, for a value that someone will type in. */
export function roundUp(value: number, step: number): number {
  return Number((Math.ceil(value / step - 1e-9) * step).toFixed(6));
}

export function roundDown(value: number, step: number): number {
  return Number((Math.floor(value / step + 1e-9) * step).toFixed(6));
}

/** Diameter to draw, mm, for a vent that this printer leaves just open. */
export function drawnFor({ print: { holeModel } }: EffectiveRecipe): number {
  return roundUp((holeModel.minOpenMm - holeModel.offsetMm) / holeModel.slope, 0.05);
}
