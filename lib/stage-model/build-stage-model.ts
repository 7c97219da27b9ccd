import { Document, type Accessor } from '@gltf-transform/core';
import { MeshoptEncoder } from 'meshoptimizer/encoder';
import { measureDraftArea } from './draft-histogram';
import { findCreaseEdges } from './find-crease-edges';
import { measureMaps } from './measure-maps';
import { coarsenStageMesh, simplifyStageMesh, TRIANGLE_TARGET } from './simplify-stage-mesh';
import { splitVertices, type SplitMesh } from './split-vertices';
import {
  COARSE_ROLE,
  DRAFT_ATTRIBUTE,
  DRAFT_STEP_DEG,
  FLAGS_ATTRIBUTE,
  TRAP_ATTRIBUTE,
  TRAP_NONE,
  WALL_ATTRIBUTE,
  WALL_NONE,
  type MapFigures,
  type StageGeometry,
  type StageModelMeta,
} from './stage-model-meta';
import { compressGlb } from './compress-glb';

export interface StageModel {
  /** binary glTF 2.0 with EXT_meshopt_compression and KHR_mesh_quantization */
  glb: Uint8Array;
  meta: StageModelMeta;
}

/**
 * The compact model that the browser draws, from the engine's geometry: welded, split where colours or shading may
 * not mix, simplified above `triangleTarget`, positions on a 16-bit grid (mm by the node's scale), `_DRAFT` in counts
 * of 0.01°, `_FLAGS` (1 bed, 2 undercut, 4 unvented pocket), `_WALL` and `_TRAP` in counts of 0.01 mm where the engine
 * found walls and pockets, a second primitive of ink lines, and for heavy models a third, coarser one on the same
 * vertices for frames in motion. Throws RangeError on unusable geometry.
 */
export async function buildStageModel(
  geometry: StageGeometry,
  { triangleTarget = TRIANGLE_TARGET }: { triangleTarget?: number } = {},
): Promise<StageModel> {
  assertUsable(geometry);
  await MeshoptEncoder.ready;
  const area = measureDraftArea(geometry);
  const mesh = splitVertices(geometry);
  if (mesh.vertices === 0)
    throw new RangeError('The mesh has no facet with an area; there is nothing to show.');
  const { index, boundMm, errorMm } = await simplifyStageMesh(mesh, triangleTarget);
  const coarse = await coarsenStageMesh(mesh, index);
  const lines = findCreaseEdges(mesh, index);
  const [remap, vertices] = MeshoptEncoder.reorderMesh(index, true, true);
  const renamed = { index, coarse: coarse.map((v) => remap[v]), lines: lines.map((v) => remap[v]) };
  const meta: StageModelMeta = {
    schema: 2,
    triangles: index.length / 3,
    vertices,
    sourceTriangles: geometry.facetDraftDeg.length,
    bytes: 0,
    boundsMm: bounds(mesh),
    draftRangeDeg: area.rangeDeg,
    quantumMm: mesh.stepMm / 2,
    simplificationBoundMm: boundMm,
    simplificationErrorMm: errorMm,
    draftSplitDeg: mesh.draftSplitDeg,
    areaMm2: area.areaMm2,
    histogram: area.histogram,
    maps: measureMaps(geometry),
  };
  const glb = await writeGlb(mesh, remap, vertices, renamed, meta);
  return { glb, meta: { ...meta, bytes: glb.byteLength } };
}

async function writeGlb(
  mesh: SplitMesh,
  remap: Uint32Array,
  vertices: number,
  { index, coarse, lines }: Record<'index' | 'coarse' | 'lines', Uint32Array>,
  meta: StageModelMeta,
): Promise<Uint8Array> {
  const { position, normal, draft, flags, wall, trap } = vertexArrays(mesh, remap, vertices);
  const doc = new Document();
  const buffer = doc.createBuffer();
  const accessor = (type: 'SCALAR' | 'VEC3', array: Parameters<Accessor['setArray']>[0]) =>
    doc.createAccessor().setType(type).setArray(array).setBuffer(buffer);
  const attributes = {
    POSITION: accessor('VEC3', position),
    NORMAL: accessor('VEC3', normal),
    [DRAFT_ATTRIBUTE]: accessor('SCALAR', draft),
    [FLAGS_ATTRIBUTE]: accessor('SCALAR', flags),
    ...(wall ? { [WALL_ATTRIBUTE]: accessor('SCALAR', wall) } : {}),
    ...(trap ? { [TRAP_ATTRIBUTE]: accessor('SCALAR', trap) } : {}),
  };
  const triangles = (corners: Uint32Array) => {
    const primitive = doc.createPrimitive().setIndices(accessor('SCALAR', narrow(corners, vertices)));
    for (const [name, value] of Object.entries(attributes)) primitive.setAttribute(name, value);
    return primitive;
  };
  const shape = doc.createMesh('template').addPrimitive(triangles(index));
  if (lines.length > 0) {
    const ink = doc
      .createPrimitive()
      .setMode(1)
      .setIndices(accessor('SCALAR', narrow(lines, vertices)));
    shape.addPrimitive(ink.setAttribute('POSITION', attributes.POSITION));
  }
  if (coarse.length > 0) shape.addPrimitive(triangles(coarse).setExtras({ role: COARSE_ROLE }));
  shape.setExtras({
    unit: 'mm',
    up: 'z',
    draft: { attribute: DRAFT_ATTRIBUTE, unit: 'deg', step: DRAFT_STEP_DEG, range: meta.draftRangeDeg },
    flags: { attribute: FLAGS_ATTRIBUTE, bed: 1, undercut: 2, unventedPocket: 4 },
    ...mapExtras(meta.maps),
    sourceTriangles: meta.sourceTriangles,
    simplificationErrorMm: meta.simplificationErrorMm,
  });
  const node = doc.createNode('template').setMesh(shape).setTranslation(mesh.origin);
  node.setScale([mesh.stepMm, mesh.stepMm, mesh.stepMm]);
  doc.createScene().addChild(node);
  return compressGlb(doc, 'FILTER');
}

/** Vertices in the order of the reordered index; `remap` holds 0xffffffff for those no triangle uses. */
function vertexArrays(mesh: SplitMesh, remap: Uint32Array, vertices: number) {
  const position = new Uint16Array(vertices * 3);
  const normal = new Float32Array(vertices * 3);
  const draft = new Int16Array(vertices);
  const flags = new Uint8Array(vertices);
  const wall = mesh.wall && new Uint16Array(vertices);
  const trap = mesh.trap && new Int16Array(vertices);
  for (let v = 0; v < mesh.vertices; v++) {
    const to = remap[v];
    if (to === 0xffffffff) continue;
    for (let a = 0; a < 3; a++) {
      position[to * 3 + a] = mesh.grid[mesh.place[v] * 3 + a];
      normal[to * 3 + a] = mesh.normals[v * 3 + a];
    }
    draft[to] = mesh.draft[v];
    flags[to] = mesh.flags[v];
    if (wall) wall[to] = mesh.wall![v];
    if (trap) trap[to] = mesh.trap![v];
  }
  return { position, normal, draft, flags, wall, trap };
}

/** Attribute, unit, step and range of each map, for whoever reads the file without its record. */
function mapExtras(maps: StageModelMeta['maps']): Record<string, object> {
  const say = ({ attribute, unit, step, range }: MapFigures) => ({ attribute, unit, step, range });
  return {
    ...(maps ? { layers: { ...say(maps.layers), figure: 'sin(draft) × layer height' } } : {}),
    ...(maps?.wall ? { wall: { ...say(maps.wall), none: WALL_NONE } } : {}),
    ...(maps?.trap ? { trap: { ...say(maps.trap), none: TRAP_NONE } } : {}),
  };
}

function narrow(index: Uint32Array, vertices: number): Uint16Array<ArrayBuffer> | Uint32Array<ArrayBuffer> {
  return vertices <= 65535 ? Uint16Array.from(index) : Uint32Array.from(index);
}

function bounds({ grid, origin, stepMm }: SplitMesh): StageModelMeta['boundsMm'] {
  const top = [0, 0, 0];
  for (let i = 0; i < grid.length; i++) top[i % 3] = Math.max(top[i % 3], grid[i]);
  const max = origin.map((o, a) => o + top[a] * stepMm) as [number, number, number];
  return { min: [...origin], max };
}

function assertUsable({ positions, facetDraftDeg, facetFlags, ...maps }: StageGeometry): void {
  const facets = facetDraftDeg.length;
  if (facets === 0) throw new RangeError('The mesh has no triangle; there is nothing to show.');
  if (positions.length !== facets * 9 || facetFlags.length !== facets) {
    throw new RangeError(
      `Geometry does not agree: ${positions.length} coordinates, ${facets} drafts, ${facetFlags.length} flags; ` +
        'nine coordinates, one draft and one flag a triangle are needed.',
    );
  }
  for (const name of ['facetWallMm', 'facetSpillMm'] as const) {
    const length = maps[name]?.length ?? facets;
    if (length !== facets) {
      throw new RangeError(`Geometry does not agree: ${facets} facets, ${length} figures of ${name}.`);
    }
  }
  for (let i = 0; i < positions.length; i++) {
    if (!Number.isFinite(positions[i])) {
      throw new RangeError(
        `Triangle ${Math.floor(i / 9)} has a coordinate that is not a number; parse the mesh again.`,
      );
    }
  }
}
