import type { Edges } from './build-edges';

/**
 * Marks pairs of facets that have the same three corners and face one another: the common wall of two bodies that
 * touch. Together they bound nothing.
 * @returns the marks, or null where there are none
 */
export function findOpposed(index: Uint32Array, edges: Edges, vertices: number): Uint8Array | null {
  if (edges.nonManifold === 0) return null;
  const crowded = new Uint8Array(vertices);
  for (let e = 0; e < edges.count; e++) {
    if (edges.forward[e] + edges.backward[e] < 3) continue;
    crowded[edges.low[e]] = 1;
    crowded[edges.high[e]] = 1;
  }
  const waiting = new Map<string, number[]>();
  const marks = new Uint8Array(index.length / 3);
  let found = false;
  for (let t = 0, c = 0; c < index.length; t++, c += 3) {
    const [a, b, d] = [index[c], index[c + 1], index[c + 2]];
    if (!crowded[a] || !crowded[b] || !crowded[d] || a === b || b === d || d === a) continue;
    const there = a < b && a < d ? `${a},${d},${b}` : b < d ? `${b},${a},${d}` : `${d},${b},${a}`;
    const partner = waiting.get(there)?.pop();
    if (partner !== undefined) {
      marks[t] = marks[partner] = 1;
      found = true;
      continue;
    }
    const here = a < b && a < d ? `${a},${b},${d}` : b < d ? `${b},${d},${a}` : `${d},${a},${b}`;
    const list = waiting.get(here);
    if (list) list.push(t);
    else waiting.set(here, [t]);
  }
  return found ? marks : null;
}
