import { CONNECTED, ENCLOSED, type Air } from '../dexel/air';
import type { Columns } from '../dexel/columns';
import { cellAt } from '../dexel/grid';
import type { Facets } from '../mesh/measure-facets';
import type { Mesh } from '../mesh/mesh';

/** What the outside of each facet faces, as shares of its area; what is missing to 1 is buried in solid or on the bed. */
export interface Visibility {
  /** Air with nothing of the part above. */
  visible: Float32Array;
  /** Connected air with solid above. */
  shadowed: Float32Array;
  enclosed: Float32Array;
  /** 1 where half of it or more faces air that hangs together with the air above: what the sheet can touch. */
  touched: Uint8Array;
}

/** A facet with this many grid hits is judged by them; one with fewer by points on it. */
const ENOUGH_HITS = 4;
/** A facet of fewer cells than this is one place: a single hit speaks for it. */
const SMALL_CELLS = 8;
/** How far outside the surface a point is looked at, in cells: the cell's centre is then outside too. */
const OUTSIDE = 0.75;
const MOST_SAMPLES_A_SIDE = 128;
/** Share of a facet that counts for all of it. */
const TOUCHED = 0.5;

const VISIBLE = 3;
const BURIED = 0;

/** Judges every facet against the columns. */
export function findVisibility(
  mesh: Mesh,
  facets: Facets,
  columns: Columns,
  air: Air,
  perFacet: Uint32Array,
): Visibility {
  const n = mesh.triangles;
  const visible = new Float32Array(n);
  const shadowed = new Float32Array(n);
  const enclosed = new Float32Array(n);
  countHits(columns.start, columns.count, columns.facet, air.state, visible, shadowed, enclosed);
  const { area, bed } = facets;
  const shares = new Float64Array(4);
  const small = SMALL_CELLS * columns.grid.cell ** 2;
  for (let t = 0; t < n; t++) {
    const hits = perFacet[t];
    if (hits >= ENOUGH_HITS || (hits > 0 && area[t] < small)) {
      visible[t] /= hits;
      shadowed[t] /= hits;
      enclosed[t] /= hits;
    } else if (area[t] > 0 && bed[t] === 0) {
      sampleFacet(mesh, t, area[t], columns, air, shares);
      visible[t] = shares[VISIBLE];
      shadowed[t] = shares[CONNECTED];
      enclosed[t] = shares[ENCLOSED];
    }
  }
  return { visible, shadowed, enclosed, touched: markTouched(visible, shadowed) };
}

/** 1 where the sheet can touch half of a facet or more. */
export function markTouched(visible: Float32Array, shadowed: Float32Array): Uint8Array {
  const touched = new Uint8Array(visible.length);
  for (let t = 0; t < touched.length; t++) if (visible[t] + shadowed[t] >= TOUCHED) touched[t] = 1;
  return touched;
}

/** Each facet's grid hits by what lies in front of them. */
function countHits(
  start: Uint32Array,
  count: Uint32Array,
  facet: Int32Array,
  state: Uint8Array,
  visible: Float32Array,
  shadowed: Float32Array,
  enclosed: Float32Array,
): void {
  for (let c = 0; c < count.length; c++) {
    const last = start[c] + 2 * count[c] - 2;
    for (let s = start[c]; s <= last; s += 2) {
      const below = facet[s];
      if (below >= 0) {
        if (state[s] === CONNECTED) shadowed[below]++;
        else if (state[s] === ENCLOSED) enclosed[below]++;
      }
      const above = facet[s + 1];
      if (above < 0) continue;
      if (s === last) visible[above]++;
      else if (state[s + 2] === CONNECTED) shadowed[above]++;
      else if (state[s + 2] === ENCLOSED) enclosed[above]++;
    }
  }
}

/** Looks from the middles of m² equal parts of the facet. */
function sampleFacet(
  mesh: Mesh,
  t: number,
  area: number,
  columns: Columns,
  air: Air,
  shares: Float64Array,
): void {
  const { index, position: p } = mesh;
  const a = index[3 * t] * 3;
  const b = index[3 * t + 1] * 3;
  const d = index[3 * t + 2] * 3;
  const ux = p[b] - p[a];
  const uy = p[b + 1] - p[a + 1];
  const uz = p[b + 2] - p[a + 2];
  const vx = p[d] - p[a];
  const vy = p[d + 1] - p[a + 1];
  const vz = p[d + 2] - p[a + 2];
  const { cell } = columns.grid;
  const out = (OUTSIDE * cell) / (2 * area);
  const ox = (uy * vz - uz * vy) * out;
  const oy = (uz * vx - ux * vz) * out;
  const oz = (ux * vy - uy * vx) * out;
  const m = Math.min(MOST_SAMPLES_A_SIDE, Math.max(1, Math.round(Math.sqrt(area) / (2 * cell))));
  shares.fill(0);
  for (let i = 0; i < m; i++) {
    for (let j = 0; j < m - i; j++) {
      for (let half = 0; half < (j < m - i - 1 ? 2 : 1); half++) {
        const s = (i + (1 + half) / 3) / m;
        const r = (j + (1 + half) / 3) / m;
        const x = p[a] + s * ux + r * vx;
        const y = p[a + 1] + s * uy + r * vy;
        const z = p[a + 2] + s * uz + r * vz;
        const seen = classify(columns, air, x + ox, y + oy, z + oz);
        shares[seen === BURIED ? lookAround(columns, air, x, y, z + oz / 4) : seen]++;
      }
    }
  }
  for (let k = 0; k < 4; k++) shares[k] /= m * m;
}

/** A ledge or bore narrower than a cell: its own column is solid, so the most open one beside it speaks for it. */
function lookAround(columns: Columns, air: Air, x: number, y: number, z: number): number {
  const far = OUTSIDE * columns.grid.cell;
  let best = BURIED;
  for (let dx = -far; dx <= far; dx += far) {
    for (let dy = -far; dy <= far; dy += far) {
      const seen = classify(columns, air, x + dx, y + dy, z);
      if (seen === VISIBLE) return VISIBLE;
      if (best === BURIED || seen === CONNECTED) best = seen === BURIED ? best : seen;
    }
  }
  return best;
}

function classify(columns: Columns, air: Air, x: number, y: number, z: number): number {
  const c = cellAt(columns.grid, x, y);
  if (c < 0 || z >= columns.height[c]) return VISIBLE;
  const { start, count } = columns;
  for (let s = start[c]; s < start[c] + 2 * count[c]; s += 2) {
    if (z < columns.z[s])
      return air.state[s] === CONNECTED ? CONNECTED : air.state[s] === ENCLOSED ? ENCLOSED : BURIED;
    if (z <= columns.z[s + 1]) return BURIED;
  }
  return VISIBLE;
}
