import { MeshoptDecoder } from 'meshoptimizer/decoder';
import {
  BufferAttribute,
  BufferGeometry,
  type Matrix4,
  Vector3,
  type InterleavedBufferAttribute,
  type Mesh,
} from 'three';
import { GLTFLoader } from 'three/addons/loaders/GLTFLoader.js';
import { makeSheetSampler } from '@/lib/formability/sheet/thickness-at';
import { LIES_ATTRIBUTE, SHEET_ATTRIBUTE, SHEET_STEP_MM } from '@/lib/stage-model/sheet-model-meta';
import { FLAG_BED, FLAG_UNDERCUT } from '@/lib/stage-model/stage-model-meta';

/** The formed sheet ready to draw, cut and read; plain arrays, so that a worker can hand it over. */
export interface SheetModelData {
  /** mm, three numbers a node, on the template's side */
  positions: Float32Array;
  normals: Float32Array;
  index: Uint32Array;
  thicknessMm: Float32Array;
  /** 1 where it lies on template or bed */
  lies: Float32Array;
  /** thickness over each vertex of the stage model, mm; 0 where the sheet does not reach it */
  onTemplateMm: Float32Array;
}

/** What of the stage model the sheet is laid over. */
export interface TemplateVertices {
  positions: Float32Array;
  flags: Float32Array;
}

/** The sheet cuts corners of the template by about one of its elements; what lies farther off is bridged. */
const REACH_ELEMENTS = 1.25;
const REACH_MM = 0.5;

export async function fetchSheetModel(
  url: string,
  nodes: readonly [number, number],
  template: TemplateVertices,
): Promise<SheetModelData> {
  const answer = await fetch(url, { credentials: 'same-origin' }).catch(() => null);
  if (!answer?.ok) throw new Error('The formed sheet could not be fetched. Reload the page.');
  return decodeSheetModel(await answer.arrayBuffer(), nodes, template);
}

/** Throws when the bytes are not a sheet model. */
export async function decodeSheetModel(
  glb: ArrayBuffer,
  nodes: readonly [number, number],
  template: TemplateVertices,
): Promise<SheetModelData> {
  await MeshoptDecoder.ready.catch(() => undefined);
  if (!MeshoptDecoder.supported)
    throw new Error('This browser does not allow WebAssembly, which the formed sheet needs.');
  const loader = new GLTFLoader();
  loader.setMeshoptDecoder(MeshoptDecoder);
  const { scene } = await loader.parseAsync(glb, '');
  scene.updateMatrixWorld(true);
  let mesh: Mesh | undefined;
  scene.traverse((object) => {
    if ((object as Mesh).isMesh) mesh = object as Mesh;
  });
  const geometry = mesh?.geometry;
  const counts = geometry?.getAttribute(SHEET_ATTRIBUTE.toLowerCase());
  const lies = geometry?.getAttribute(LIES_ATTRIBUTE.toLowerCase());
  if (!mesh || !geometry?.index || !counts || !lies || counts.count !== nodes[0] * nodes[1])
    throw new Error('The file is not a formed sheet; run the check again.');
  const positions = moved(plain(geometry.getAttribute('position'), 3), mesh.matrixWorld);
  const index = Uint32Array.from(geometry.index.array);
  const thicknessMm = plain(counts, 1).map((v) => v * SHEET_STEP_MM);
  const surface = { nodes: [...nodes] as [number, number], positions, indices: index, thicknessMm };
  return {
    positions,
    normals: normalsOf(positions, index),
    index,
    thicknessMm,
    lies: plain(lies, 1),
    onTemplateMm: layOver(surface, template),
  };
}

export function sheetTransferables(sheet: SheetModelData): ArrayBuffer[] {
  return [
    ...new Set(Object.values(sheet).map((array: Float32Array | Uint32Array) => array.buffer as ArrayBuffer)),
  ];
}

/** Thickness over each vertex of the template: none on the bed, under an overhang, and where the sheet bridges it. */
function layOver(
  surface: Parameters<typeof makeSheetSampler>[0],
  { positions, flags }: TemplateVertices,
): Float32Array {
  const sample = makeSheetSampler(surface);
  const { positions: p, nodes } = surface;
  const last = p.length - 3;
  const element = Math.max((p[last] - p[0]) / (nodes[0] - 1), (p[last + 1] - p[1]) / (nodes[1] - 1));
  const reach = REACH_ELEMENTS * element + REACH_MM;
  return Float32Array.from(flags, (flag, v) => {
    if (flag & (FLAG_BED | FLAG_UNDERCUT)) return 0;
    const { thicknessMm, offMm } = sample(positions[3 * v], positions[3 * v + 1], positions[3 * v + 2]);
    return offMm <= reach ? thicknessMm : 0;
  });
}

function normalsOf(positions: Float32Array, index: Uint32Array): Float32Array {
  const geometry = new BufferGeometry();
  geometry.setAttribute('position', new BufferAttribute(positions, 3));
  geometry.setIndex(new BufferAttribute(index, 1));
  geometry.computeVertexNormals();
  return geometry.getAttribute('normal').array as Float32Array;
}

/** The node's scale and place turn grid counts into mm. */
function moved(points: Float32Array, matrix: Matrix4): Float32Array {
  const point = new Vector3();
  for (let i = 0; i < points.length; i += 3)
    point.fromArray(points, i).applyMatrix4(matrix).toArray(points, i);
  return points;
}

/** Tightly packed floats of an attribute that may be quantised and strided. */
function plain(attribute: BufferAttribute | InterleavedBufferAttribute, size: 1 | 3): Float32Array {
  const out = new Float32Array(attribute.count * size);
  for (let i = 0; i < attribute.count; i++) {
    for (let c = 0; c < size; c++) out[i * size + c] = attribute.getComponent(i, c);
  }
  return out;
}
