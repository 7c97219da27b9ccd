import { cellAt, type Grid } from '../dexel/grid';
import {
  ATMOSPHERE_PA,
  boreFlow,
  evacuationS,
  expelTimeS,
  type Flow,
  type Pressures,
} from '../physics/gas-flow';
import type { EffectiveRecipe } from '../recipe';
import type { AirTrap, Vent } from '../report';
import type { AirFlow } from '../report-forming';
import { placeVents } from './place-vents';

/** Sharp printed or drilled hole (0.6 to 0.7: common practice, no source; the smaller is used). */
export const DISCHARGE = 0.6;
/** Trapped air stands this far above the air that it leaves to, Pa: 1 bar, or the machine's pressure where that is less. */
const OVER_PA = 100_000;
/** A bore narrower than this is no vent, whatever the hole model says, mm. */
const SMALLEST_MM = 0.1;
/** Share of the driving pressure that is left when the air counts as gone. */
const LEFT = 0.1;
/** No list of places is longer. */
const MOST_PLACES = 24;

/** What drives the air out: the sheet holds it at constant pressure and temperature against the bed's open side. */
export function drivingPressures(recipe: EffectiveRecipe): Pressures {
  const over = Math.min(OVER_PA, recipe.machine.pressureBar * 100_000);
  return {
    upstreamPa: ATMOSPHERE_PA + over,
    downstreamPa: ATMOSPHERE_PA,
    kelvin: 273.15 + recipe.run.ambientC,
  };
}

/**
 * Time in which the air leaves each pocket (pits with no pit inside) through the vents as this printer leaves them open,
 * and how many of its smallest open size are wanting, with places to drill. Isothermal, at constant pressure; per vent
 * the smaller of orifice and laminar flow.
 * @param surface H with vents closed
 * @param clearS time allowed
 */
export function estimateAir(
  recipe: EffectiveRecipe,
  part: { traps: AirTrap[]; vents: Vent[]; surface: Float64Array; grid: Grid },
  clearS: number,
): AirFlow[] {
  const at = drivingPressures(recipe);
  const parents = new Set(part.traps.map((trap) => trap.parent));
  return part.traps.flatMap((trap, id) =>
    parents.has(id) ? [] : [flowOf(recipe, part, at, trap, id, clearS)],
  );
}

function flowOf(
  recipe: EffectiveRecipe,
  { vents, surface, grid }: { vents: Vent[]; surface: Float64Array; grid: Grid },
  at: Pressures,
  trap: AirTrap,
  id: number,
  clearS: number,
): AirFlow {
  const open = recipe.machine.ventedBed
    ? trap.vents.map((v) => vents[v]).filter((vent) => vent.printable && vent.printedMm > 0)
    : [];
  const flows = open.map((vent): [Vent, Flow] => [
    vent,
    boreFlow({ diameterMm: vent.printedMm, lengthMm: vent.lengthMm }, DISCHARGE, at),
  ]);
  const kgS = flows.reduce((sum, [, flow]) => sum + flow.kgS, 0);
  const takes = kgS > 0 ? expelTimeS(trap.volumeMm3, kgS, at) : null;
  // What a further vent of the smallest open size would carry, as long as the floor stands above the bed.
  const smallest = Math.max(recipe.print.holeModel.minOpenMm, SMALLEST_MM);
  const one = boreFlow(
    { diameterMm: smallest, lengthMm: Math.max(trap.floor[2], recipe.print.layerMm) },
    DISCHARGE,
    at,
  );
  // Vents that are wanting; without pressure nothing drives the air, and one says where it stands.
  const lacking = one.kgS > 0 ? (expelTimeS(trap.volumeMm3, 1, at) / clearS - kgS) / one.kgS : 0;
  const ventsNeeded = Math.max(takes === null ? 1 : 0, Math.ceil(lacking - 1e-9));
  const widest = flows.reduce<Flow | null>(
    (most, [, flow]) => (most && most.kgS >= flow.kgS ? most : flow),
    null,
  );
  const floor = cellAt(grid, trap.floor[0], trap.floor[1]);
  return {
    trap: id,
    ventAreaMm2: open.reduce((sum, vent) => sum + (Math.PI / 4) * vent.printedMm ** 2, 0),
    clearS: takes,
    fallS: fallTime(trap, open, at),
    regime: (widest ?? one).regime,
    ventsNeeded,
    ventDiameterMm: smallest,
    ventPlaces: placeVents(surface, grid, floor, trap.spillZMm, Math.min(ventsNeeded, MOST_PLACES)),
  };
}

/** The pocket as a vessel that the set sheet closes: the vents together, as sharp holes. */
function fallTime(
  trap: AirTrap,
  open: Vent[],
  { upstreamPa, downstreamPa, kelvin }: Pressures,
): number | null {
  const areaMm2 = open.reduce((sum, vent) => sum + (Math.PI / 4) * vent.printedMm ** 2, 0);
  if (areaMm2 === 0 || upstreamPa <= downstreamPa) return null;
  const toPa = downstreamPa + LEFT * (upstreamPa - downstreamPa);
  return evacuationS(trap.volumeMm3, areaMm2, DISCHARGE, {
    fromPa: upstreamPa,
    toPa,
    againstPa: downstreamPa,
    kelvin,
  });
}
