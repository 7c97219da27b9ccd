import type { Check } from '../report';
import { basisOf, roundUp, say } from './basis';
import type { CheckInput } from './check-input';

/** Rounding of a wall that was drawn with exactly the limit. */
const ROUNDING_DEG = 0.01;
const PER_DEG = Math.PI / 180;

/**
 * Draft that a wall needs: the practice limit when sanded; unsanded, at least the male minimum plus what the grooves
 * between layers ask for, atan(w/h).
 */
export function wantedDraft(input: {
  sanded: boolean;
  minDeg: number;
  failDeg: number;
  layerDraftDeg: number;
}): number {
  return input.sanded ? input.minDeg : Math.max(input.minDeg, input.failDeg + input.layerDraftDeg);
}

/** Can the sheet be drawn off? Judges facets; walls made of steps or noise at the scale above 1 mm. */
export function checkDraft({ recipe, report, walls, wantedDraftDeg }: CheckInput): Check {
  const { limits, print } = recipe;
  const macro = report.draft.wallMinMacroDeg;
  const stepped = walls.stepped && walls.areaBelowMm2 > 0 && macro !== null;
  const measured = stepped ? macro : walls.facetDeg;
  const basis = basisOf('draftMinDeg', recipe);
  if (!print.sanded) {
    basis.source += `; unsanded layers of ${say(print.layerMm, 2)} mm: ${say(limits.draftFailDeg)}° plus ${say(report.layers.layerDraftDeg)}° for the grooves between beads (derived)`; // prettier-ignore
  }
  const base = { id: 'draft' as const, limit: wantedDraftDeg, unit: 'deg', basis };
  if (measured === null) {
    return { ...base, status: 'pass', measured: null, message: 'The template has no walls to draw the sheet from.', remedy: '', places: [] }; // prettier-ignore
  }
  const good = stepped ? measured >= wantedDraftDeg - ROUNDING_DEG : walls.areaBelowMm2 === 0;
  const status = good ? 'pass' : measured < limits.draftFailDeg - ROUNDING_DEG ? 'fail' : 'caution';
  const missing = roundUp(wantedDraftDeg - measured, 0.1);
  const height = walls.heightMm;
  const wider = height * (Math.tan(wantedDraftDeg * PER_DEG) - Math.tan(Math.max(measured, 0) * PER_DEG));
  const sandingHelps = !print.sanded && measured >= limits.draftMinDeg - ROUNDING_DEG;
  return {
    ...base,
    status,
    measured,
    message: good
      ? `Every wall leans back far enough: ${stepped ? `${say(measured)}° through its steps` : `at least ${say(wantedDraftDeg)}°`}.`
      : `Walls of ${say(walls.areaBelowMm2, 0)} mm² lean back by less than ${say(wantedDraftDeg)}° (the least ${say(measured)}°), so the part will grip the template as it shrinks.`,
    remedy: good
      ? ''
      : [
          `Add ${say(missing)}° to these walls: over their ${say(height)} mm of height that is ${say(wider)} mm more at the foot of each`,
          sandingHelps ? `or sand them, which makes ${say(limits.draftMinDeg)}° enough` : '',
        ]
          .filter(Boolean)
          .join(', ') + '.',
    places: good ? [] : walls.places,
  };
}
