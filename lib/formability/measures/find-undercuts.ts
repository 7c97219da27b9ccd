import { CONNECTED, gapFloor, type Air } from '../dexel/air';
import { GAP_MM, type Columns } from '../dexel/columns';
import { centreX, centreY } from '../dexel/grid';
import type { UndercutRegion } from '../report';

/** Regions are listed from the deepest down, at most this many. */
const MOST_REGIONS = 50;

interface Pocket {
  cells: number;
  sum: number;
  depth: number;
  deepest: number;
  slot: number;
  low: number;
  high: number;
}

export interface Undercuts {
  regions: UndercutRegion[];
  /** 1 for facets that face down into a pocket deeper than `textureMm`: ceilings, not walls. */
  ceiling: Uint8Array;
  /** Air below ledges too narrow for the grid (find-thin-undercuts), mm³. */
  unseenMm3: number;
}

/**
 * Pockets of connected air under the part, each with its greatest horizontal depth: how far the farthest covered
 * point lies from the lip, in plan. The nearest lip point travels inwards from gap to gap, so it follows
 * the pocket round corners.
 */
export function findUndercuts(columns: Columns, air: Air, textureMm: number, triangles: number): Undercuts {
  const { grid, start, count, z } = columns;
  const { nx, ny, cell } = grid;
  const depth = spreadDepth(columns, air);
  const regions: (Pocket | undefined)[] = Array.from({ length: air.pockets }, () => undefined);
  for (let c = 0; c < nx * ny; c++) {
    for (let k = 0, s = start[c]; k < count[c]; k++, s += 2) {
      if (air.state[s] !== CONNECTED) continue;
      const floor = gapFloor(columns, c, s);
      let region = regions[air.pocket[s]];
      if (!region) {
        region = { cells: 0, sum: 0, depth: -1, deepest: c, slot: s, low: Infinity, high: -Infinity };
        regions[air.pocket[s]] = region;
      }
      region.cells++;
      region.sum += z[s] - floor;
      if (floor < region.low) region.low = floor;
      if (z[s] > region.high) region.high = z[s];
      if (depth[s] < Infinity && depth[s] > region.depth) {
        region.depth = depth[s];
        region.deepest = c;
        region.slot = s;
      }
    }
  }
  const list = regions
    .filter((region) => region !== undefined)
    .map((region): UndercutRegion => ({
      at: [centreX(grid, region.deepest), centreY(grid, region.deepest), z[region.slot]],
      planAreaMm2: region.cells * cell * cell,
      volumeMm3: region.sum * cell * cell,
      // No lip was found (damaged meshes): about half as wide as it is.
      maxDepthMm: region.depth >= 0 ? region.depth : (Math.sqrt(region.cells) * cell) / 2,
      zMm: [region.low, region.high],
    }));
  list.sort(
    (a, b) =>
      b.maxDepthMm - a.maxDepthMm || b.volumeMm3 - a.volumeMm3 || a.at[0] - b.at[0] || a.at[1] - b.at[1],
  );
  const ceiling = new Uint8Array(triangles);
  for (let c = 0; c < nx * ny; c++) {
    for (let k = 0, s = start[c]; k < count[c]; k++, s += 2) {
      const deep = air.state[s] === CONNECTED && (regions[air.pocket[s]]?.depth ?? 0) > textureMm;
      if (deep && columns.facet[s] >= 0) ceiling[columns.facet[s]] = 1;
    }
  }
  return { regions: list.slice(0, MOST_REGIONS), ceiling, unseenMm3: 0 };
}

/**
 * Horizontal distance of every connected gap from its nearest lip, mm. Gaps are settled from the lip inwards, in
 * buckets of half a cell, each taking over the lip point of the neighbour that reaches it first.
 */
export function spreadDepth(columns: Columns, air: Air, rim: 'open' | 'unknown' = 'open'): Float32Array {
  const { grid, start, count, z, height } = columns;
  const { nx, ny, cell } = grid;
  const slots = z.length;
  const depth = new Float32Array(slots).fill(Infinity);
  // In cells, from the middle of cell 0,0; twice the value, so lips between cells are whole numbers.
  const lipX = new Int16Array(slots);
  const lipY = new Int16Array(slots);
  const settled = new Uint8Array(slots);
  const buckets: number[][] = [];
  const offer = (i: number, j: number, s: number, x: number, y: number) => {
    const dx = 2 * i - x;
    const dy = 2 * j - y;
    // Half a cell more: the solid's face lies, on average, that far behind the last covered centre.
    const far = ((Math.sqrt(dx * dx + dy * dy) + 1) * cell) / 2;
    if (far >= depth[s]) return;
    depth[s] = far;
    lipX[s] = x;
    lipY[s] = y;
    const bucket = Math.floor((2 * far) / cell);
    while (buckets.length <= bucket) buckets.push([]);
    buckets[bucket].push(j * nx + i, s);
  };
  for (let c = 0; c < nx * ny; c++) {
    if (count[c] === 0) continue;
    const i = c % nx;
    const j = (c - i) / nx;
    for (let k = 0, s = start[c]; k < count[c]; k++, s += 2) {
      if (!air.mouth[s] || air.state[s] !== CONNECTED) continue;
      const opens = (inside: boolean, n: number) => (inside ? height[n] < z[s] - GAP_MM : rim === 'open');
      if (opens(i + 1 < nx, c + 1)) offer(i, j, s, 2 * i + 1, 2 * j);
      if (opens(i > 0, c - 1)) offer(i, j, s, 2 * i - 1, 2 * j);
      if (opens(j + 1 < ny, c + nx)) offer(i, j, s, 2 * i, 2 * j + 1);
      if (opens(j > 0, c - nx)) offer(i, j, s, 2 * i, 2 * j - 1);
    }
  }
  for (let b = 0; b < buckets.length; b++) {
    const bucket = buckets[b];
    for (let at = 0; at < bucket.length; at += 2) {
      const c = bucket[at];
      const s = bucket[at + 1];
      if (settled[s]) continue;
      settled[s] = 1;
      const i = c % nx;
      const j = (c - i) / nx;
      const floor = s === start[c] ? 0 : z[s - 1];
      for (let side = 0; side < 4; side++) {
        const ni = side === 0 ? i + 1 : side === 1 ? i - 1 : i;
        const nj = side === 2 ? j + 1 : side === 3 ? j - 1 : j;
        if (ni < 0 || nj < 0 || ni >= nx || nj >= ny) continue;
        const n = nj * nx + ni;
        for (let k = 0, r = start[n]; k < count[n]; k++, r += 2) {
          if (settled[r]) continue;
          const below = k === 0 ? 0 : z[r - 1];
          const low = floor > below ? floor : below;
          if ((z[s] < z[r] ? z[s] : z[r]) - low > GAP_MM) offer(ni, nj, r, lipX[s], lipY[s]);
        }
      }
    }
    buckets[b] = [];
  }
  return depth;
}
