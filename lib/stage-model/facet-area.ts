/** Area of a facet of nine coordinates, mm². */
export function facetArea(p: Float32Array, facet: number): number {
  const i = facet * 9;
  const ux = p[i + 3] - p[i];
  const uy = p[i + 4] - p[i + 1];
  const uz = p[i + 5] - p[i + 2];
  const vx = p[i + 6] - p[i];
  const vy = p[i + 7] - p[i + 1];
  const vz = p[i + 8] - p[i + 2];
  const x = uy * vz - uz * vy;
  const y = uz * vx - ux * vz;
  const z = ux * vy - uy * vx;
  return Math.sqrt(x * x + y * y + z * z) / 2;
}
