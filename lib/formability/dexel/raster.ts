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

/** Growable list of spans: row and column in 16 bits each, length, code. */
class Spans {
  data: Int32Array;
  used = 0;

  constructor(room: number) {
    this.data = new Int32Array(SPAN * room);
  }

  grow(): Int32Array {
    const wider = new Int32Array(this.data.length * 2);
    wider.set(this.data);
    this.data = wider;
    return wider;
  }
}

const SPAN = 3;

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
  const count = start.slice(0, nx * ny);
  fillHits(mesh, grid, spans, count, z, code);
  for (let c = 0; c < nx * ny; c++) count[c] -= start[c];
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
  const perCell = 1 / cell;
  const n = facets ? facets.length : mesh.triangles;
  const spans = new Spans(Math.max(1024, n));
  let { data, used } = spans;
  for (let f = 0; f < n; f++) {
    const t = facets ? facets[f] : f;
    let low = index[3 * t] * 3;
    let middle = index[3 * t + 1] * 3;
    let high = index[3 * t + 2] * 3;
    // By y; an odd number of swaps turns the facet's sense round.
    let turned = false;
    if (p[low + 1] > p[middle + 1]) {
      const kept = low;
      low = middle;
      middle = kept;
      turned = !turned;
    }
    if (p[middle + 1] > p[high + 1]) {
      const kept = middle;
      middle = high;
      high = kept;
      turned = !turned;
      if (p[low + 1] > p[middle + 1]) {
        const other = low;
        low = middle;
        middle = other;
        turned = !turned;
      }
    }
    const yLow = p[low + 1];
    const yMiddle = p[middle + 1];
    const yHigh = p[high + 1];
    let row = ((yLow - firstY) * perCell - 1) | 0;
    if (row < 0) row = 0;
    let lastRow = ((yHigh - firstY) * perCell + 1) | 0;
    if (lastRow >= ny) lastRow = ny - 1;
    if (row > lastRow) continue;
    const xLow = p[low];
    const xMiddle = p[middle];
    const xHigh = p[high];
    let hits = 0;
    for (; row <= lastRow; row++) {
      const y = firstY + row * cell;
      if (y < yLow) continue;
      if (y >= yHigh) break;
      // The edge from the lowest to the highest corner is crossed always, and one of the other two.
      const long = xLow + ((y - yLow) / (yHigh - yLow)) * (xHigh - xLow);
      const short =
        yMiddle <= y
          ? xMiddle + ((y - yMiddle) / (yHigh - yMiddle)) * (xHigh - xMiddle)
          : xLow + ((y - yLow) / (yMiddle - yLow)) * (xMiddle - xLow);
      // Where the long edge runs up, the facet faces down if that edge lies to the left; else the other way round.
      const left = long < short ? long : short;
      const right = long < short ? short : long;
      let from = Math.ceil((left - firstX) / cell) | 0;
      let to = Math.ceil((right - firstX) / cell) | 0;
      if (from < 0) from = 0;
      if (to > nx) to = nx;
      if (from >= to) continue;
      const facesDown = turned === long < short;
      if (used === data.length) data = spans.grow();
      data[used] = (row << 16) | from;
      data[used + 1] = to - from;
      data[used + 2] = facesDown ? t * 2 + 1 : t * 2;
      used += SPAN;
      hits += to - from;
      for (let c = row * nx + from + 1; c <= row * nx + to; c++) start[c]++;
    }
    perFacet[t] = hits;
  }
  spans.used = used;
  return spans;
}

/** @param free the next free slot of each column, moved on */
function fillHits(
  mesh: Mesh,
  grid: Grid,
  spans: Spans,
  free: Uint32Array,
  z: Float64Array,
  code: Int32Array,
): void {
  const { index, position: p } = mesh;
  const { nx, cell, x0, y0 } = grid;
  const { data } = spans;
  let held = -1;
  let xa = 0;
  let ya = 0;
  let za = 0;
  let gx = 0;
  let gy = 0;
  let low = 0;
  let high = 0;
  for (let s = 0; s < spans.used; s += SPAN) {
    const column = data[s] & 0xffff;
    const row = data[s] >>> 16;
    const facet = data[s + 2];
    // A facet's spans follow one another.
    if (facet >> 1 !== held) {
      held = facet >> 1;
      const a = index[held * 3] * 3;
      const b = index[held * 3 + 1] * 3;
      const d = index[held * 3 + 2] * 3;
      xa = p[a];
      ya = p[a + 1];
      za = p[a + 2];
      const zb = p[b + 2];
      const zd = p[d + 2];
      const ux = p[b] - xa;
      const uy = p[b + 1] - ya;
      const vx = p[d] - xa;
      const vy = p[d + 1] - ya;
      const across = ux * vy - uy * vx;
      gx = ((zb - za) * vy - (zd - za) * uy) / across;
      gy = ((zd - za) * ux - (zb - za) * vx) / across;
      low = za < zb ? (za < zd ? za : zd) : zb < zd ? zb : zd;
      high = za > zb ? (za > zd ? za : zd) : zb > zd ? zb : zd;
    }
    const atRow = za + (y0 + (row + 0.5) * cell - ya) * gy;
    let x = x0 + (column + 0.5) * cell - xa;
    const end = row * nx + column + data[s + 1];
    for (let c = row * nx + column; c < end; c++, x += cell) {
      const at = free[c]++;
      let height = atRow + x * gx;
      // Near-vertical facets: the plane explodes, the facet's own range does not. NaN (no area) goes low.
      if (!(height >= low)) height = low;
      else if (height > high) height = high;
      z[at] = height;
      code[at] = facet;
    }
  }
}
