import { CONNECTED, type Air } from '../dexel/air';
import { GAP_MM, type Columns } from '../dexel/columns';
import { centreX, centreY, type Grid } from '../dexel/grid';
import type { UndercutRegion } from '../report';

/** Regions are listed from the deepest down, at most this many. */
const MOST_REGIONS = 50;

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
  const { grid, start, count, z, facet } = columns;
  const { state, pocket } = air;
  const { cell } = grid;
  const depth = spreadDepth(columns, air);
  const cells = new Int32Array(air.pockets);
  const sum = new Float64Array(air.pockets);
  const most = new Float64Array(air.pockets).fill(-1);
  const deepest = new Int32Array(air.pockets);
  const slot = new Int32Array(air.pockets);
  const low = new Float64Array(air.pockets).fill(Infinity);
  const high = new Float64Array(air.pockets).fill(-Infinity);
  for (let c = 0; c < count.length; c++) {
    for (let s = start[c], end = s + 2 * count[c]; s < end; s += 2) {
      if (state[s] !== CONNECTED) continue;
      const floor = s === start[c] ? 0 : z[s - 1];
      const own = pocket[s];
      if (cells[own]++ === 0) {
        deepest[own] = c;
        slot[own] = s;
      }
      sum[own] += z[s] - floor;
      if (floor < low[own]) low[own] = floor;
      if (z[s] > high[own]) high[own] = z[s];
      if (depth[s] < Infinity && depth[s] > most[own]) {
        most[own] = depth[s];
        deepest[own] = c;
        slot[own] = s;
      }
    }
  }
  const list: UndercutRegion[] = [];
  for (let own = 0; own < cells.length; own++) {
    if (cells[own] === 0) continue;
    list.push({
      at: [centreX(grid, deepest[own]), centreY(grid, deepest[own]), z[slot[own]]],
      planAreaMm2: cells[own] * cell * cell,
      volumeMm3: sum[own] * cell * cell,
      // No lip was found (damaged meshes): about half as wide as it is.
      maxDepthMm: most[own] >= 0 ? most[own] : (Math.sqrt(cells[own]) * cell) / 2,
      zMm: [low[own], high[own]],
    });
  }
  list.sort(
    (a, b) =>
      b.maxDepthMm - a.maxDepthMm || b.volumeMm3 - a.volumeMm3 || a.at[0] - b.at[0] || a.at[1] - b.at[1],
  );
  const ceiling = new Uint8Array(triangles);
  for (let c = 0; c < count.length; c++) {
    for (let s = start[c], end = s + 2 * count[c]; s < end; s += 2) {
      if (state[s] === CONNECTED && facet[s] >= 0 && most[pocket[s]] > textureMm) ceiling[facet[s]] = 1;
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
  const wave = new Wave(grid, z.length);
  for (let c = 0; c < nx * ny; c++) {
    if (count[c] === 0) continue;
    const i = c % nx;
    const j = (c - i) / nx;
    for (let k = 0, s = start[c]; k < count[c]; k++, s += 2) {
      if (!air.mouth[s] || air.state[s] !== CONNECTED) continue;
      const opens = (inside: boolean, n: number) => (inside ? height[n] < z[s] - GAP_MM : rim === 'open');
      if (opens(i + 1 < nx, c + 1)) wave.offer(c, i, j, s, 2 * i + 1, 2 * j);
      if (opens(i > 0, c - 1)) wave.offer(c, i, j, s, 2 * i - 1, 2 * j);
      if (opens(j + 1 < ny, c + nx)) wave.offer(c, i, j, s, 2 * i, 2 * j + 1);
      if (opens(j > 0, c - nx)) wave.offer(c, i, j, s, 2 * i, 2 * j - 1);
    }
  }
  wave.run(start, count, z);
  const depth = new Float32Array(z.length).fill(Infinity);
  for (let c = 0; c < nx * ny; c++) {
    for (let k = 0, s = start[c]; k < count[c]; k++, s += 2) {
      const squared = wave.squaredAt(s);
      if (squared > 0) depth[s] = farFrom(squared, cell);
    }
  }
  return depth;
}

/** Half a cell more than to the lip: the solid's face lies, on average, that far behind the last covered centre. */
function farFrom(squared: number, cell: number): number {
  return ((Math.sqrt(squared) + 1) * cell) / 2;
}

/**
 * Gaps that wait to be settled, in lists by half cells of distance, each list first come, first served. Lips are told in
 * cells from the middle of cell 0,0, times two: those between cells are whole numbers then.
 */
class Wave {
  private readonly nx: number;
  private readonly ny: number;
  private readonly cell: number;
  /**
   * Two numbers a gap, whose slots lie two apart: squared distance, inverted once settled, 0 without one; and the lip,
   * 16 bits a coordinate, plus one.
   */
  private readonly near: Int32Array;
  private readonly first: Int32Array;
  private readonly last: Int32Array;
  /** Three numbers an entry: cell, slot, next entry. */
  private entry: Int32Array;
  private used = 0;
  private at = 0;

  constructor({ nx, ny, cell }: Grid, slots: number) {
    this.nx = nx;
    this.ny = ny;
    this.cell = cell;
    this.near = new Int32Array(slots + 2);
    const buckets = 2 * Math.ceil(Math.hypot(nx + 1, ny + 1)) + 4;
    this.first = new Int32Array(buckets).fill(-1);
    this.last = new Int32Array(buckets).fill(-1);
    this.entry = new Int32Array(3 * ((slots >> 1) + 64));
  }

  squaredAt(s: number): number {
    const known = this.near[s & -2];
    return known < 0 ? ~known : known;
  }

  private bucketOf(squared: number): number {
    return ((2 * farFrom(squared, this.cell)) / this.cell) | 0;
  }

  offer(c: number, i: number, j: number, s: number, x: number, y: number): void {
    const dx = 2 * i - x;
    const dy = 2 * j - y;
    const squared = dx * dx + dy * dy;
    const gap = s & -2;
    const known = this.near[gap];
    if (known < 0 || (known > 0 && squared > known)) return;
    const far = farFrom(squared, this.cell);
    // Equally far counts as nearer where the float32 it is told in is rounded up.
    if (squared === known && far >= Math.fround(far)) return;
    this.near[gap] = squared;
    this.near[gap + 1] = ((y + 1) << 16) | (x + 1);
    const bucket = this.bucketOf(squared);
    // Already in that list, earlier, or in one that was emptied: it would not be taken.
    if (bucket < this.at || (known > 0 && this.bucketOf(known) === bucket)) return;
    if (3 * this.used === this.entry.length) {
      const wider = new Int32Array(2 * this.entry.length);
      wider.set(this.entry);
      this.entry = wider;
    }
    const { entry } = this;
    const own = this.used++;
    entry[3 * own] = c;
    entry[3 * own + 1] = s;
    entry[3 * own + 2] = -1;
    if (this.first[bucket] < 0) this.first[bucket] = own;
    else entry[3 * this.last[bucket] + 2] = own;
    this.last[bucket] = own;
  }

  run(start: Uint32Array, count: Uint32Array, z: Float64Array): void {
    const { first, near, nx, ny } = this;
    for (; this.at < first.length; this.at++) {
      for (let own = first[this.at]; own >= 0; own = first[this.at]) {
        first[this.at] = this.entry[3 * own + 2];
        const c = this.entry[3 * own];
        const s = this.entry[3 * own + 1];
        const gap = s & -2;
        if (near[gap] < 0) continue;
        near[gap] = ~near[gap];
        const lip = near[gap + 1];
        const x = (lip & 0xffff) - 1;
        const y = (lip >>> 16) - 1;
        const i = c % nx;
        const j = ((c - i) / nx) | 0;
        const floor = s === start[c] ? 0 : z[s - 1];
        const ceiling = z[s];
        for (let side = 0; side < 4; side++) {
          const ni = side === 0 ? i + 1 : side === 1 ? i - 1 : i;
          const nj = side === 2 ? j + 1 : side === 3 ? j - 1 : j;
          if (ni < 0 || nj < 0 || ni >= nx || nj >= ny) continue;
          const n = nj * nx + ni;
          const begin = start[n];
          const end = begin + 2 * count[n];
          for (let r = begin; r < end; r += 2) {
            if (near[r & -2] < 0) continue;
            const below = r === begin ? 0 : z[r - 1];
            const low = floor > below ? floor : below;
            if ((ceiling < z[r] ? ceiling : z[r]) - low > GAP_MM) this.offer(n, ni, nj, r, x, y);
          }
        }
      }
    }
  }
}
