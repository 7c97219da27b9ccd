import { DISCHARGE, drivingPressures } from '../measures/estimate-air';
import type { Check } from '../report';
import type { AirFlow } from '../report-forming';
import { basisOf, drawnFor, say, sayPlace } from './basis';
import type { CheckInput } from './check-input';

/** Vents lead nowhere on a bed that lets no air out. */
const CLOSED_BED =
  'Form on a vented bed, or on a spacer that lets the air out below: this one is closed. Then: ';
/** Places told in a sentence; the rest are in the report. */
const SAID_PLACES = 4;

/** Can the air leave every pocket in time? */
export function checkAir({ recipe, report, geometryOnly }: CheckInput): Check | null {
  if (geometryOnly) return null;
  const { air, airTraps } = report;
  const limit = recipe.limits.airClearS;
  const shut = air.filter((flow) => flow.clearS === null);
  const slow = air.filter((flow) => flow.clearS !== null && flow.clearS > limit);
  const slowest = air.reduce((most, flow) => Math.max(most, flow.clearS ?? 0), 0);
  const bad = [...shut, ...slow];
  const over = (drivingPressures(recipe).upstreamPa - drivingPressures(recipe).downstreamPa) / 1e5;
  return {
    id: 'air',
    status: shut.length > 0 ? 'fail' : slow.length > 0 ? 'caution' : 'pass',
    measured: shut.length > 0 ? null : slowest,
    limit,
    unit: 's',
    basis: basisOf('airClearS', recipe),
    message: `${message(air, shut.length, slow.length, slowest, limit)}${air.length > 0 ? ` Reckoned at ${say(over, 1)} bar over the air below, discharge ${DISCHARGE}, at constant temperature.${setText(air)}` : ''}`,
    remedy:
      bad.length > 0 ? `${recipe.machine.ventedBed ? '' : CLOSED_BED}${remedy(bad, drawnFor(recipe))}` : '',
    places: bad.map((flow) => ({
      at: airTraps[flow.trap].floor,
      areaMm2: airTraps[flow.trap].planAreaMm2,
    })),
  };
}

function message(air: AirFlow[], shut: number, slow: number, slowest: number, limit: number): string {
  if (air.length === 0) return 'No pocket holds air: it leaves sideways under the sheet.';
  const pockets = (n: number) => `${n} ${n === 1 ? 'pocket' : 'pockets'}`;
  if (shut > 0)
    return `${pockets(shut)} of ${air.length} ${shut === 1 ? 'has' : 'have'} no open way out: the air stays and holds the sheet off.`;
  if (slow > 0)
    return `${pockets(slow)} of ${air.length} ${slow === 1 ? 'needs' : 'need'} up to ${say(slowest, 2)} s to clear; the sheet sets in about ${say(limit, 2)} s.`;
  return `The air leaves ${air.length === 1 ? 'the pocket' : `all ${air.length} pockets`} in ${slowest < 0.01 ? 'less than 0.01' : say(slowest, 2)} s at most.`;
}

/** A sheet that sets over a pocket leaves what has not gone yet. */
function setText(air: AirFlow[]): string {
  const fall = air.reduce((most, flow) => Math.max(most, flow.fallS ?? 0), 0);
  return fall > 0.01
    ? ` Should the sheet set first, the air's pressure falls to a tenth in ${say(fall, 2)} s.`
    : '';
}

function remedy(bad: AirFlow[], drawnMm: number): string {
  const wanted = bad.reduce((sum, flow) => sum + flow.ventsNeeded, 0);
  const places = bad.flatMap((flow) => flow.ventPlaces);
  const told = places.slice(0, SAID_PLACES).map((at) => sayPlace(at));
  const rest = wanted - told.length;
  return `Add ${wanted} ${wanted === 1 ? 'vent' : 'vents'} of ${say(drawnMm, 2)} mm as drawn, ${say(bad[0].ventDiameterMm, 2)} mm as printed, through to the bed, at ${told.join('; ')}${rest > 0 ? `, and ${rest} more as listed in the report` : ''}.`;
}
