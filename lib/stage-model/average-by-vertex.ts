/**
 * Area-weighted mean of the figures of the facets that share a vertex; facets without one (NaN) do not count, and a
 * vertex none of whose facets has one has none.
 * @param index three vertices a facet
 */
export function averageByVertex(
  index: Uint32Array,
  figures: Float32Array,
  areas: Float32Array,
  vertices: number,
): Float32Array {
  const sum = new Float64Array(vertices);
  const weight = new Float64Array(vertices);
  for (let c = 0; c < index.length; c++) {
    const f = (c / 3) | 0;
    const figure = figures[f];
    if (figure !== figure) continue;
    const w = areas[f] + 1e-9;
    sum[index[c]] += figure * w;
    weight[index[c]] += w;
  }
  return Float32Array.from(sum, (total, v) => (weight[v] > 0 ? total / weight[v] : NaN));
}
