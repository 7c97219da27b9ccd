import { MeshoptSimplifier } from 'meshoptimizer/simplifier';
import { measureDeviation } from './measure-deviation';
import type { SplitMesh } from './split-vertices';
import { DRAFT_STEP_DEG } from './stage-model-meta';

/** Above this many triangles the stage shows a simplified surface. */
export const TRIANGLE_TARGET = 200_000;

/** The simplifier works from the smallest error upwards and stops at the target; this part of the longest side caps it. */
const CAP = 1 / 150;

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
  await MeshoptSimplifier.ready;
  const points = placePoints(mesh);
  const positions = vertexPositions(mesh, points);
  const attributes = vertexAttributes(mesh);
  const boundMm = 65535 * mesh.stepMm * CAP;
  const collapse = (from: Uint32Array, flags: ('ErrorAbsolute' | 'Permissive')[]) =>
    MeshoptSimplifier.simplifyWithAttributes(
      from,
      positions,
      3,
      attributes,
      4,
      [0.5, 0.5, 0.5, 0.5],
      null,
      target * 3,
      boundMm,
      flags,
    )[0];
  let index = collapse(mesh.index, ['ErrorAbsolute']);
  if (index.length > target * 3 * 1.2) index = collapse(index, ['ErrorAbsolute', 'Permissive']);
  return { index, boundMm, errorMm: measureDeviation(points, index, mesh.place) };
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

/** Normal, and draft in tens of degrees: a turn of the colour weighs like a turn of the surface. */
function vertexAttributes(mesh: SplitMesh): Float32Array {
  const attributes = new Float32Array(mesh.vertices * 4);
  for (let v = 0; v < mesh.vertices; v++) {
    for (let a = 0; a < 3; a++) attributes[v * 4 + a] = mesh.normals[v * 3 + a];
    attributes[v * 4 + 3] = (mesh.draft[v] * DRAFT_STEP_DEG) / 10;
  }
  return attributes;
}
