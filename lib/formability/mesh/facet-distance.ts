/** Smallest squared distance of two facets that do not cross: corner to facet and edge to edge. */
export function facetDistanceSquared(
  p: Float64Array,
  f: readonly [number, number, number],
  g: readonly [number, number, number],
): number {
  let least = Infinity;
  for (let k = 0; k < 3; k++) {
    least = Math.min(least, toFacet(p, f[k], g), toFacet(p, g[k], f));
    for (let m = 0; m < 3; m++)
      least = Math.min(least, edgeToEdge(p, f[k], f[(k + 1) % 3], g[m], g[(m + 1) % 3]));
  }
  return least;
}

/** Over the inside of the facet only: its border is the business of the edges. */
function toFacet(p: Float64Array, v: number, [a, b, c]: readonly [number, number, number]): number {
  const [ux, uy, uz] = [p[b] - p[a], p[b + 1] - p[a + 1], p[b + 2] - p[a + 2]];
  const [vx, vy, vz] = [p[c] - p[a], p[c + 1] - p[a + 1], p[c + 2] - p[a + 2]];
  const [wx, wy, wz] = [p[v] - p[a], p[v + 1] - p[a + 1], p[v + 2] - p[a + 2]];
  const [nx, ny, nz] = [uy * vz - uz * vy, uz * vx - ux * vz, ux * vy - uy * vx];
  const square = nx * nx + ny * ny + nz * nz;
  if (square === 0) return Infinity;
  const s = ((wy * vz - wz * vy) * nx + (wz * vx - wx * vz) * ny + (wx * vy - wy * vx) * nz) / square;
  const t = ((uy * wz - uz * wy) * nx + (uz * wx - ux * wz) * ny + (ux * wy - uy * wx) * nz) / square;
  if (s < 0 || t < 0 || s + t > 1) return Infinity;
  return (wx * nx + wy * ny + wz * nz) ** 2 / square;
}

function edgeToEdge(p: Float64Array, a: number, b: number, c: number, d: number): number {
  const [ux, uy, uz] = [p[b] - p[a], p[b + 1] - p[a + 1], p[b + 2] - p[a + 2]];
  const [vx, vy, vz] = [p[d] - p[c], p[d + 1] - p[c + 1], p[d + 2] - p[c + 2]];
  const [wx, wy, wz] = [p[a] - p[c], p[a + 1] - p[c + 1], p[a + 2] - p[c + 2]];
  const uu = ux * ux + uy * uy + uz * uz;
  const vv = vx * vx + vy * vy + vz * vz;
  if (uu === 0 || vv === 0) return Infinity;
  const uv = ux * vx + uy * vy + uz * vz;
  const uw = ux * wx + uy * wy + uz * wz;
  const vw = vx * wx + vy * wy + vz * wz;
  const across = uu * vv - uv * uv;
  let s = across > 1e-12 * uu * vv ? clamp((uv * vw - vv * uw) / across) : 0;
  const t = clamp((uv * s + vw) / vv);
  s = clamp((uv * t - uw) / uu);
  return (wx + s * ux - t * vx) ** 2 + (wy + s * uy - t * vy) ** 2 + (wz + s * uz - t * vz) ** 2;
}

function clamp(share: number): number {
  return share < 0 ? 0 : share > 1 ? 1 : share;
}
