import type { Edges } from './build-edges';
import type { Shells } from './find-shells';
import type { Mesh } from './mesh';
import { shellVolumes } from './signed-volume';
import { WindingProbe } from './winding-probe';

/** Volumes below this share of the whole say nothing of in and out. */
const ROUNDING = 1e-9;
/** More shells than this in an open file are a heap of loose facets, judged as one. */
const MOST_LOOSE = 2000;

/**
 * Turns inside-out shells: a shell is right when it is positive outside all others; a negative one is right
 * inside another (a void). Where every outermost shell is negative the whole file is inside out.
 * @returns the shells turned; the index of the mesh and the edges are changed in place.
 */
export function orientShells(mesh: Mesh, shells: Shells, edges: Edges): number[] {
  const volumes = shellVolumes(mesh, shells.ofFacet, shells.count);
  const whole = volumes.reduce((sum, volume) => sum + Math.abs(volume), 0);
  if (!volumes.some((volume) => volume < -ROUNDING * whole)) return [];
  const all = Array.from(volumes, (_, shell) => shell);
  if (shells.count > MOST_LOOSE && edges.boundary > 0) {
    if (volumes.reduce((sum, volume) => sum + volume, 0) > 0) return [];
    turn(mesh, shells, edges, new Set(all));
    return all;
  }
  const outermost = shells.count === 1 ? all : findOutermost(mesh, shells);
  const wrong = outermost.filter((shell) => volumes[shell] < -ROUNDING * whole);
  const flip = outermost.length > 0 && wrong.length === outermost.length ? all : wrong;
  if (flip.length > 0) turn(mesh, shells, edges, new Set(flip));
  return flip;
}

function turn(mesh: Mesh, shells: Shells, edges: Edges, flip: Set<number>): void {
  const { index } = mesh;
  const swap = (of: Uint32Array | Int32Array | Uint8Array, i: number, j: number) => {
    const kept = of[i];
    of[i] = of[j];
    of[j] = kept;
  };
  for (let t = 0; t < mesh.triangles; t++) {
    if (!flip.has(shells.ofFacet[t])) continue;
    swap(index, 3 * t + 1, 3 * t + 2);
    swap(edges.ofCorner, 3 * t, 3 * t + 2);
  }
  for (let e = 0; e < edges.count; e++) {
    if (!flip.has(shells.ofFacet[edges.facetA[e]])) continue;
    const kept = edges.forward[e];
    edges.forward[e] = edges.backward[e];
    edges.backward[e] = kept;
  }
}

/** Shells of which some outermost corner (lowest or highest along an axis) lies in no other shell; none where that is too much to ask. */
function findOutermost(mesh: Mesh, shells: Shells): number[] {
  const { index, position: p } = mesh;
  const { ofFacet, count } = shells;
  const extreme = new Int32Array(6 * count).fill(-1);
  for (let c = 0; c < index.length; c++) {
    const v = index[c];
    const o = 6 * ofFacet[(c / 3) | 0];
    for (let k = 0; k < 3; k++) {
      if (extreme[o + k] < 0 || p[3 * v + k] < p[3 * extreme[o + k] + k]) extreme[o + k] = v;
      if (extreme[o + 3 + k] < 0 || p[3 * v + k] > p[3 * extreme[o + 3 + k] + k]) extreme[o + 3 + k] = v;
    }
  }
  const probe = new WindingProbe(index, p);
  const outermost: number[] = [];
  for (let shell = 0; shell < count; shell++) {
    const others = (facet: number) => ofFacet[facet] !== shell;
    for (let k = 0; k < 6; k++) {
      const v = 3 * extreme[6 * shell + k];
      const winding = probe.windingAt(p[v], p[v + 1], p[v + 2], true, others);
      if (Number.isNaN(winding)) return [];
      if (winding !== 0) continue;
      outermost.push(shell);
      break;
    }
  }
  return outermost;
}
