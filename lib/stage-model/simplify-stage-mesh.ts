import { MeshoptSimplifier } from 'meshoptimizer/simplifier';
import { measureDeviation } from './measure-deviation';
import type { SplitMesh } from './split-vertices';
import { DRAFT_STEP_DEG, MAP_STEP_MM, TRAP_NONE } from './stage-model-meta';

/** Above this many triangles the stage shows a simplified surface. */
export const TRIANGLE_TARGET = 200_000;

/** The simplifier works from the smallest error upwards and stops at the target; this part of the longest side caps it. */
const CAP = 1 / 150;

/** While the eye moves on a slow machine this many are drawn; worth having only where it spares half of them. */
const COARSE_TARGET = 30_000;

export interface Simplified {
  index: Uint32Array;
  boundMm: number;
  errorMm: number;
}

/**
 * Fewer triangles on the same vertices (none is moved, so every shown draft is one that was measured).
 * Edges where colour or shading is split are kept; only a mesh that is rough all over may collapse across them.
 */
export async function simplifyStageMesh(mesh: SplitMesh, target = TRIANGLE_TARGET): Promise<Simplified> {
  if (mesh.index.length / 3 <= target) return { index: mesh.index, boundMm: 0, errorMm: 0 };
  const { index, boundMm } = await collapse(mesh, mesh.index, target);
  return { index, boundMm, errorMm: measureDeviation(placePoints(mesh), index, mesh.place) };
}

/** A still coarser index for frames in motion, or an empty one where the model is light anyway. */
export async function coarsenStageMesh(mesh: SplitMesh, index: Uint32Array): Promise<Uint32Array> {
  if (index.length / 3 < 2 * COARSE_TARGET) return new Uint32Array(0);
  const coarse = await collapse(mesh, index, COARSE_TARGET);
  return coarse.index.length < index.length / 2 ? coarse.index : new Uint32Array(0);
}

async function collapse(mesh: SplitMesh, from: Uint32Array, target: number) {
  await MeshoptSimplifier.ready;
  const positions = vertexPositions(mesh, placePoints(mesh));
  const attributes = vertexAttributes(mesh);
  const boundMm = 65535 * mesh.stepMm * CAP;
  const run = (index: Uint32Array, flags: ('ErrorAbsolute' | 'Permissive')[]) =>
    MeshoptSimplifier.simplifyWithAttributes(
      index,
      positions,
      3,
      attributes.values,
      attributes.weights.length,
      attributes.weights,
      null,
      target * 3,
      boundMm,
      flags,
    )[0];
  let index = run(from, ['ErrorAbsolute']);
  if (index.length > target * 3 * 1.2) index = run(index, ['ErrorAbsolute', 'Permissive']);
  return { index, boundMm };
}

/** Place coordinates in mm, three numbers each, corner of the bounds at 0. */
export function placePoints(mesh: SplitMesh): Float32Array {
  const points = new Float32Array(mesh.grid.length);
  for (let i = 0; i < points.length; i++) points[i] = mesh.grid[i] * mesh.stepMm;
  return points;
}

function vertexPositions(mesh: SplitMesh, points: Float32Array): Float32Array {
  const positions = new Float32Array(mesh.vertices * 3);
  for (let v = 0; v < mesh.vertices; v++) {
    for (let a = 0; a < 3; a++) positions[v * 3 + a] = points[mesh.place[v] * 3 + a];
  }
  return positions;
}

/** Thicker than this is thick: no triangle is spent on how thick. */
const WALL_THICK_MM = 12;

/**
 * Normal, and draft in tens of degrees: a turn of the colour weighs like a turn of the surface. A millimetre of wall
 * weighs a tenth of one of shape; a pocket's depth follows the shape, only its end has to be kept.
 */
function vertexAttributes({ vertices, normals, draft, wall, trap }: SplitMesh) {
  const weights = [0.5, 0.5, 0.5, 0.5, ...(wall ? [0.1] : []), ...(trap ? [0.5] : [])];
  const size = weights.length;
  const values = new Float32Array(vertices * size);
  for (let v = 0; v < vertices; v++) {
    const at = v * size;
    for (let a = 0; a < 3; a++) values[at + a] = normals[v * 3 + a];
    values[at + 3] = (draft[v] * DRAFT_STEP_DEG) / 10;
    if (wall) values[at + 4] = Math.min(WALL_THICK_MM, wall[v] * MAP_STEP_MM);
    if (trap) values[at + size - 1] = trap[v] === TRAP_NONE ? 0 : 1;
  }
  return { values, weights };
}
