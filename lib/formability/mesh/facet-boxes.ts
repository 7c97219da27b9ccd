/** The boxes of the given facets, 6 numbers each: minimum x, y, z, maximum x, y, z. */
export function facetBoxes(index: Uint32Array, position: Float64Array, facets: Uint32Array): Float64Array {
  const boxes = new Float64Array(6 * facets.length);
  for (let i = 0, o = 0; i < facets.length; i++, o += 6) {
    const a = index[3 * facets[i]] * 3;
    const b = index[3 * facets[i] + 1] * 3;
    const c = index[3 * facets[i] + 2] * 3;
    for (let k = 0; k < 3; k++) {
      const [p, q, r] = [position[a + k], position[b + k], position[c + k]];
      boxes[o + k] = p < q ? (p < r ? p : r) : q < r ? q : r;
      boxes[o + 3 + k] = p > q ? (p > r ? p : r) : q > r ? q : r;
    }
  }
  return boxes;
}

/** The box of each shell, in the same order of numbers. */
export function shellBoxes(
  index: Uint32Array,
  position: Float64Array,
  ofFacet: Uint32Array,
  count: number,
): Float64Array {
  const boxes = new Float64Array(6 * count);
  for (let s = 0; s < count; s++) {
    boxes.fill(Infinity, 6 * s, 6 * s + 3);
    boxes.fill(-Infinity, 6 * s + 3, 6 * s + 6);
  }
  for (let c = 0; c < index.length; c++) {
    const o = 6 * ofFacet[(c / 3) | 0];
    const v = 3 * index[c];
    for (let k = 0; k < 3; k++) {
      const value = position[v + k];
      if (value < boxes[o + k]) boxes[o + k] = value;
      if (value > boxes[o + 3 + k]) boxes[o + 3 + k] = value;
    }
  }
  return boxes;
}
