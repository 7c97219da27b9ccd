import type { Mesh } from './mesh';
import type { Shells } from './find-shells';
import { shellVolumes } from './signed-volume';

/** More shells than this are judged by their own sign alone. */
const MOST_NESTED = 200;

/**
 * Turns inside-out shells: a shell is right when it is positive outside all others; a negative one is right
 * inside another (a void). Where every outermost shell is negative the whole file is inside out.
 * @returns the number of shells turned; the mesh's index is changed in place.
 */
export function orientShells(mesh: Mesh, shells: Shells): number {
  const volumes = shellVolumes(mesh, shells.ofFacet, shells.count);
  const negative: number[] = [];
  volumes.forEach((volume, shell) => {
    if (volume < 0) negative.push(shell);
  });
  if (negative.length === 0) return 0;
  const flip = new Uint8Array(shells.count);
  if (shells.count > MOST_NESTED) {
    const outside = volumes.reduce((sum, volume) => sum + volume, 0) < 0;
    if (outside) flip.fill(1);
  } else {
    const firstFacet = new Int32Array(shells.count).fill(-1);
    shells.ofFacet.forEach((shell, facet) => {
      if (firstFacet[shell] < 0) firstFacet[shell] = facet;
    });
    const outermost = Array.from(volumes, (_, shell) => shell).filter(
      (shell) => windingOfOthers(mesh, shells, shell, firstFacet[shell]) === 0,
    );
    if (outermost.length > 0 && outermost.every((shell) => volumes[shell] < 0)) flip.fill(1);
    else for (const shell of outermost) if (volumes[shell] < 0) flip[shell] = 1;
  }
  return turn(mesh, shells, flip);
}

function turn(mesh: Mesh, shells: Shells, flip: Uint8Array): number {
  for (let t = 0; t < mesh.triangles; t++) {
    if (!flip[shells.ofFacet[t]]) continue;
    const swap = mesh.index[3 * t + 1];
    mesh.index[3 * t + 1] = mesh.index[3 * t + 2];
    mesh.index[3 * t + 2] = swap;
  }
  return flip.reduce((sum, one) => sum + one, 0);
}

/** Winding number of all other shells about the middle of `facet`, by signed crossings of the ray along +Z. */
function windingOfOthers(mesh: Mesh, shells: Shells, shell: number, facet: number): number {
  const { index, position: p } = mesh;
  const [i, j, k] = [0, 1, 2].map((corner) => index[3 * facet + corner] * 3);
  const x = (p[i] + p[j] + p[k]) / 3;
  const y = (p[i + 1] + p[j + 1] + p[k + 1]) / 3;
  const z = (p[i + 2] + p[j + 2] + p[k + 2]) / 3;
  let winding = 0;
  for (let t = 0, c = 0; t < mesh.triangles; t++, c += 3) {
    if (shells.ofFacet[t] === shell) continue;
    const corners = [index[c] * 3, index[c + 1] * 3, index[c + 2] * 3];
    let right = 0;
    for (let side = 0; side < 3; side++) {
      const a = corners[side];
      const b = corners[(side + 1) % 3];
      const upward = p[a + 1] <= y;
      if (upward === p[b + 1] <= y) continue;
      const cross = p[a] + ((y - p[a + 1]) / (p[b + 1] - p[a + 1])) * (p[b] - p[a]);
      if (cross > x) right += upward ? 1 : -1;
    }
    if (right !== 0 && heightAt(p, corners, x, y) > z) winding += right;
  }
  return winding;
}

function heightAt(p: Float64Array, [a, b, c]: number[], x: number, y: number): number {
  const [ux, uy, uz] = [p[b] - p[a], p[b + 1] - p[a + 1], p[b + 2] - p[a + 2]];
  const [vx, vy, vz] = [p[c] - p[a], p[c + 1] - p[a + 1], p[c + 2] - p[a + 2]];
  const area = ux * vy - uy * vx;
  const s = ((x - p[a]) * vy - (y - p[a + 1]) * vx) / area;
  const t = (ux * (y - p[a + 1]) - uy * (x - p[a])) / area;
  return p[a + 2] + s * uz + t * vz;
}
