import type { Grid } from '../dexel/grid';
import { sortByHeight } from './sort-by-height';

/** A pit shallower than this, in mm, is surface, not a trap (engine contract). */
export const PIT_MM = 0.05;

/** A pit of the surface: where the flood from the rim would leave water standing. */
export interface Pit {
  /** Level at which it overflows. */
  spill: number;
  volume: number;
  cells: number;
  /** In plan, mm². */
  areaMm2: number;
  /** Cell in the middle of its floor. */
  floor: number;
  parent: number | null;
  children: number[];
  /** Every cell that lies in it, for leaves; empty in a pit that holds others. */
  members: number[];
}

/** Water that has gathered so far, while its level rises. */
interface Basin {
  count: number;
  sum: number;
  lowest: number;
  lowestZ: number;
  /** Level it grew from: its lowest point, or the saddle where the pits inside it met. */
  from: number;
  pits: number[];
  members: number[];
}

/**
 * All pits, outer ones first, each followed by the pits that lie in it. Cells of a pit are those where the flood
 * stands more than 0.05 mm above the surface, joined over 8 neighbours; inside each, water rising from below shows
 * where basins meet, and a basin more than 0.05 mm deep below that saddle is a pit of its own.
 */
export function findPits(surface: Float64Array, level: Float64Array, grid: Grid): Pit[] {
  const cells = grid.nx * grid.ny;
  const seen = new Uint8Array(cells);
  const basinOf = new Int32Array(cells).fill(-1);
  const pits: Pit[] = [];
  for (let c = 0; c < cells; c++) {
    if (seen[c] || level[c] - surface[c] <= PIT_MM) continue;
    fillRegion(gather(c, seen, surface, level, grid), level[c], surface, grid, basinOf, pits);
  }
  return inOrder(pits, surface, grid);
}

function gather(
  first: number,
  seen: Uint8Array,
  surface: Float64Array,
  level: Float64Array,
  grid: Grid,
): Int32Array {
  const region = [first];
  seen[first] = 1;
  for (let at = 0; at < region.length; at++) {
    eachNeighbour(grid, region[at], (n) => {
      if (seen[n] || level[n] - surface[n] <= PIT_MM) return;
      seen[n] = 1;
      region.push(n);
    });
  }
  return Int32Array.from(region).sort();
}

function eachNeighbour(grid: Grid, c: number, visit: (n: number) => void): void {
  const { nx, ny } = grid;
  const i = c % nx;
  const [x0, x1] = [i > 0 ? -1 : 0, i + 1 < nx ? 1 : 0];
  const [y0, y1] = [c >= nx ? -nx : 0, c < nx * (ny - 1) ? nx : 0];
  for (let dy = y0; dy <= y1; dy += nx) {
    for (let dx = x0; dx <= x1; dx++) if (dx !== 0 || dy !== 0) visit(c + dy + dx);
  }
}

/** Raises the water in one region, cell by cell from the lowest, and records pits where basins meet. */
function fillRegion(
  region: Int32Array,
  spill: number,
  surface: Float64Array,
  grid: Grid,
  basinOf: Int32Array,
  pits: Pit[],
): void {
  const parent: number[] = [];
  const basins: Basin[] = [];
  const find = (b: number) => {
    while (parent[b] !== b) b = parent[b] = parent[parent[b]];
    return b;
  };
  const close = (basin: Basin, at: number): number => {
    const volume = (at * basin.count - basin.sum) * grid.cell * grid.cell;
    const { count: cells, lowest: floor, pits: children, members } = basin;
    const areaMm2 = cells * grid.cell * grid.cell;
    return pits.push({ spill: at, volume, cells, areaMm2, floor, parent: null, children, members }) - 1;
  };
  for (const c of sortByHeight(region, surface)) {
    const height = surface[c];
    let own = -1;
    eachNeighbour(grid, c, (n) => {
      if (basinOf[n] < 0) return;
      const other = find(basinOf[n]);
      if (own < 0) own = other;
      if (other === own) return;
      const [keep, gone] = basins[own].count >= basins[other].count ? [own, other] : [other, own];
      basins[keep] = meet(basins[keep], basins[gone], height, close);
      parent[gone] = keep;
      own = keep;
    });
    if (own < 0) {
      own =
        basins.push({ count: 0, sum: 0, lowest: c, lowestZ: height, from: height, pits: [], members: [] }) -
        1;
      parent.push(own);
    }
    const basin = basins[own];
    basin.count++;
    basin.sum += height;
    if (basin.pits.length === 0) basin.members.push(c);
    basinOf[c] = own;
  }
  close(basins[find(0)], spill);
}

/** Two basins meet at a saddle: deep ones become pits inside a common one, a shallow one is swallowed. */
function meet(large: Basin, small: Basin, at: number, close: (basin: Basin, at: number) => number): Basin {
  const deep = (basin: Basin) => at - basin.from > PIT_MM;
  const count = large.count + small.count;
  const sum = large.sum + small.sum;
  const { lowest, lowestZ } = small.lowestZ < large.lowestZ ? small : large;
  const compound = large.pits.length > 0 || small.pits.length > 0;
  if (deep(large) && deep(small)) {
    return { count, sum, lowest, lowestZ, from: at, pits: [close(large, at), close(small, at)], members: [] };
  }
  if (compound) {
    // At its own saddle still: whatever is deep joins as one more pit, the rest is swallowed.
    const pits: number[] = [];
    const grown = [large, small].find((basin) => basin.pits.length > 0 && deep(basin));
    for (const basin of [large, small]) {
      if (basin.pits.length > 0) pits.push(...basin.pits);
      else if (!grown && deep(basin)) pits.push(close(basin, at));
    }
    const from = Math.min(
      ...[large, small].filter((basin) => basin.pits.length > 0).map((basin) => basin.from),
    );
    return { count, sum, lowest, lowestZ, from, pits, members: [] };
  }
  for (const member of small.members) large.members.push(member);
  return {
    count,
    sum,
    lowest,
    lowestZ,
    from: Math.min(large.from, small.from),
    pits: [],
    members: large.members,
  };
}

/** Outer pits by volume, each followed by what lies in it; floors moved to the middle of the floor. */
function inOrder(pits: Pit[], surface: Float64Array, grid: Grid): Pit[] {
  const inner = new Set(pits.flatMap((pit) => pit.children));
  const bySize = (a: number, b: number) => pits[b].volume - pits[a].volume || pits[a].floor - pits[b].floor;
  const list: Pit[] = [];
  const place = (id: number, parent: number | null) => {
    const pit = pits[id];
    const own = list.push({ ...pit, parent, children: [], floor: middleOfFloor(pit, surface, grid) }) - 1;
    for (const child of [...pit.children].sort(bySize)) list[own].children.push(place(child, own));
    return own;
  };
  for (const id of pits.map((_, id) => id).filter((id) => !inner.has(id)).sort(bySize)) place(id, null); // prettier-ignore
  return list;
}

/** The floor cell nearest to the middle of all cells that are as low. */
function middleOfFloor(pit: Pit, surface: Float64Array, grid: Grid): number {
  const low = pit.members.filter((c) => surface[c] - surface[pit.floor] <= PIT_MM);
  if (low.length === 0) return pit.floor;
  const { nx } = grid;
  const x = low.reduce((sum, c) => sum + (c % nx), 0) / low.length;
  const y = low.reduce((sum, c) => sum + Math.floor(c / nx), 0) / low.length;
  const far = (c: number) => ((c % nx) - x) ** 2 + (Math.floor(c / nx) - y) ** 2;
  return low.reduce((best, c) => (far(c) < far(best) ? c : best));
}
