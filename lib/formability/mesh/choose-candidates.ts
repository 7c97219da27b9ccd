import type { Columns } from '../dexel/columns';
import type { Edges } from './build-edges';
import { buildBoxTree, visitPairs } from './box-tree';
import type { Shells } from './find-shells';
import type { Mesh } from './mesh';

/** Up to this many facets every one is looked at; above it only where shells meet or columns are odd. */
const ALL_FACETS = 60_000;
/** Pairs of shells with near boxes that are looked at before the search gives up: a heap, not bodies side by side. */
const MOST_SHELL_PAIRS = 2e6;

export interface Candidates {
  facets: Uint32Array;
  /** Only meetings of different shells are looked for: a large file of several bodies. */
  apart: boolean;
  /** False where there were too many pairs of shells to choose by: some facets that meet others may be missing. */
  complete: boolean;
}

/**
 * The facets that may meet others: all of a small mesh; of a large one those where the boxes of two shells overlap, else
 * those on edges with more than two facets, and those over columns that are covered doubly (a crossing always leaves such columns beside it).
 */
export function chooseCandidates(
  mesh: Mesh,
  shells: Shells,
  edges: Edges,
  boxes: Float64Array | null,
  columns: Columns,
  tolerance: number,
): Candidates {
  const { triangles } = mesh;
  if (triangles <= ALL_FACETS) {
    return { facets: Uint32Array.from({ length: triangles }, (_, t) => t), apart: false, complete: true };
  }
  const chosen = new Uint8Array(triangles);
  const meet = boxes !== null && boxesMeet(boxes, tolerance);
  const common = meet ? commonBoxes(boxes, shells.count, tolerance) : null;
  const apart = common !== null;
  if (apart) markBoxes(mesh, shells, common, chosen);
  else markOddColumns(mesh, columns, chosen);
  if (edges.nonManifold > 0 && !apart) markCrowded(edges, chosen);
  let count = 0;
  for (let t = 0; t < triangles; t++) count += chosen[t];
  const facets = new Uint32Array(count);
  for (let t = 0, k = 0; t < triangles; t++) if (chosen[t]) facets[k++] = t;
  return { facets, apart, complete: apart || !meet };
}

function markCrowded({ forward, backward, ofCorner }: Edges, chosen: Uint8Array): void {
  for (let c = 0; c < ofCorner.length; c++) {
    const e = ofCorner[c];
    if (e >= 0 && forward[e] + backward[e] > 2) chosen[(c / 3) | 0] = 1;
  }
}

/** Whether any two shells have boxes that come within the tolerance. */
export function boxesMeet(boxes: Float64Array, tolerance: number): boolean {
  return !visitPairs(buildBoxTree(boxes), tolerance, () => false);
}

/** For each shell the box round everything that its box shares with others, empty where nothing; null where too many meet. */
function commonBoxes(boxes: Float64Array, count: number, near: number): Float64Array | null {
  const common = new Float64Array(6 * count);
  for (let s = 0; s < count; s++) {
    common.fill(Infinity, 6 * s, 6 * s + 3);
    common.fill(-Infinity, 6 * s + 3, 6 * s + 6);
  }
  let pairs = 0;
  const complete = visitPairs(buildBoxTree(boxes), near, (s, t) => {
    if (++pairs > MOST_SHELL_PAIRS) return false;
    for (const own of [s, t]) {
      for (let k = 0; k < 3; k++) {
        const low = Math.max(boxes[6 * s + k], boxes[6 * t + k]) - near;
        const high = Math.min(boxes[6 * s + 3 + k], boxes[6 * t + 3 + k]) + near;
        common[6 * own + k] = Math.min(common[6 * own + k], low);
        common[6 * own + 3 + k] = Math.max(common[6 * own + 3 + k], high);
      }
    }
    return true;
  });
  return complete ? common : null;
}

function markBoxes(
  { triangles, index, position: p }: Mesh,
  shells: Shells,
  common: Float64Array,
  chosen: Uint8Array,
): void {
  for (let t = 0; t < triangles; t++) {
    const o = 6 * shells.ofFacet[t];
    let inside = 1;
    for (let k = 0; k < 3 && inside; k++) {
      const [a, b, c] = [p[3 * index[3 * t] + k], p[3 * index[3 * t + 1] + k], p[3 * index[3 * t + 2] + k]];
      if (Math.min(a, b, c) > common[o + 3 + k] || Math.max(a, b, c) < common[o + k]) inside = 0;
    }
    if (inside) chosen[t] = 1;
  }
}

/** Marks the facets whose plan box holds or borders an odd column, by a table of sums over the grid. */
function markOddColumns({ triangles, index, position: p }: Mesh, columns: Columns, chosen: Uint8Array): void {
  const { grid, oddColumns } = columns;
  if (oddColumns.length === 0) return;
  const { nx, ny, cell, x0, y0 } = grid;
  const wide = nx + 1;
  const sums = new Int32Array(wide * (ny + 1));
  for (const c of oddColumns) sums[(Math.floor(c / nx) + 1) * wide + (c % nx) + 1] = 1;
  for (let j = 1; j <= ny; j++) {
    for (let i = 1; i <= nx; i++) {
      const at = j * wide + i;
      sums[at] += sums[at - 1] + sums[at - wide] - sums[at - wide - 1];
    }
  }
  const within = (value: number, most: number) => (value < 0 ? 0 : value > most ? most : value);
  for (let t = 0; t < triangles; t++) {
    const [a, b, c] = [3 * index[3 * t], 3 * index[3 * t + 1], 3 * index[3 * t + 2]];
    const left = within(Math.floor((Math.min(p[a], p[b], p[c]) - x0) / cell) - 1, nx);
    const right = within(Math.floor((Math.max(p[a], p[b], p[c]) - x0) / cell) + 2, nx);
    const near = within(Math.floor((Math.min(p[a + 1], p[b + 1], p[c + 1]) - y0) / cell) - 1, ny);
    const far = within(Math.floor((Math.max(p[a + 1], p[b + 1], p[c + 1]) - y0) / cell) + 2, ny);
    const odd =
      sums[far * wide + right] -
      sums[near * wide + right] -
      sums[far * wide + left] +
      sums[near * wide + left];
    if (odd > 0) chosen[t] = 1;
  }
}
