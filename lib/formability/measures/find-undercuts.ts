import { CONNECTED, gapFloor, type Air } from '../dexel/air';
import { GAP_MM, type Columns } from '../dexel/columns';
import { centreX, centreY } from '../dexel/grid';
import type { UndercutRegion } from '../report';

/** Regions are listed from the deepest down, at most this many. */
const MOST_REGIONS = 50;

interface Draftee {
  cells: number;
  sum: number;
  depth: number;
  deepest: number;
  slot: number;
  low: number;
  high: number;
}

/**
 * Pockets of connected air under the part, each with its greatest horizontal depth: how far the farthest covered
 * point lies from the lip, in plan. The nearest lip point travels inwards from gap to gap, so it follows
 * the pocket round corners.
 */
export function findUndercuts(columns: Columns, air: Air): UndercutRegion[] {
  const { grid, start, count, z } = columns;
  const { nx, ny, cell } = grid;
  const depth = spreadDepth(columns, air);
  const regions = new Map<number, Draftee>();
  for (let c = 0; c < nx * ny; c++) {
    for (let k = 0, s = start[c]; k < count[c]; k++, s += 2) {
      if (air.state[s] !== CONNECTED) continue;
      const floor = gapFloor(columns, c, s);
      let region = regions.get(air.pocket[s]);
      if (!region) {
        region = { cells: 0, sum: 0, depth: -1, deepest: c, slot: s, low: Infinity, high: -Infinity };
        regions.set(air.pocket[s], region);
      }
      region.cells++;
      region.sum += z[s] - floor;
      region.low = Math.min(region.low, floor);
      region.high = Math.max(region.high, z[s]);
      if (depth[s] > region.depth) {
        region.depth = depth[s];
        region.deepest = c;
        region.slot = s;
      }
    }
  }
  const list = Array.from(regions.values()).map((region): UndercutRegion => ({
    at: [centreX(grid, region.deepest), centreY(grid, region.deepest), z[region.slot]],
    planAreaMm2: region.cells * cell * cell,
    volumeMm3: region.sum * cell * cell,
    maxDepthMm: Math.max(region.depth, 0),
    zMm: [region.low, region.high],
  }));
  list.sort(
    (a, b) =>
      b.maxDepthMm - a.maxDepthMm || b.volumeMm3 - a.volumeMm3 || a.at[0] - b.at[0] || a.at[1] - b.at[1],
  );
  return list.slice(0, MOST_REGIONS);
}

/** Horizontal distance of every connected gap from its nearest lip, mm. */
export function spreadDepth(columns: Columns, air: Air, rim: 'open' | 'unknown' = 'open'): Float32Array {
  const { grid, start, count, z, height } = columns;
  const { nx, ny, cell } = grid;
  const slots = z.length;
  const depth = new Float32Array(slots).fill(Infinity);
  const lipX = new Float32Array(slots);
  const lipY = new Float32Array(slots);
  const columnOf = new Int32Array(slots);
  let queue: number[] = [];
  const offer = (c: number, s: number, x: number, y: number) => {
    // Half a cell: the solid's face lies, on average, that far behind the last covered centre.
    const far = Math.hypot(centreX(grid, c) - x, centreY(grid, c) - y) + cell / 2;
    if (far >= depth[s] - 1e-6) return;
    depth[s] = far;
    lipX[s] = x;
    lipY[s] = y;
    queue.push(s);
  };
  const sides = [1, -1, nx, -nx];
  const inside = (c: number, side: number) =>
    side === 1 ? c % nx < nx - 1 : side === -1 ? c % nx > 0 : side > 0 ? c < nx * (ny - 1) : c >= nx;
  for (let c = 0; c < nx * ny; c++) {
    for (let k = 0, s = start[c]; k < count[c]; k++, s += 2) {
      columnOf[s] = c;
      if (!air.mouth[s] || air.state[s] !== CONNECTED) continue;
      for (const side of sides) {
        if (!inside(c, side) ? rim === 'unknown' : height[c + side] >= z[s] - GAP_MM) continue;
        const dx = side === 1 ? cell / 2 : side === -1 ? -cell / 2 : 0;
        const dy = side === nx ? cell / 2 : side === -nx ? -cell / 2 : 0;
        offer(c, s, centreX(grid, c) + dx, centreY(grid, c) + dy);
      }
    }
  }
  while (queue.length > 0) {
    const wave = queue;
    queue = [];
    for (const s of wave) {
      const c = columnOf[s];
      const floor = gapFloor(columns, c, s);
      for (const side of sides) {
        if (!inside(c, side)) continue;
        const n = c + side;
        for (let k = 0, r = start[n]; k < count[n]; k++, r += 2) {
          const low = Math.max(floor, gapFloor(columns, n, r));
          if (Math.min(z[s], z[r]) - low > GAP_MM) offer(n, r, lipX[s], lipY[s]);
        }
      }
    }
  }
  return depth;
}
