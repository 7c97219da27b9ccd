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
      out.share(p[a] + (ux + vx) / 3, p[a + 1] + (uy + vy) / 3, p[a + 2] + (uz + vz) / 3, x, y, z, scale);
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
        out.spread(
          p[a] + us * ux + vs * vx,
          p[a + 1] + us * uy + vs * vy,
          p[a + 2] + us * uz + vs * vz,
          x * share,
          y * share,
          z * share,
          scale,
        );
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
  /** The cells met last, one for even and one for odd levels: neighbours in the list are neighbours in space. */
  private even = 0;
  private odd = 0;

  /** Gives an area vector at a point to the two cells nearest in height. */
  share(px: number, py: number, pz: number, x: number, y: number, z: number, scale: number): void {
    const height = pz * scale - 0.5;
    const k = Math.floor(height);
    const i = Math.floor(px * scale);
    const j = Math.floor(py * scale);
    this.add(i, j, k, x, y, z, k + 1 - height);
    this.add(i, j, k + 1, x, y, z, height - k);
  }

  /** The same, shared in plan too: points of large facets lie in rows, which a cell's rim would count unevenly. */
  spread(px: number, py: number, pz: number, x: number, y: number, z: number, scale: number): void {
    const wide = px * scale - 0.5;
    const deep = py * scale - 0.5;
    const i = Math.floor(wide);
    const j = Math.floor(deep);
    const [fx, fy] = [wide - i, deep - j];
    const at = (i + 0.5) / scale;
    const beside = (i + 1.5) / scale;
    const front = (j + 0.5) / scale;
    const back = (j + 1.5) / scale;
    const [a, b, c, d] = [(1 - fx) * (1 - fy), fx * (1 - fy), (1 - fx) * fy, fx * fy];
    this.share(at, front, pz, a * x, a * y, a * z, scale);
    this.share(beside, front, pz, b * x, b * y, b * z, scale);
    this.share(at, back, pz, c * x, c * y, c * z, scale);
    this.share(beside, back, pz, d * x, d * y, d * z, scale);
  }

  private add(i: number, j: number, k: number, x: number, y: number, z: number, share: number): void {
    let c = k & 1 ? this.odd : this.even;
    if (this.count === 0 || this.i[c] !== i || this.j[c] !== j || this.k[c] !== k) {
      c = this.table.find(i, j, k, this.count);
      if (c === this.count) this.begin(i, j, k);
      if (k & 1) this.odd = c;
      else this.even = c;
    }
    this.x[c] += x * share;
    this.y[c] += y * share;
    this.z[c] += z * share;
    this.level[c] += Math.sqrt(x * x + y * y) * share;
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
