import { UnionFind } from './union-find';

/** Facets grouped by shared vertices: a shell number for each facet, numbered by first facet. */
export interface Shells {
  count: number;
  ofFacet: Uint32Array;
}

/** Connected components over shared vertices. */
export function findShells(index: Uint32Array, vertices: number): Shells {
  const joined = new UnionFind(vertices);
  const { parent } = joined;
  for (let c = 0; c < index.length; c += 3) {
    const a = index[c];
    const b = index[c + 1];
    const d = index[c + 2];
    // In a mesh in order most vertices hang on one root by now.
    if (parent[a] === parent[b] && parent[b] === parent[d]) continue;
    joined.join(a, b);
    joined.join(a, d);
  }
  const number = new Int32Array(vertices).fill(-1);
  const ofFacet = new Uint32Array(index.length / 3);
  let count = 0;
  for (let facet = 0; facet < ofFacet.length; facet++) {
    const root = joined.find(index[3 * facet]);
    if (number[root] < 0) number[root] = count++;
    ofFacet[facet] = number[root];
  }
  return { count, ofFacet };
}
