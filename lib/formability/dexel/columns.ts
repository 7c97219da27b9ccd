import type { Grid } from './grid';
import type { Hits } from './raster';

/** Touching surfaces nearer than this, in mm, leave no air between them. */
export const GAP_MM = 1e-4;
/** Doubly covered solid thinner than this, in mm, is rounding. */
const OVERLAP_MM = 1e-3;

/**
 * The solid on every vertical line: `count[c]` intervals of column c, interval i from `z[s]` up to `z[s + 1]`
 * with s = start[c] + 2i, bounded by facets `facet[s]` and `facet[s + 1]` (−1: the bed, or a repaired gap).
 * The slot s also names the air gap below interval i.
 */
export interface Columns {
  grid: Grid;
  start: Uint32Array;
  count: Uint32Array;
  z: Float64Array;
  facet: Int32Array;
  /** Height of the highest solid point, 0 where there is none. */
  height: Float64Array;
  /** Integral over all columns of (winding − 1 where it is positive, winding elsewhere), mm³. */
  excessVolume: number;
  solidVolume: number;
  overlapColumns: number;
  /** The columns so counted. */
  oddColumns: number[];
  touchingColumns: number;
  openColumns: number;
  closedAtBed: number;
  filledColumns: number;
}

/**
 * Sorts each column's hits and turns winding numbers into intervals, in the arrays of `hits` itself.
 * Solid is where the winding is above 0, so overlapping shells count once. Columns that do not close belong to
 * open meshes: a missing underside is taken to be the bed, a missing top the neighbour's height.
 * @param ofShell shell of each facet, to tell touching shells
 */
export function buildColumns(hits: Hits, grid: Grid, ofShell: Uint32Array): Columns {
  const { start, count, z, code } = hits;
  const columns = start.length - 1;
  const out: Columns = {
    grid,
    start,
    count: new Uint32Array(columns),
    z,
    facet: code,
    height: new Float64Array(columns),
    excessVolume: 0,
    solidVolume: 0,
    overlapColumns: 0,
    oddColumns: [],
    touchingColumns: 0,
    openColumns: 0,
    closedAtBed: 0,
    filledColumns: 0,
  };
  for (let c = 0; c < columns; c++) {
    if (count[c] === 0) continue;
    sortColumn(z, code, start[c], start[c] + count[c]);
    buildColumn(out, c, count[c], ofShell);
  }
  const cellArea = grid.cell * grid.cell;
  out.excessVolume *= cellArea;
  out.solidVolume *= cellArea;
  return out;
}

function buildColumn(out: Columns, c: number, hits: number, ofShell: Uint32Array): void {
  const { start, z, facet } = out;
  const first = start[c];
  let ends = 0;
  for (let i = first; i < first + hits; i++) ends += facet[i] & 1 ? 1 : -1;
  let winding = ends < 0 ? -ends : 0;
  let open = winding > 0;
  let from = 0;
  let fromFacet = -1;
  let overlap = 0;
  if (ends !== 0) out.openColumns++;
  if (open) {
    out.closedAtBed++;
    shiftUp(z, facet, first, hits);
  }
  // Intervals overwrite slots whose hits are already read: two hits in, at most two slots out.
  const end = first + hits + (open ? 1 : 0);
  for (let i = end - hits; i < end; i++) {
    const here = z[i];
    const code = facet[i];
    winding += code & 1 ? 1 : -1;
    if (!open && winding > 0) {
      open = true;
      from = here;
      fromFacet = code >> 1;
    } else if (open && winding <= 0) {
      open = false;
      pushInterval(out, c, from, here, fromFacet, code >> 1, ofShell);
    }
    // One body standing on another: the upper is entered, in the order of ties, before the lower is left.
    if (winding > 1 && i + 1 < end && code & 1 && !(facet[i + 1] & 1) && z[i + 1] - here <= GAP_MM) {
      if (ofShell[code >> 1] !== ofShell[facet[i + 1] >> 1]) out.touchingColumns++;
    }
    const extra = winding > 0 ? winding - 1 : winding;
    if (extra !== 0 && i + 1 < end) {
      out.excessVolume += extra * (z[i + 1] - here);
      overlap += z[i + 1] - here;
    }
  }
  if (open) {
    out.filledColumns++;
    const beside = c % out.grid.nx > 0 ? out.height[c - 1] : 0;
    if (beside > from) pushInterval(out, c, from, beside, fromFacet, -1, ofShell);
  }
  if (overlap > OVERLAP_MM) {
    out.overlapColumns++;
    out.oddColumns.push(c);
  }
  const n = out.count[c];
  if (n > 0) out.height[c] = z[first + 2 * n - 1];
  for (let s = first; s < first + 2 * n; s += 2) out.solidVolume += z[s + 1] - z[s];
}

/** Makes room for an interval that begins without a hit; open meshes have free slots at a column's end. */
function shiftUp(z: Float64Array, facet: Int32Array, first: number, hits: number): void {
  for (let i = first + hits - 1; i >= first; i--) {
    z[i + 1] = z[i];
    facet[i + 1] = facet[i];
  }
}

/** Appends an interval, cut at the bed; one that touches the interval below is joined to it. */
function pushInterval(
  out: Columns,
  c: number,
  from: number,
  to: number,
  fromFacet: number,
  toFacet: number,
  ofShell: Uint32Array,
): void {
  const { start, count, z, facet } = out;
  if (!(to > 0 && to > from)) return;
  const cut = from < 0;
  const top = start[c] + 2 * count[c] - 1;
  if (count[c] > 0 && from - z[top] <= GAP_MM) {
    if (
      from - z[top] > -GAP_MM &&
      fromFacet >= 0 &&
      facet[top] >= 0 &&
      ofShell[fromFacet] !== ofShell[facet[top]]
    ) {
      out.touchingColumns++;
    }
    z[top] = to;
    facet[top] = toFacet;
    return;
  }
  z[top + 1] = cut ? 0 : from;
  facet[top + 1] = cut ? -1 : fromFacet;
  z[top + 2] = to;
  facet[top + 2] = toFacet;
  count[c]++;
}

const GAPS = [701, 301, 132, 57, 23, 10, 4, 1];

/** Shell sort by height, entering before leaving, then by facet, so the order never hangs on the file's. */
function sortColumn(z: Float64Array, code: Int32Array, first: number, end: number): void {
  const n = end - first;
  let g = n <= 8 ? GAPS.length - 1 : 0;
  while (GAPS[g] >= n && g < GAPS.length - 1) g++;
  for (; g < GAPS.length; g++) {
    const gap = GAPS[g];
    for (let i = first + gap; i < end; i++) {
      const height = z[i];
      const own = code[i];
      let k = i;
      while (k >= first + gap && comesAfter(z[k - gap], code[k - gap], height, own)) {
        z[k] = z[k - gap];
        code[k] = code[k - gap];
        k -= gap;
      }
      z[k] = height;
      code[k] = own;
    }
  }
}

function comesAfter(za: number, a: number, zb: number, b: number): boolean {
  if (za !== zb) return za > zb;
  return (a & 1) !== (b & 1) ? (a & 1) === 0 : a > b;
}
