import type { Facets } from '../mesh/measure-facets';
import type { Mesh } from '../mesh/mesh';

/** Most cells along one side: more costs memory and saves no time on a million facets. */
const MOST_A_SIDE = 128;
/** A grid that would hold more entries than this is made coarser. */
const MOST_ENTRIES = 1 << 23;

/** Facets sorted into the cubes of a uniform grid, for rays. */
export interface FacetGrid {
  cell: number;
  /** Cells along x, y, z. */
  count: [number, number, number];
  /** Corner of the first cell. */
  low: [number, number, number];
  /** Where each cell's list begins in `facet`; one more than there are cells. */
  start: Uint32Array;
  facet: Uint32Array;
  /** One bit a cell: it lists any. */
  occupied: Uint32Array;
}

/**
 * Every facet into each cell that it may touch (never missed, seldom one too many). A facet that is longer than a
 * cell is spread over the plane it mostly lies in: row by row its own extent, and in the third direction the plane's.
 */
export function buildFacetGrid(mesh: Mesh, facets: Facets): FacetGrid {
  const { position: p } = mesh;
  const low: [number, number, number] = [Infinity, Infinity, Infinity];
  const high: [number, number, number] = [-Infinity, -Infinity, -Infinity];
  for (let k = 0; k < 3; k++) [low[k], high[k]] = extent(p, k);
  const size = high.map((value, k) => Math.max(value - low[k], 1e-6));
  const longest = Math.max(...size);
  // A closed surface fills a number of cells that grows with the square of the cells a side.
  let aSide = Math.min(MOST_A_SIDE, Math.max(8, Math.ceil(Math.sqrt(mesh.triangles) / 4)));
  for (;;) {
    const cell = (longest / aSide) * (1 + 1e-9);
    const count = size.map((value) => Math.max(1, Math.ceil(value / cell + 1e-6))) as [
      number,
      number,
      number,
    ];
    const start = new Uint32Array(count[0] * count[1] * count[2] + 1);
    const only = new Int32Array(mesh.triangles).fill(IN_NONE);
    const pairs = new Pairs();
    if (!spread(mesh, facets, cell, count, low, start, only, pairs) && aSide > 8) {
      aSide = aSide >> 1;
      continue;
    }
    const occupied = new Uint32Array((start.length >> 5) + 1);
    const facet = new Uint32Array(addUp(start, occupied));
    fill(start, only, pairs.data, pairs.used, facet);
    return { cell, count, low, start, facet, occupied };
  }
}

/** A facet in no cell, or in several. */
const IN_NONE = -1;
const IN_SEVERAL = -2;

function extent(p: Float64Array, axis: number): [number, number] {
  let low = Infinity;
  let high = -Infinity;
  for (let v = axis; v < p.length; v += 3) {
    if (p[v] < low) low = p[v];
    if (p[v] > high) high = p[v];
  }
  return [low, high];
}

/** Turns numbers of entries into ends of lists, and marks the cells that have any; returns the sum. */
function addUp(start: Uint32Array, occupied: Uint32Array): number {
  let sum = 0;
  for (let c = 0; c < start.length; c++) {
    if (start[c] === 0) {
      start[c] = sum;
      continue;
    }
    occupied[c >> 5] |= 1 << (c & 31);
    sum += start[c];
    start[c] = sum;
  }
  return sum;
}

/** Filled from each list's end, so the starts end up where they belong. */
function fill(
  start: Uint32Array,
  only: Int32Array,
  pairs: Uint32Array,
  used: number,
  facet: Uint32Array,
): void {
  let e = used;
  for (let t = only.length - 1; t >= 0; t--) {
    if (only[t] >= 0) facet[--start[only[t]]] = t;
    else if (only[t] === IN_SEVERAL) {
      for (; e > 0 && pairs[e - 1] === t; e -= 2) facet[--start[pairs[e - 2]]] = t;
    }
  }
}

/** Growable list of cell, facet. */
class Pairs {
  data = new Uint32Array(1 << 16);
  used = 0;

  add(cell: number, facet: number): void {
    if (this.used + 2 > this.data.length) {
      const wider = new Uint32Array(this.data.length * 2);
      wider.set(this.data);
      this.data = wider;
    }
    this.data[this.used++] = cell;
    this.data[this.used++] = facet;
  }
}

/**
 * Lists every facet with each cell it may touch; false where that would be too many.
 * @param start counts the entries of each cell
 * @param only the cell of each facet that lies in one; the others' go to `pairs`
 */
function spread(
  mesh: Mesh,
  facets: Facets,
  cell: number,
  count: readonly number[],
  low: readonly number[],
  start: Uint32Array,
  only: Int32Array,
  pairs: Pairs,
): boolean {
  const { index, position: p } = mesh;
  const { area } = facets;
  const [nx, ny] = count;
  const [lx, ly, lz] = low;
  const scale = 1 / cell;
  const stride = [1, nx, nx * ny];
  const cellOf = cellsOfVertices(p, lx, ly, lz, scale, nx, ny);
  let alone = 0;
  const add = (c: number, t: number) => {
    start[c]++;
    pairs.add(c, t);
  };
  for (let t = 0, c = 0; c < index.length; t++, c += 3) {
    if (area[t] === 0) continue;
    const own = cellOf[index[c]];
    if (own === cellOf[index[c + 1]] && own === cellOf[index[c + 2]]) {
      only[t] = own;
      start[own]++;
      alone++;
      continue;
    }
    only[t] = IN_SEVERAL;
    const a = index[c] * 3;
    const b = index[c + 1] * 3;
    const d = index[c + 2] * 3;
    const i0 = ((least(p[a], p[b], p[d]) - lx) * scale) | 0;
    const i1 = ((most(p[a], p[b], p[d]) - lx) * scale) | 0;
    const j0 = ((least(p[a + 1], p[b + 1], p[d + 1]) - ly) * scale) | 0;
    const j1 = ((most(p[a + 1], p[b + 1], p[d + 1]) - ly) * scale) | 0;
    const k0 = ((least(p[a + 2], p[b + 2], p[d + 2]) - lz) * scale) | 0;
    const k1 = ((most(p[a + 2], p[b + 2], p[d + 2]) - lz) * scale) | 0;
    const cells = (i1 - i0 + 1) * (j1 - j0 + 1) * (k1 - k0 + 1);
    if (cells <= 4) {
      for (let k = k0; k <= k1; k++) {
        for (let j = j0; j <= j1; j++) {
          for (let i = i0; i <= i1; i++) add((k * ny + j) * nx + i, t);
        }
      }
      continue;
    }
    if (pairs.used > 2 * (MOST_ENTRIES - alone)) {
      only[t] = IN_NONE;
      return false;
    }
    const [ax, ay, az] = [Math.abs(facets.nx[t]), Math.abs(facets.ny[t]), Math.abs(facets.nz[t])];
    const w = az >= ax && az >= ay ? 2 : ax >= ay ? 0 : 1;
    const u = w === 0 ? 1 : 0;
    const v = w === 2 ? 1 : 2;
    const lows = [i0, j0, k0];
    const highs = [i1, j1, k1];
    // Along the facet's plane, in cells: w = w0 + gu·u + gv·v.
    const [ua, va, wa] = [(p[a + u] - low[u]) * scale, (p[a + v] - low[v]) * scale, (p[a + w] - low[w]) * scale]; // prettier-ignore
    const [ub, vb, wb] = [(p[b + u] - low[u]) * scale, (p[b + v] - low[v]) * scale, (p[b + w] - low[w]) * scale]; // prettier-ignore
    const [ud, vd, wd] = [(p[d + u] - low[u]) * scale, (p[d + v] - low[v]) * scale, (p[d + w] - low[w]) * scale]; // prettier-ignore
    const across = (ub - ua) * (vd - va) - (vb - va) * (ud - ua);
    const gu = ((wb - wa) * (vd - va) - (wd - wa) * (vb - va)) / across;
    const gv = ((wd - wa) * (ub - ua) - (wb - wa) * (ud - ua)) / across;
    const half = (Math.abs(gu) + Math.abs(gv)) / 2 + 1e-6;
    for (let iu = lows[u]; iu <= highs[u]; iu++) {
      // Extent in v of the part of the facet between u = iu and u = iu + 1.
      let vLow = Infinity;
      let vHigh = -Infinity;
      for (let side = 0; side < 3; side++) {
        const u0 = side === 0 ? ua : side === 1 ? ub : ud;
        const v0 = side === 0 ? va : side === 1 ? vb : vd;
        const u1 = side === 0 ? ub : side === 1 ? ud : ua;
        const v1 = side === 0 ? vb : side === 1 ? vd : va;
        const s0 = Math.max(Math.min(u0, u1), iu);
        const s1 = Math.min(Math.max(u0, u1), iu + 1);
        if (s0 > s1) continue;
        const slope = u1 === u0 ? 0 : (v1 - v0) / (u1 - u0);
        const e0 = u1 === u0 ? v0 : v0 + (s0 - u0) * slope;
        const e1 = u1 === u0 ? v1 : v0 + (s1 - u0) * slope;
        vLow = Math.min(vLow, e0, e1);
        vHigh = Math.max(vHigh, e0, e1);
      }
      const from = Math.max(lows[v], Math.floor(vLow - 1e-6));
      const to = Math.min(highs[v], Math.floor(vHigh + 1e-6));
      for (let iv = from; iv <= to; iv++) {
        const middle = wa + gu * (iu + 0.5 - ua) + gv * (iv + 0.5 - va);
        const w0 = Math.max(lows[w], Math.floor(middle - half));
        const w1 = Math.min(highs[w], Math.floor(middle + half));
        for (let iw = w0; iw <= w1; iw++) {
          add(iu * stride[u] + iv * stride[v] + iw * stride[w], t);
        }
      }
    }
  }
  return true;
}

function cellsOfVertices(
  p: Float64Array,
  lx: number,
  ly: number,
  lz: number,
  scale: number,
  nx: number,
  ny: number,
): Int32Array {
  const cellOf = new Int32Array(p.length / 3);
  for (let v = 0, o = 0; v < cellOf.length; v++, o += 3) {
    const i = ((p[o] - lx) * scale) | 0;
    const j = ((p[o + 1] - ly) * scale) | 0;
    const k = ((p[o + 2] - lz) * scale) | 0;
    cellOf[v] = (k * ny + j) * nx + i;
  }
  return cellOf;
}

function least(a: number, b: number, c: number): number {
  return a < b ? (a < c ? a : c) : b < c ? b : c;
}

function most(a: number, b: number, c: number): number {
  return a > b ? (a > c ? a : c) : b > c ? b : c;
}
