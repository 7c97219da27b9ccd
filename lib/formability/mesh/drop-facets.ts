import type { Edges } from './build-edges';

/** Marks facets with a repeated vertex. Returns their number. */
export function markCollapsed(index: Uint32Array, drop: Uint8Array): number {
  let dropped = 0;
  for (let t = 0, c = 0; c < index.length; t++, c += 3) {
    if (index[c] !== index[c + 1] && index[c + 1] !== index[c + 2] && index[c + 2] !== index[c]) continue;
    drop[t] = 1;
    dropped++;
  }
  return dropped;
}

/** Marks facets that repeat an earlier one, in the same direction. Looks only where an edge is used too often. */
export function markDuplicates(index: Uint32Array, edges: Edges, vertices: number, drop: Uint8Array): number {
  const crowded = new Uint8Array(vertices);
  for (let e = 0; e < edges.count; e++) {
    if (edges.forward[e] < 2 && edges.backward[e] < 2) continue;
    crowded[edges.low[e]] = 1;
    crowded[edges.high[e]] = 1;
  }
  const seen = new Set<string>();
  let dropped = 0;
  for (let t = 0, c = 0; c < index.length; t++, c += 3) {
    const [a, b, d] = [index[c], index[c + 1], index[c + 2]];
    if (drop[t] || !crowded[a] || !crowded[b] || !crowded[d]) continue;
    const key = a < b && a < d ? `${a},${b},${d}` : b < d ? `${b},${d},${a}` : `${d},${a},${b}`;
    if (seen.has(key)) {
      drop[t] = 1;
      dropped++;
    } else seen.add(key);
  }
  return dropped;
}

/** The index without the marked facets. */
export function dropFacets(index: Uint32Array, drop: Uint8Array): Uint32Array {
  let kept = 0;
  for (let t = 0; t < drop.length; t++) {
    if (drop[t]) continue;
    for (let k = 0; k < 3; k++) index[kept++] = index[3 * t + k];
  }
  return index.slice(0, kept);
}
