import { UnionFind } from '../mesh/union-find';
import { GAP_MM, type Columns } from './columns';

/** Gap states. */
export const NO_GAP = 0;
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
  const beyond = rim === 'open' ? -1 : -2;
  const isGap = (c: number, s: number) => z[s] - gapFloor(columns, c, s) > GAP_MM;
  const { nx, ny } = grid;
  for (let c = 0; c < nx * ny; c++) {
    const i = c % nx;
    const j = (c - i) / nx;
    markMouths(columns, surface, c, i > 0 ? c - 1 : beyond, mouth);
    markMouths(columns, surface, c, i + 1 < nx ? c + 1 : beyond, mouth);
    markMouths(columns, surface, c, j > 0 ? c - nx : beyond, mouth);
    markMouths(columns, surface, c, j + 1 < ny ? c + nx : beyond, mouth);
    if (i + 1 < nx) joinGaps(columns, c, c + 1, joined);
    if (j + 1 < ny) joinGaps(columns, c, c + nx, joined);
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
      if (!isGap(c, s)) continue;
      const root = joined.find(s);
      if (number[root] < 0) number[root] = pockets++;
      pocket[s] = number[root];
      const length = z[s] - gapFloor(columns, c, s);
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

function markMouths(
  columns: Columns,
  surface: Float64Array,
  c: number,
  beside: number,
  mouth: Uint8Array,
): void {
  const { start, count, z } = columns;
  if (beside === -2) return;
  const over = beside < 0 ? 0 : surface[beside];
  for (let k = 0, s = start[c]; k < count[c]; k++, s += 2) {
    if (z[s] - gapFloor(columns, c, s) > GAP_MM && z[s] > over + GAP_MM) mouth[s] = 1;
  }
}

/** Walks both columns' gaps upwards together. */
function joinGaps(columns: Columns, a: number, b: number, joined: UnionFind): void {
  const { start, count, z } = columns;
  let sa = start[a];
  let sb = start[b];
  const endA = sa + 2 * count[a];
  const endB = sb + 2 * count[b];
  while (sa < endA && sb < endB) {
    const floorA = gapFloor(columns, a, sa);
    const floorB = gapFloor(columns, b, sb);
    const low = floorA > floorB ? floorA : floorB;
    const high = z[sa] < z[sb] ? z[sa] : z[sb];
    if (high - low > GAP_MM) joined.join(sa, sb);
    if (z[sa] <= z[sb]) sa += 2;
    else sb += 2;
  }
}
