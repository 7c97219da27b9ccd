/** Fewest facets for which sorting pays: below it everything fits the cache anyway. */
const WORTH_SORTING = 400_000;
const BITS = 7;

/**
 * Puts the facets into spatial order (counting sort by a 7+7+7-bit cell key) so that welding and edge building
 * walk through memory in order; files with random facet order run several times faster for it.
 * @returns the same array, or a reordered copy. Facet numbers are internal from here on.
 */
export function sortTriangles(coords: Float32Array): Float32Array {
  const triangles = coords.length / 9;
  if (triangles < WORTH_SORTING || isLocal(coords)) return coords;
  const low = [Infinity, Infinity, Infinity];
  const high = [-Infinity, -Infinity, -Infinity];
  for (let i = 0; i < coords.length; i += 9) {
    for (let k = 0; k < 3; k++) {
      const value = coords[i + k];
      if (value < low[k]) low[k] = value;
      if (value > high[k]) high[k] = value;
    }
  }
  const cells = 1 << BITS;
  const scale = low.map((min, k) => (cells - 1e-3) / Math.max(high[k] - min, 1e-30));
  const keys = new Uint32Array(triangles);
  const start = new Uint32Array(cells ** 3 + 1);
  for (let t = 0, i = 0; t < triangles; t++, i += 9) {
    const x = ((coords[i] - low[0]) * scale[0]) | 0;
    const y = ((coords[i + 1] - low[1]) * scale[1]) | 0;
    const z = ((coords[i + 2] - low[2]) * scale[2]) | 0;
    const key = (x * cells + y) * cells + z;
    keys[t] = key;
    start[key + 1]++;
  }
  for (let k = 1; k < start.length; k++) start[k] += start[k - 1];
  const sorted = new Float32Array(coords.length);
  for (let t = 0, i = 0; t < triangles; t++, i += 9) {
    let o = start[keys[t]]++ * 9;
    for (let k = i; k < i + 9; k++) sorted[o++] = coords[k];
  }
  return sorted;
}

/** True where successive facets are mostly near one another already. */
function isLocal(coords: Float32Array): boolean {
  const triangles = coords.length / 9;
  let jump = 0;
  let span = 0;
  const step = Math.max(1, Math.floor(triangles / 4096));
  for (let t = 0; t + 1 < triangles; t += step) {
    const i = t * 9;
    jump += Math.abs(coords[i] - coords[i + 9]) + Math.abs(coords[i + 1] - coords[i + 10]);
    const far = ((t * 7919 + 104729) % triangles) * 9;
    span += Math.abs(coords[i] - coords[far]) + Math.abs(coords[i + 1] - coords[far + 1]);
  }
  return jump < span / 20;
}
