import { UnionFind } from '../mesh/union-find';
import { GAP_MM, type Columns } from './columns';

/** Gap states; 0 where there is no gap. */
export const CONNECTED = 1;
export const ENCLOSED = 2;

/** The air below solids: which of it hangs together with the air above the part, over a closed bed. */
export interface Air {
  /** Per slot of a column's interval: the state of the gap below that interval. */
  state: Uint8Array;
  /** Pocket number of each gap; gaps of one pocket hang together below the part's own cover. */
  pocket: Int32Array;
  pockets: number;
  /** 1 for gaps that open straight into air above a neighbouring column. */
  mouth: Uint8Array;
  undercutVolume: number;
  enclosedVolume: number;
}

/** Lower end of the gap below the interval at slot s of column c. */
export function gapFloor(columns: Columns, c: number, s: number): number {
  return s === columns.start[c] ? 0 : columns.z[s - 1];
}

/**
 * Joins gaps of neighbouring columns (4 sides) that overlap in height; a gap that reaches above a neighbour's
 * highest solid opens to the air above the part. The bed is closed.
 * @param rim what lies beyond the grid: open air (the whole part is inside), or unknown (a window on a part)
 * @param surface the height above which air is open: H, or H with vents closed
 */
export function connectAir(
  columns: Columns,
  rim: 'open' | 'unknown' = 'open',
  surface: Float64Array = columns.height,
): Air {
  const { grid, start, count, z } = columns;
  const slots = z.length;
  const joined = new UnionFind(slots);
  const mouth = new Uint8Array(slots);
  const { nx, ny } = grid;
  markMouths(columns, surface, rim === 'open' ? 0 : Infinity, mouth);
  for (let c = 0; c < nx * ny; c++) {
    if (count[c] === 0) continue;
    if ((c + 1) % nx !== 0 && count[c + 1] > 0) joinGaps(start, count, z, c, c + 1, joined.parent);
    if (c + nx < nx * ny && count[c + nx] > 0) joinGaps(start, count, z, c, c + nx, joined.parent);
  }
  const open = new Uint8Array(slots);
  for (let s = 0; s < slots; s++) if (mouth[s]) open[joined.find(s)] = 1;
  const state = new Uint8Array(slots);
  const pocket = new Int32Array(slots).fill(-1);
  const number = new Int32Array(slots).fill(-1);
  let pockets = 0;
  let undercut = 0;
  let enclosed = 0;
  for (let c = 0; c < nx * ny; c++) {
    for (let k = 0, s = start[c]; k < count[c]; k++, s += 2) {
      const length = k === 0 ? z[s] : z[s] - z[s - 1];
      if (!(length > GAP_MM)) continue;
      const root = joined.find(s);
      if (number[root] < 0) number[root] = pockets++;
      pocket[s] = number[root];
      state[s] = open[root] ? CONNECTED : ENCLOSED;
      if (open[root]) undercut += length;
      else enclosed += length;
    }
  }
  const cellArea = grid.cell * grid.cell;
  return {
    state,
    pocket,
    pockets,
    mouth,
    undercutVolume: undercut * cellArea,
    enclosedVolume: enclosed * cellArea,
  };
}

/** @param beyond height of the surface beyond the grid */
function markMouths(
  { grid: { nx, ny }, start, count, z }: Columns,
  surface: Float64Array,
  beyond: number,
  mouth: Uint8Array,
): void {
  for (let j = 0, c = 0; j < ny; j++) {
    for (let i = 0; i < nx; i++, c++) {
      if (count[c] === 0) continue;
      const left = i > 0 ? surface[c - 1] : beyond;
      const right = i + 1 < nx ? surface[c + 1] : beyond;
      const front = j > 0 ? surface[c - nx] : beyond;
      const back = j + 1 < ny ? surface[c + nx] : beyond;
      const across = left < right ? left : right;
      const along = front < back ? front : back;
      const over = (across < along ? across : along) + GAP_MM;
      for (let k = 0, s = start[c]; k < count[c]; k++, s += 2) {
        if (z[s] > over && (k === 0 ? z[s] : z[s] - z[s - 1]) > GAP_MM) mouth[s] = 1;
      }
    }
  }
}

/** Walks both columns' gaps upwards together; the smaller slot becomes the root. */
function joinGaps(
  start: Uint32Array,
  count: Uint32Array,
  z: Float64Array,
  a: number,
  b: number,
  parent: Int32Array,
): void {
  let sa = start[a];
  let sb = start[b];
  const endA = sa + 2 * count[a];
  const endB = sb + 2 * count[b];
  let floorA = 0;
  let floorB = 0;
  while (sa < endA && sb < endB) {
    const topA = z[sa];
    const topB = z[sb];
    if ((topA < topB ? topA : topB) - (floorA > floorB ? floorA : floorB) > GAP_MM) {
      let ra = sa;
      while (parent[ra] !== ra) ra = parent[ra] = parent[parent[ra]];
      let rb = sb;
      while (parent[rb] !== rb) rb = parent[rb] = parent[parent[rb]];
      if (ra < rb) parent[rb] = ra;
      else parent[ra] = rb;
    }
    if (topA <= topB) {
      floorA = z[sa + 1];
      sa += 2;
    } else {
      floorB = z[sb + 1];
      sb += 2;
    }
  }
}
