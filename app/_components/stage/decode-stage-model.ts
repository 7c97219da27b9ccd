import { BufferAttribute, BufferGeometry, type Object3D } from 'three';
import { MeshBVH, type SerializedBVH } from 'three-mesh-bvh';
import {
  COARSE_ROLE,
  DRAFT_ATTRIBUTE,
  DRAFT_STEP_DEG,
  FLAGS_ATTRIBUTE,
  MAP_STEP_MM,
  TRAP_ATTRIBUTE,
  TRAP_NONE,
  WALL_ATTRIBUTE,
} from '@/lib/stage-model/stage-model-meta';
import { moved, openGlb, plain } from './open-glb';

/** A stage model ready to draw, cut and pick; plain arrays, so that a worker can hand it over. */
export interface StageModelData {
  /** mm, three numbers a vertex */
  positions: Float32Array;
  normals: Float32Array;
  draftDeg: Float32Array;
  flags: Float32Array;
  /** mm, 0 where no wall was measured; null where the model has none at all */
  wallMm: Float32Array | null;
  /** mm below the pocket's rim, negative above it, under NO_TRAP_MM without a pocket; null where the model has none */
  trapMm: Float32Array | null;
  /** corners, in the order that the search tree wants them */
  index: Uint32Array;
  /** fewer triangles on the same vertices for frames in motion; empty where the model is light */
  coarse: Uint32Array;
  /** pairs of vertices: the ink lines */
  lines: Uint32Array;
  tree: SerializedBVH;
}

/** A vertex below this looks into no pocket. */
export const NO_TRAP_MM = (TRAP_NONE + 0.5) * MAP_STEP_MM;

export async function fetchStageModel(url: string): Promise<StageModelData> {
  const answer = await fetch(url, { credentials: 'same-origin' }).catch(() => null);
  if (!answer) throw new Error('The model could not be fetched: the network is away. Try again.');
  if (!answer.ok)
    throw new Error(`The model could not be fetched: the store answered ${answer.status}. Reload the page.`);
  return decodeStageModel(await answer.arrayBuffer());
}

/** Throws when the bytes are not a stage model. */
export async function decodeStageModel(glb: ArrayBuffer): Promise<StageModelData> {
  const scene = await openGlb(glb, 'the model');
  const found: { surface?: Drawn; coarse?: Drawn; ink?: Drawn } = {};
  scene.traverse((object) => {
    if ((object as { isLineSegments?: boolean }).isLineSegments) found.ink = object as Drawn;
    else if (!(object as { isMesh?: boolean }).isMesh) return;
    else if ((object as Drawn).geometry.userData.role === COARSE_ROLE) found.coarse = object as Drawn;
    else found.surface = object as Drawn;
  });
  const geometry = found.surface?.geometry;
  const draft = geometry?.getAttribute(DRAFT_ATTRIBUTE.toLowerCase());
  const flags = geometry?.getAttribute(FLAGS_ATTRIBUTE.toLowerCase());
  if (!geometry?.index || !draft || !flags)
    throw new Error('The file is not a stage model; run the check again.');
  return withTree({
    positions: moved(plain(geometry.getAttribute('position'), 3), found.surface!.matrixWorld),
    normals: plain(geometry.getAttribute('normal'), 3),
    draftDeg: plain(draft, 1).map((v) => v * DRAFT_STEP_DEG),
    flags: plain(flags, 1),
    wallMm: lengths(geometry, WALL_ATTRIBUTE),
    trapMm: lengths(geometry, TRAP_ATTRIBUTE),
    index: Uint32Array.from(geometry.index.array),
    coarse: Uint32Array.from(found.coarse?.geometry.index?.array ?? []),
    lines: Uint32Array.from(found.ink?.geometry.index?.array ?? []),
  });
}

export function transferables({ tree, ...arrays }: StageModelData): ArrayBuffer[] {
  const buffers = Object.values(arrays).flatMap((a) => (a ? [a.buffer as ArrayBuffer] : []));
  return [...new Set([...buffers, ...tree.roots])];
}

type Drawn = Object3D & { geometry: BufferGeometry };

/** The tree puts the triangles in its own order; the model takes that order over. */
function withTree(model: Omit<StageModelData, 'tree'>): StageModelData {
  const geometry = new BufferGeometry();
  geometry.setAttribute('position', new BufferAttribute(model.positions, 3));
  geometry.setIndex(new BufferAttribute(model.index, 1));
  const tree = MeshBVH.serialize(new MeshBVH(geometry, { targetLeafSize: 8 }), { cloneBuffers: false });
  return { ...model, index: geometry.index!.array as Uint32Array, tree: { ...tree, index: null as never } };
}

/** Models of an older schema, and parts without walls or pockets, do not have the attribute. */
function lengths(geometry: BufferGeometry, name: string): Float32Array | null {
  const attribute = geometry.getAttribute(name.toLowerCase());
  return attribute ? plain(attribute, 1).map((v) => v * MAP_STEP_MM) : null;
}
