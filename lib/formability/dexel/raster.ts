import type { Mesh } from '../mesh/mesh';
import type { Grid } from './grid';

/** Every crossing of the grid's vertical centre lines with the mesh, column by column, not yet sorted. */
export interface Hits {
  /** nx·ny + 1: where each column's slots begin. */
  start: Uint32Array;
  /** nx·ny: how many of a column's slots hold a hit. */
  count: Uint32Array;
  z: Float64Array;
  /** facet × 2 + 1 for a facet that faces down (going up, one enters the solid), + 0 for one that faces up. */
  code: Int32Array;
  /** Hits of each facet over the whole grid. */
  perFacet: Uint32Array;
}

/** Growable list of spans: cell, length, code. */
class Spans {
  data = new Int32Array(3 * 4096);
  used = 0;

  add(cell: number, length: number, code: number): void {
    if (this.used + 3 > this.data.length) {
      const wider = new Int32Array(this.data.length * 2);
      wider.set(this.data);
      this.data = wider;
    }
    this.data[this.used] = cell;
    this.data[this.used + 1] = length;
    this.data[this.used + 2] = code;
    this.used += 3;
  }
}

/**
 * Exact scanline coverage at cell centres. An edge crosses a row when its ends lie on different sides under
 * "y ≤ row"; the crossing is always reckoned from the end with "≤", so the two facets of an edge get the same
 * bits; cells from the left crossing up to, not including, the right one are hit. A shared edge is thus never hit
 * twice and never missed. The side comes from which edge is left, not from a normal that rounding may turn.
 * @param slack free slots to leave in every column (open meshes need room for what is missing)
 * @param facets only these, or all of the mesh
 */
export function rasterise(mesh: Mesh, grid: Grid, slack: number, facets?: Uint32Array): Hits {
  const { nx, ny } = grid;
  const start = new Uint32Array(nx * ny + 1);
  const perFacet = new Uint32Array(mesh.triangles);
  const spans = collectSpans(mesh, grid, facets, start, perFacet);
  for (let c = 1; c <= nx * ny; c++) start[c] += start[c - 1] + slack;
  const total = start[nx * ny];
  const z = new Float64Array(total);
  const code = new Int32Array(total);
  const count = new Uint32Array(nx * ny);
  fillHits(mesh, grid, spans, start, count, z, code);
  return { start, count, z, code, perFacet };
}

function collectSpans(
  mesh: Mesh,
  grid: Grid,
  facets: Uint32Array | undefined,
  start: Uint32Array,
  perFacet: Uint32Array,
): Spans {
  const { index, position: p } = mesh;
  const { nx, ny, cell } = grid;
  const firstX = grid.x0 + cell / 2;
  const firstY = grid.y0 + cell / 2;
  const spans = new Spans();
  const n = facets ? facets.length : mesh.triangles;
  for (let f = 0; f < n; f++) {
    const t = facets ? facets[f] : f;
    const a = index[3 * t] * 3;
    const b = index[3 * t + 1] * 3;
    const d = index[3 * t + 2] * 3;
    const ya = p[a + 1];
    const yb = p[b + 1];
    const yd = p[d + 1];
    const yLow = ya < yb ? (ya < yd ? ya : yd) : yb < yd ? yb : yd;
    const yHigh = ya > yb ? (ya > yd ? ya : yd) : yb > yd ? yb : yd;
    let row = Math.ceil((yLow - firstY) / cell) - 1;
    if (row < 0) row = 0;
    const lastRow = Math.min(ny - 1, Math.floor((yHigh - firstY) / cell) + 1);
    for (; row <= lastRow; row++) {
      const y = firstY + row * cell;
      if (y < yLow || y >= yHigh) continue;
      const la = ya <= y;
      const lb = yb <= y;
      const ld = yd <= y;
      // Of the two crossing edges one runs up (low end first) and one runs down.
      let up = 0;
      let down = 0;
      if (la !== lb) {
        if (la) up = cross(p, a, b, y);
        else down = cross(p, b, a, y);
      }
      if (lb !== ld) {
        if (lb) up = cross(p, b, d, y);
        else down = cross(p, d, b, y);
      }
      if (ld !== la) {
        if (ld) up = cross(p, d, a, y);
        else down = cross(p, a, d, y);
      }
      const facesDown = up < down;
      let from = Math.ceil(((facesDown ? up : down) - firstX) / cell);
      let to = Math.ceil(((facesDown ? down : up) - firstX) / cell);
      if (from < 0) from = 0;
      if (to > nx) to = nx;
      if (from >= to) continue;
      spans.add(row * nx + from, to - from, facesDown ? t * 2 + 1 : t * 2);
      perFacet[t] += to - from;
      for (let c = row * nx + from + 1; c <= row * nx + to; c++) start[c]++;
    }
  }
  return spans;
}

/** x where the edge crosses the row, from its end `low` with y ≤ row. */
function cross(p: Float64Array, low: number, high: number, y: number): number {
  return p[low] + ((y - p[low + 1]) / (p[high + 1] - p[low + 1])) * (p[high] - p[low]);
}

function fillHits(
  mesh: Mesh,
  grid: Grid,
  spans: Spans,
  start: Uint32Array,
  used: Uint32Array,
  z: Float64Array,
  code: Int32Array,
): void {
  const { index, position: p } = mesh;
  const { nx, cell } = grid;
  for (let s = 0; s < spans.used; s += 3) {
    const first = spans.data[s];
    const length = spans.data[s + 1];
    const facet = spans.data[s + 2];
    const a = index[(facet >> 1) * 3] * 3;
    const b = index[(facet >> 1) * 3 + 1] * 3;
    const d = index[(facet >> 1) * 3 + 2] * 3;
    const za = p[a + 2];
    const zb = p[b + 2];
    const zd = p[d + 2];
    const ux = p[b] - p[a];
    const uy = p[b + 1] - p[a + 1];
    const vx = p[d] - p[a];
    const vy = p[d + 1] - p[a + 1];
    const across = ux * vy - uy * vx;
    const gx = ((zb - za) * vy - (zd - za) * uy) / across;
    const gy = ((zd - za) * ux - (zb - za) * vx) / across;
    const low = Math.min(za, zb, zd);
    const high = Math.max(za, zb, zd);
    const y = grid.y0 + (Math.floor(first / nx) + 0.5) * cell;
    const atRow = za + (y - p[a + 1]) * gy;
    let x = grid.x0 + ((first % nx) + 0.5) * cell - p[a];
    for (let c = first; c < first + length; c++, x += cell) {
      const at = start[c] + used[c]++;
      let height = atRow + x * gx;
      // Near-vertical facets: the plane explodes, the facet's own range does not. NaN (no area) goes low.
      if (!(height >= low)) height = low;
      else if (height > high) height = high;
      z[at] = height;
      code[at] = facet;
    }
  }
}
