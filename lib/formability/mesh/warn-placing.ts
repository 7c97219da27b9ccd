import type { MeshPlace, MeshRepair, MeshWarning, Point } from '../report';
import { BED_TOLERANCE_MM } from './measure-facets';
import type { Placing } from './place-mesh';
import type { Prepared } from './prepare-mesh';

/** What the file says of where the part stands. */
export interface PlacingJudgement {
  warnings: MeshWarning[];
  repairs: MeshRepair[];
  places: MeshPlace[];
}

/**
 * Whether the file's part hangs above the bed or reaches below it. Dropping it to the bed mends that, and is named;
 * where the recipe turns the part, the file's height means nothing.
 */
export function warnPlacing(
  prepared: Prepared,
  placing: Pick<Placing, 'up' | 'dropToBed'>,
): PlacingJudgement {
  const { zBeforeDrop, toleranceMm, turn, min, max } = prepared;
  const off = Math.max(BED_TOLERANCE_MM, toleranceMm);
  if (turn !== null && placing.dropToBed) return { warnings: [], repairs: [], places: [] };
  const code = zBeforeDrop > off ? 'floating' : zBeforeDrop < -off ? 'below_bed' : null;
  if (code === null) return { warnings: [], repairs: [], places: [] };
  const at: Point = [(min[0] + max[0]) / 2, (min[1] + max[1]) / 2, min[2]];
  return {
    warnings: [code],
    repairs: placing.dropToBed ? ['dropped_to_bed'] : [],
    places: [{ code, at, count: 1, sizeMm: Math.abs(zBeforeDrop) }],
  };
}
