import { floodSurface } from '../dexel/flood';
import { cellAt, centreX, centreY, type Grid } from '../dexel/grid';
import type { AirTrap, Vent } from '../report';
import { findPits, type Pit } from './find-pits';
import type { Flood } from './map-pockets';

/** More pits than this are noise of the surface; the largest are reported. */
const MOST_TRAPS = 200;

/**
 * Air traps: pits of H with vents closed. A leaf pit without a vent that this printer leaves open traps air.
 * @param surface H with vents closed
 * @param vents in the mesh's frame
 * @param refine measures some of the pits again
 */
export function findAirTraps(
  surface: Float64Array,
  grid: Grid,
  vents: Vent[],
  refine: (pits: Pit[]) => void = () => {},
): { traps: AirTrap[]; pits: Pit[]; flood: Flood } {
  const level = floodSurface(surface, grid);
  const pits = findPits(surface, level, grid);
  refine(pits);
  const pitOf = new Map<number, number>();
  const ventCells = new Map(vents.map((vent, id) => [id, cellAt(grid, vent.at[0], vent.at[1])]));
  const wanted = new Set(ventCells.values());
  pits.forEach((pit, id) => {
    for (const c of pit.members) if (wanted.has(c)) pitOf.set(c, id);
  });
  const vented = new Set(pitOf.values());
  const unvented = new Uint8Array(level.length);
  pits.forEach((pit, id) => {
    if (pit.children.length === 0 && !vented.has(id)) for (const c of pit.members) unvented[c] = 1;
  });
  const kept = pits.length <= MOST_TRAPS ? pits : largest(pits);
  const traps = kept.map((pit): AirTrap => {
    const own = pit.children.length > 0 ? [] : vents.map((_, v) => v).filter((v) => pitOf.get(ventCells.get(v) ?? -1) === pits.indexOf(pit)); // prettier-ignore
    return {
      floor: [centreX(grid, pit.floor), centreY(grid, pit.floor), surface[pit.floor]],
      spillZMm: pit.spill,
      volumeMm3: pit.volume,
      planAreaMm2: pit.areaMm2,
      trapsAir: pit.children.length === 0 && !own.some((v) => vents[v].printable),
      parent: pit.parent === null ? null : kept.indexOf(pits[pit.parent]),
      vents: own,
    };
  });
  return { traps, pits, flood: { level, unvented } };
}

/** The largest pits together with everything that they lie in. */
function largest<P extends { volume: number; parent: number | null }>(pits: P[]): P[] {
  const bySize = pits.map((_, id) => id).sort((a, b) => pits[b].volume - pits[a].volume || a - b);
  const keep = new Set<number>();
  for (const id of bySize.slice(0, MOST_TRAPS)) {
    for (let up: number | null = id; up !== null && !keep.has(up); up = pits[up].parent) keep.add(up);
  }
  return pits.filter((_, id) => keep.has(id));
}
