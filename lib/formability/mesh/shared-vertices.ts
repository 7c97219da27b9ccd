/** One object for all calls: this is asked millions of times. */
const shared = { count: 0, vertex: -1 };

/** How many vertices two facets have in common, and one of them. The answer holds until the next call. */
export function sharedVertices(index: Uint32Array, f: number, g: number): { count: number; vertex: number } {
  shared.count = 0;
  for (let k = 3 * f; k < 3 * f + 3; k++) {
    const v = index[k];
    if (v !== index[3 * g] && v !== index[3 * g + 1] && v !== index[3 * g + 2]) continue;
    shared.count++;
    shared.vertex = v;
  }
  return shared;
}
