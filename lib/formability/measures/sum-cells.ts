import type { Facets } from '../mesh/measure-facets';
import type { Mesh } from '../mesh/mesh';
import { CellTable } from './cell-table';

/** Points on large facets, altogether, beyond which they are spread more thinly. */
const MOST_POINTS = 8_000_000;
const MOST_A_SIDE = 256;

/** Area vectors summed over the cells of a uniform grid, those that hold any. */
export interface CellSums {
  count: number;
  table: CellTable;
  i: Int32Array;
  j: Int32Array;
  k: Int32Array;
  x: Float64Array;
  y: Float64Array;
  z: Float64Array;
  /** Lengths, not vectors, of the level parts: more than the vectors' where directions differ (noise, corners). */
  level: Float64Array;
}

/**
 * Area vectors per cell; a facet longer than a third of a cell is spread over points on it. In height each point is
 * shared between the two nearest cells by distance, so a step that falls on a cell's rim does not tip the balance.
 */
export function sumCells(mesh: Mesh, facets: Facets, skip: Uint8Array, cell: number): CellSums {
  const { index, position: p, triangles } = mesh;
  const out = new Sums();
  const scale = 1 / cell;
  const expected = (18 * facets.totalArea) / (cell * cell);
  const thin = expected > MOST_POINTS ? Math.sqrt(MOST_POINTS / expected) : 1;
  for (let t = 0; t < triangles; t++) {
    if (skip[t] || facets.area[t] === 0) continue;
    let a = index[3 * t] * 3;
    let b = index[3 * t + 1] * 3;
    let d = index[3 * t + 2] * 3;
    // Turned so that the longest side runs from a to b.
    const ab = squared(p, a, b);
    const bd = squared(p, b, d);
    const da = squared(p, d, a);
    if (bd > ab && bd >= da) [a, b, d] = [b, d, a];
    else if (da > ab && da > bd) [a, b, d] = [d, a, b];
    const ux = p[b] - p[a];
    const uy = p[b + 1] - p[a + 1];
    const uz = p[b + 2] - p[a + 2];
    const vx = p[d] - p[a];
    const vy = p[d + 1] - p[a + 1];
    const vz = p[d + 2] - p[a + 2];
    const x = (uy * vz - uz * vy) / 2;
    const y = (uz * vx - ux * vz) / 2;
    const z = (ux * vy - uy * vx) / 2;
    const long = Math.sqrt(ux * ux + uy * uy + uz * uz);
    const n = Math.min(MOST_A_SIDE, Math.ceil(3 * long * scale * thin));
    if (n === 1) {
      const height = (p[a + 2] + (uz + vz) / 3) * scale - 0.5;
      const k = Math.floor(height);
      out.move(Math.floor((p[a] + (ux + vx) / 3) * scale), Math.floor((p[a + 1] + (uy + vy) / 3) * scale), k);
      const own = out.take(0);
      const level = Math.sqrt(x * x + y * y);
      const lower = k + 1 - height;
      out.x[own] += x * lower;
      out.y[own] += y * lower;
      out.z[own] += z * lower;
      out.level[own] += level * lower;
      const above = out.take(1);
      const upper = height - k;
      out.x[above] += x * upper;
      out.y[above] += y * upper;
      out.z[above] += z * upper;
      out.level[above] += level * upper;
      continue;
    }
    const m = Math.min(MOST_A_SIDE, Math.ceil((6 * facets.area[t] * scale * thin) / long));
    // Slices across the longest side; `foot` is where the third corner stands over it.
    const foot = (ux * vx + uy * vy + uz * vz) / (long * long);
    let before = 0;
    for (let i = 0; i < n; i++) {
      const s = (i + 0.5) / n;
      const end = (i + 1) / n;
      // Share of the facet's area up to the slice's end.
      const upTo =
        end < foot ? (end * end) / foot : 1 - (i + 1 === n ? 0 : ((1 - end) * (1 - end)) / (1 - foot));
      const share = (upTo - before) / m;
      before = upTo;
      // The slice runs from s·u to a point on one of the other two sides.
      const rise = s < foot ? s / foot : (1 - s) / (1 - foot);
      const along = s < foot ? 0 : 1 - rise;
      for (let j = 0; j < m; j++) {
        const up = (j + 0.5) / m;
        const us = s + up * (along - s);
        const vs = up * rise;
        // Shared in plan too: points of large facets lie in rows, which a cell's rim would count unevenly.
        const wide = (p[a] + us * ux + vs * vx) * scale - 0.5;
        const deep = (p[a + 1] + us * uy + vs * vy) * scale - 0.5;
        const height = (p[a + 2] + us * uz + vs * vz) * scale - 0.5;
        const ci = Math.floor(wide);
        const cj = Math.floor(deep);
        const ck = Math.floor(height);
        const fx = wide - ci;
        const fy = deep - cj;
        const lower = ck + 1 - height;
        const upper = height - ck;
        out.move(ci, cj, ck);
        for (let side = 0; side < 4; side++) {
          const part = (side & 1 ? fx : 1 - fx) * (side & 2 ? fy : 1 - fy);
          const px = part * (x * share);
          const py = part * (y * share);
          const pz = part * (z * share);
          const level = Math.sqrt(px * px + py * py);
          const own = out.take(2 * side);
          out.x[own] += px * lower;
          out.y[own] += py * lower;
          out.z[own] += pz * lower;
          out.level[own] += level * lower;
          const above = out.take(2 * side + 1);
          out.x[above] += px * upper;
          out.y[above] += py * upper;
          out.z[above] += pz * upper;
          out.level[above] += level * upper;
        }
      }
    }
  }
  return out;
}

function squared(p: Float64Array, a: number, b: number): number {
  const x = p[b] - p[a];
  const y = p[b + 1] - p[a + 1];
  const z = p[b + 2] - p[a + 2];
  return x * x + y * y + z * z;
}

class Sums implements CellSums {
  count = 0;
  readonly table = new CellTable();
  i = new Int32Array(4096);
  j = new Int32Array(4096);
  k = new Int32Array(4096);
  x = new Float64Array(4096);
  y = new Float64Array(4096);
  z = new Float64Array(4096);
  level = new Float64Array(4096);
  /** Numbers of a cell and its neighbours at +1: two levels, by x, then y; −1 where not looked up yet. */
  private readonly block = new Int32Array(8);
  private atI = -0x40000000;
  private atJ = 0;
  private atK = 0;

  /** Makes a cell the one that `take` counts from: neighbours in the list are neighbours in space, so most stay. */
  move(i: number, j: number, k: number): void {
    if (i === this.atI && j === this.atJ && k === this.atK) return;
    this.atI = i;
    this.atJ = j;
    this.atK = k;
    this.block.fill(-1);
  }

  /** The number of a cell of the block: bit 0 one up, bit 1 one along x, bit 2 one along y. */
  take(which: number): number {
    const known = this.block[which];
    if (known >= 0) return known;
    const i = this.atI + ((which >> 1) & 1);
    const j = this.atJ + (which >> 2);
    const k = this.atK + (which & 1);
    const c = this.table.find(i, j, k, this.count);
    if (c === this.count) this.begin(i, j, k);
    this.block[which] = c;
    return c;
  }

  private begin(i: number, j: number, k: number): void {
    if (this.count === this.i.length) {
      const wider = 2 * this.count;
      [this.i, this.j, this.k] = [this.i, this.j, this.k].map((from) => {
        const to = new Int32Array(wider);
        to.set(from);
        return to;
      });
      [this.x, this.y, this.z, this.level] = [this.x, this.y, this.z, this.level].map((from) => {
        const to = new Float64Array(wider);
        to.set(from);
        return to;
      });
    }
    this.i[this.count] = i;
    this.j[this.count] = j;
    this.k[this.count] = k;
    this.count++;
  }
}
