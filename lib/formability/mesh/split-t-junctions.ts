import { buildBoxTree, visitPairs } from './box-tree';
import type { Edges } from './build-edges';

/** What splitting did: a new index, and the vertices that lay on the edges of others. */
export interface Split {
  index: Uint32Array;
  vertices: number[];
}

/** Edge pairs looked at before the search gives up: an open lace, not a body with a few T-junctions. */
const MOST_PAIRS = 5e6;

/**
 * Finds boundary edges in whose inside another boundary's corner lies, and splits their facets there. The corner
 * may be off the edge by `tolerance`; the surface moves by no more.
 * @returns null where there is none, or where the open edges are too many to compare
 */
export function splitTJunctions(
  index: Uint32Array,
  p: Float64Array,
  edges: Edges,
  tolerance: number,
): Split | null {
  const open: number[] = [];
  for (let e = 0; e < edges.count; e++) if (edges.forward[e] + edges.backward[e] === 1) open.push(e);
  if (open.length < 3) return null;
  const onEdge = new Map<number, Set<number>>();
  const boxes = new Float64Array(6 * open.length);
  open.forEach((e, i) => {
    for (let k = 0; k < 3; k++) {
      const [a, b] = [p[3 * edges.low[e] + k], p[3 * edges.high[e] + k]];
      boxes[6 * i + k] = Math.min(a, b);
      boxes[6 * i + 3 + k] = Math.max(a, b);
    }
  });
  let pairs = 0;
  const noteOn = (e: number, v: number) => {
    if (!liesInside(p, edges.low[e], edges.high[e], v, tolerance)) return;
    const list = onEdge.get(e);
    if (list) list.add(v);
    else onEdge.set(e, new Set([v]));
  };
  const searched = visitPairs(buildBoxTree(boxes), tolerance, (i, j) => {
    const [e, f] = [open[i], open[j]];
    noteOn(e, edges.low[f]);
    noteOn(e, edges.high[f]);
    noteOn(f, edges.low[e]);
    noteOn(f, edges.high[e]);
    return ++pairs < MOST_PAIRS;
  });
  // Half a search would close some edges and leave their neighbours open.
  if (!searched || onEdge.size === 0) return null;
  return {
    index: splitFacets(index, p, edges, onEdge),
    vertices: [...new Set([...onEdge.values()].flatMap((set) => [...set]))],
  };
}

function liesInside(p: Float64Array, a: number, b: number, v: number, tolerance: number): boolean {
  if (v === a || v === b) return false;
  let along = 0;
  let square = 0;
  for (let k = 0; k < 3; k++) {
    const d = p[3 * b + k] - p[3 * a + k];
    along += d * (p[3 * v + k] - p[3 * a + k]);
    square += d * d;
  }
  const length = Math.sqrt(square);
  const t = along / square;
  if (!(t * length > tolerance && (1 - t) * length > tolerance)) return false;
  let off = 0;
  for (let k = 0; k < 3; k++) off += (p[3 * a + k] + t * (p[3 * b + k] - p[3 * a + k]) - p[3 * v + k]) ** 2;
  return off <= tolerance * tolerance;
}

function splitFacets(
  index: Uint32Array,
  p: Float64Array,
  edges: Edges,
  onEdge: Map<number, Set<number>>,
): Uint32Array {
  const sides = new Map<number, number[][]>();
  for (const [e, on] of onEdge) {
    const facet = edges.facetA[e];
    const lists = sides.get(facet) ?? [[], [], []];
    const side = [0, 1, 2].find((k) => edges.ofCorner[3 * facet + k] === e) ?? 0;
    const from = index[3 * facet + side];
    const far = (v: number) =>
      Math.hypot(p[3 * v] - p[3 * from], p[3 * v + 1] - p[3 * from + 1], p[3 * v + 2] - p[3 * from + 2]);
    lists[side] = [...on].sort((v, w) => far(v) - far(w));
    sides.set(facet, lists);
  }
  const out: number[] = [];
  for (const [facet, [ab, bc, ca]] of sides) {
    splitTriangle(out, index[3 * facet], index[3 * facet + 1], index[3 * facet + 2], ab, bc, ca);
  }
  const kept = new Uint32Array(index.length - 3 * sides.size + out.length);
  let k = 0;
  for (let t = 0; t < index.length / 3; t++) {
    if (!sides.has(t)) for (let c = 0; c < 3; c++) kept[k++] = index[3 * t + c];
  }
  kept.set(out, k);
  return kept;
}

/** Cuts along one side first; the first and the last piece inherit what lies on the other two sides. */
function splitTriangle(
  out: number[],
  a: number,
  b: number,
  c: number,
  ab: number[],
  bc: number[],
  ca: number[],
): void {
  if (ab.length === 0) {
    if (bc.length > 0) splitTriangle(out, b, c, a, bc, ca, ab);
    else if (ca.length > 0) splitTriangle(out, c, a, b, ca, ab, bc);
    else out.push(a, b, c);
    return;
  }
  const chain = [a, ...ab, b];
  for (let i = 0; i + 1 < chain.length; i++) {
    splitTriangle(out, chain[i], chain[i + 1], c, [], i + 2 === chain.length ? bc : [], i === 0 ? ca : []);
  }
}
