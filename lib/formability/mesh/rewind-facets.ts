import type { Edges } from './build-edges';

/**
 * Gives neighbouring facets one winding: walks over every edge of exactly two facets and flips what runs against
 * the larger part. Changes `index` in place.
 * @returns how many facets were flipped
 */
export function rewindFacets(index: Uint32Array, edges: Edges): number {
  const triangles = index.length / 3;
  const degree = new Uint32Array(triangles + 1);
  const usable = (e: number) => edges.forward[e] + edges.backward[e] === 2 && edges.facetB[e] >= 0;
  for (let e = 0; e < edges.count; e++) {
    if (!usable(e)) continue;
    degree[edges.facetA[e] + 1]++;
    degree[edges.facetB[e] + 1]++;
  }
  for (let t = 1; t <= triangles; t++) degree[t] += degree[t - 1];
  const fill = degree.slice(0, triangles);
  const neighbour = new Int32Array(degree[triangles]);
  for (let e = 0; e < edges.count; e++) {
    if (!usable(e)) continue;
    const [a, b] = [edges.facetA[e], edges.facetB[e]];
    const against = edges.forward[e] === 1 ? 0 : 1;
    neighbour[fill[a]++] = b * 2 + against;
    neighbour[fill[b]++] = a * 2 + against;
  }
  const side = new Int8Array(triangles).fill(-1);
  let flipped = 0;
  for (let seed = 0; seed < triangles; seed++) {
    if (side[seed] >= 0) continue;
    const part = [seed];
    side[seed] = 0;
    let turned = 0;
    for (let at = 0; at < part.length; at++) {
      const t = part[at];
      for (let n = degree[t]; n < fill[t]; n++) {
        const other = neighbour[n] >> 1;
        if (side[other] >= 0) continue;
        side[other] = side[t] ^ (neighbour[n] & 1);
        turned += side[other];
        part.push(other);
      }
    }
    const flipSide = turned * 2 > part.length ? 0 : 1;
    for (const t of part) {
      if (side[t] !== flipSide) continue;
      const swap = index[3 * t + 1];
      index[3 * t + 1] = index[3 * t + 2];
      index[3 * t + 2] = swap;
      flipped++;
    }
  }
  return flipped;
}
