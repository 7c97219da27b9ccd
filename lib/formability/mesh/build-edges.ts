/** Every edge once, with the facets that use it. */
export interface Edges {
  count: number;
  low: Uint32Array;
  high: Uint32Array;
  /** Uses from low to high, and from high to low. */
  forward: Uint8Array;
  backward: Uint8Array;
  /** First two facets; −1 where there is none. */
  facetA: Int32Array;
  facetB: Int32Array;
  /** Edge from each facet corner to the next; −1 for facets with a repeated vertex. */
  ofCorner: Int32Array;
  boundary: number;
  nonManifold: number;
  inconsistent: number;
}

/**
 * Builds the edges by one linked list per lower vertex. Facets with a repeated vertex take no part.
 * Boundary: one facet. Non-manifold: three or more. Inconsistent: two facets in the same direction.
 */
export function buildEdges(index: Uint32Array, vertices: number): Edges {
  const corners = index.length;
  const head = new Int32Array(vertices).fill(-1);
  // Higher vertex and next edge of the list, side by side: a step along a list is one look into memory.
  const link = new Int32Array(2 * corners);
  const low = new Uint32Array(corners);
  const high = new Uint32Array(corners);
  const forward = new Uint8Array(corners);
  const backward = new Uint8Array(corners);
  const facetA = new Int32Array(corners);
  const facetB = new Int32Array(corners);
  const ofCorner = new Int32Array(corners);
  let count = 0;
  for (let c = 0, facet = 0; c < corners; c += 3, facet++) {
    const a = index[c];
    const b = index[c + 1];
    const d = index[c + 2];
    if (a === b || b === d || d === a) {
      ofCorner[c] = ofCorner[c + 1] = ofCorner[c + 2] = -1;
      continue;
    }
    for (let side = 0; side < 3; side++) {
      const from = side === 0 ? a : side === 1 ? b : d;
      const to = side === 0 ? b : side === 1 ? d : a;
      const lower = from < to ? from : to;
      const higher = from < to ? to : from;
      let e = head[lower];
      while (e >= 0 && link[2 * e] !== higher) e = link[2 * e + 1];
      if (e < 0) {
        e = count++;
        link[2 * e] = higher;
        link[2 * e + 1] = head[lower];
        head[lower] = e;
        low[e] = lower;
        high[e] = higher;
        facetA[e] = facet;
        facetB[e] = -1;
      } else if (facetB[e] < 0) {
        facetB[e] = facet;
      }
      ofCorner[c + side] = e;
      const uses = from < to ? forward : backward;
      if (uses[e] < 255) uses[e]++;
    }
  }
  let boundary = 0;
  let nonManifold = 0;
  let inconsistent = 0;
  for (let e = 0; e < count; e++) {
    const uses = forward[e] + backward[e];
    if (uses === 1) boundary++;
    else if (uses > 2) nonManifold++;
    else if (forward[e] !== 1) inconsistent++;
  }
  return {
    count,
    low,
    high,
    forward,
    backward,
    facetA,
    facetB,
    ofCorner,
    boundary,
    nonManifold,
    inconsistent,
  };
}

/** The facet over side `side` of a facet, or −1 (open, or used by more than two). */
export function neighbourOver(edges: Edges, facet: number, side: number): number {
  const e = edges.ofCorner[3 * facet + side];
  if (e < 0 || edges.forward[e] + edges.backward[e] !== 2) return -1;
  return edges.facetA[e] === facet ? edges.facetB[e] : edges.facetA[e];
}

/** True where every edge has exactly two facets, in opposite directions. */
export function isClosed(edges: Edges): boolean {
  return edges.count > 0 && edges.boundary + edges.nonManifold + edges.inconsistent === 0;
}

/** True where every edge is used as often one way as the other, so that a winding number is defined everywhere. */
export function isBalanced(edges: Edges): boolean {
  if (edges.count === 0) return false;
  if (isClosed(edges)) return true;
  if (edges.boundary + edges.inconsistent > 0) return false;
  for (let e = 0; e < edges.count; e++) if (edges.forward[e] !== edges.backward[e]) return false;
  return true;
}
