import type { Mesh } from './mesh';
import type { Shells } from './find-shells';

/** Shares of the mesh's size: shells that share planes come apart by the first, vertices within one by the second. */
export const SHELL_SHIFT = 1e-7;
const VERTEX_SHIFT = 1e-10;

/**
 * The mesh's positions in general position: every shell moved, and every vertex, by a tiny amount that hangs on
 * its number alone. Coplanar, collinear and coincident parts of different shells are then plain crossings or plain
 * misses; volumes change by about surface times 1e-7 of the size.
 */
export function perturbMesh(mesh: Mesh, shells: Shells, size: number): Float64Array {
  const { index, position } = mesh;
  const moved = position.slice();
  const done = new Uint8Array(mesh.vertices);
  for (let c = 0; c < index.length; c++) {
    const v = index[c];
    if (done[v]) continue;
    done[v] = 1;
    const shell = shells.ofFacet[(c / 3) | 0];
    for (let k = 0; k < 3; k++) {
      moved[3 * v + k] +=
        size * (SHELL_SHIFT * noise(3 * shell + k) + VERTEX_SHIFT * noise(3 * v + k + 7919));
    }
  }
  return moved;
}

/** A fixed number between −1 and 1 for every whole number. */
function noise(n: number): number {
  let h = Math.imul(n + 1, 0x9e3779b1);
  h = Math.imul(h ^ (h >>> 16), 0x85ebca6b);
  h = Math.imul(h ^ (h >>> 13), 0xc2b2ae35);
  return ((h ^ (h >>> 16)) | 0) / 2 ** 31;
}
