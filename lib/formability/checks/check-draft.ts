import type { Check } from '../report';
import { VERTICAL_DEG } from '../measures/thresholds';
import { basisOf, roundUp, say, sayPlace } from './basis';
import type { CheckInput } from './check-input';

/** Rounding of a wall that was drawn with exactly the limit. */
const ROUNDING_DEG = 0.01;
const MOST_PLACES = 12;
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
  const lean = `${say(measured)}°${stepped ? ' through their steps' : ''}`;
  const wanted = `${say(wantedDraftDeg)}° ${wantedDraftDeg === limits.draftMinDeg ? 'is wanted' : `is wanted (${say(limits.draftFailDeg)}° and ${say(report.layers.layerDraftDeg)}° for layers not sanded)`}`;
  if (good) return { ...base, status, measured, message: `The walls lean back by ${lean} at least; ${wanted}.`, remedy: '', places: [] }; // prettier-ignore
  const missing = roundUp(wantedDraftDeg - measured, 0.1);
  const height = walls.heightMm;
  const wider = height * (Math.tan(wantedDraftDeg * PER_DEG) - Math.tan(measured * PER_DEG));
  const sandingHelps = !print.sanded && measured >= limits.draftMinDeg - ROUNDING_DEG;
  const { regions } = report.draft;
  // Walls too small for a region each are told by their sum.
  const area = regions.reduce((sum, region) => sum + region.areaMm2, 0) || walls.areaBelowMm2;
  const where = regions.length > 0 ? `, the largest at ${sayPlace(regions[0].at)}` : '';
  return {
    ...base,
    status,
    measured,
    message:
      measured < -VERTICAL_DEG
        ? `Walls of ${say(area, 0)} mm² stand too steep or lean out, by ${say(-measured)}° at most; ${wanted}, or the part locks on the template.`
        : `Walls of ${say(area, 0)} mm² lean back by ${lean} at least; ${wanted}, or the part grips the template as it shrinks.`,
    remedy:
      [
        `Add ${say(missing)}° to these walls${where}: over their ${say(height)} mm of height that is ${say(wider, wider < 0.1 ? 2 : 1)} mm more at the foot of each`,
        sandingHelps ? `or sand them, which makes ${say(limits.draftMinDeg)}° enough` : '',
      ]
        .filter(Boolean)
        .join(', ') + '.',
    places: regions.slice(0, MOST_PLACES).map(({ at, areaMm2 }) => ({ at, areaMm2 })),
  };
}
