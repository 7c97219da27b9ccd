import type { CheckInput } from '@/lib/formability/checks/check-input';
import type { Check } from '@/lib/formability/report';
import { frustum } from '../../../fixtures/meshes/solids';
import { reportOn } from '../run-engine';

/** What the checks see of a sound template with walls of 8°, and the recipe that stands where nothing is said. */
const SOUND = soundInput();

function soundInput(): CheckInput {
  const report = reportOn(frustum(40, 30, 12, 8), { grid: { cellMm: 2 } });
  return {
    recipe: report.recipe,
    report,
    walls: { facetDeg: 8, stepped: false, areaBelowMm2: 0, wallAreaMm2: 10_000, heightMm: 30 },
    wantedDraftDeg: 5,
    overhangs: { areaMm2: 0, worstDeg: 0, places: [] },
    sheet: null,
    geometryOnly: false,
    sizeMm: [100, 80, 30],
  };
}

/** One check on the sound template with something about it changed, to stand just inside a limit and just beyond. */
export function checkWith(
  check: (input: CheckInput) => Check | null,
  change: (input: CheckInput) => void,
): Check {
  const input = structuredClone(SOUND);
  change(input);
  const made = check(input);
  if (!made) throw new Error('the check was not made');
  return made;
}
