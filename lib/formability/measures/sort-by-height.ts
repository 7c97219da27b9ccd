/**
 * The cells from the lowest up; equal heights keep their order. Two radix passes over the bits of the height as
 * float32, which sort like the number itself because no height is negative.
 */
export function sortByHeight(cells: Int32Array, height: Float64Array): Int32Array {
  const keys = new Uint32Array(new Float32Array(Array.from(cells, (c) => height[c])).buffer);
  let from = cells;
  let fromKeys = keys;
  for (const shift of [0, 16]) {
    const start = new Uint32Array(65_537);
    for (const key of fromKeys) start[((key >>> shift) & 0xffff) + 1]++;
    for (let b = 1; b < start.length; b++) start[b] += start[b - 1];
    const to = new Int32Array(cells.length);
    const toKeys = new Uint32Array(cells.length);
    for (let k = 0; k < from.length; k++) {
      const at = start[(fromKeys[k] >>> shift) & 0xffff]++;
      to[at] = from[k];
      toKeys[at] = fromKeys[k];
    }
    from = to;
    fromKeys = toKeys;
  }
  return from;
}
