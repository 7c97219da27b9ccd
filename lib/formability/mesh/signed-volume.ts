import type { Mesh } from './mesh';

/**
 * Signed volume by the divergence theorem: sum of a · (b × c) / 6 over the facets, in mm³. For a closed mesh the
 * reference point falls out; an open one is measured from the given point (x, y) at z = 0.
 */
export function signedVolume(mesh: Mesh, fromX: number, fromY: number): number {
  const { triangles, index, position } = mesh;
  let sum = 0;
  for (let t = 0, c = 0; t < triangles; t++, c += 3) {
    sum += sixVolumes(position, index[c] * 3, index[c + 1] * 3, index[c + 2] * 3, fromX, fromY);
  }
  return sum / 6;
}

/** The same, shell by shell, each measured from its own first vertex. */
export function shellVolumes(mesh: Mesh, ofFacet: Uint32Array, count: number): Float64Array {
  const { triangles, index, position } = mesh;
  const sums = new Float64Array(count);
  const fromX = new Float64Array(count).fill(NaN);
  const fromY = new Float64Array(count);
  for (let t = 0, c = 0; t < triangles; t++, c += 3) {
    const shell = ofFacet[t];
    const a = index[c] * 3;
    if (Number.isNaN(fromX[shell])) {
      fromX[shell] = position[a];
      fromY[shell] = position[a + 1];
    }
    sums[shell] += sixVolumes(position, a, index[c + 1] * 3, index[c + 2] * 3, fromX[shell], fromY[shell]);
  }
  return sums.map((sum) => sum / 6);
}

function sixVolumes(p: Float64Array, a: number, b: number, c: number, x: number, y: number): number {
  const bx = p[b] - x;
  const by = p[b + 1] - y;
  const cx = p[c] - x;
  const cy = p[c + 1] - y;
  const bz = p[b + 2];
  const cz = p[c + 2];
  return (
    (p[a] - x) * (by * cz - bz * cy) + (p[a + 1] - y) * (bz * cx - bx * cz) + p[a + 2] * (bx * cy - by * cx)
  );
}
