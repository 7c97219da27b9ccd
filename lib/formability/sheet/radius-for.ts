import { formSheet } from './form-sheet';
import { roundFoot } from './round-foot';
import type { SheetInput, SheetOptions } from './sheet-input';

/** The inside radius between wall and bed that would lift the foot to a wanted thickness. */
export interface RadiusRemedy {
  /** Proven by a run; null where none up to 8 mm, or half the template's height, reaches it. */
  radiusMm: number | null;
  /** Last radius tried, and least thickness of the foot with it. */
  triedMm: number;
  minMm: number;
  /** 0: the corner's law alone says that no radius does. */
  runs: number;
}

const STEP_MM = 0.5;
const MOST_MM = 8;
const MOST_RUNS = 2;
/** Half of the disc that thickness is meant over: what a sharp corner is told for. */
const SHARP_MM = 1.5;
/** In an upright corner thickness goes with distance to this power: no-slip strip over a long ridge (thinning-rules). */
const POWER = 4 / Math.PI - 1;

/**
 * The inside radius at the foot: guessed by the no-slip law of a corner, then proven by a run over the template with
 * its foot rounded so.
 */
export function radiusFor(
  input: SheetInput,
  footMinMm: number,
  wantedMm: number,
  options: SheetOptions = {},
): RadiusRemedy {
  let highest = 0;
  for (const h of input.template.heights) highest = Math.max(highest, h);
  const most = STEP_MM * Math.floor(Math.min(MOST_MM, highest / 2) / STEP_MM);
  let tried: RadiusRemedy = { radiusMm: null, triedMm: SHARP_MM, minMm: footMinMm, runs: 0 };
  while (tried.runs < MOST_RUNS && tried.minMm < wantedMm && tried.triedMm < most) {
    const guess = tried.triedMm * (wantedMm / tried.minMm) ** (1 / POWER);
    if (guess > most) {
      const lawMm = tried.minMm * (most / tried.triedMm) ** POWER;
      return { ...tried, triedMm: most, minMm: lawMm };
    }
    const triedMm = Math.max(tried.triedMm + STEP_MM, STEP_MM * Math.ceil(guess / STEP_MM));
    const template = roundFoot(input.template, Math.min(triedMm, most));
    const run = formSheet({ ...input, template }, { ...options, single: true }).report.foot;
    tried = { radiusMm: null, triedMm, minMm: run?.minMm ?? tried.minMm, runs: tried.runs + 1 };
  }
  return tried.minMm >= wantedMm ? { ...tried, radiusMm: tried.triedMm } : tried;
}
