import { MeshoptDecoder } from 'meshoptimizer/decoder';
import type { BufferAttribute, InterleavedBufferAttribute, Matrix4, Object3D } from 'three';
import { GLTFLoader } from 'three/addons/loaders/GLTFLoader.js';

/**
 * The scene of a compressed binary glTF, with every node in its place.
 * @param what named in the error of a browser without WebAssembly: `the model`
 */
export async function openGlb(glb: ArrayBuffer, what: string): Promise<Object3D> {
  await MeshoptDecoder.ready.catch(() => undefined);
  if (!MeshoptDecoder.supported)
    throw new Error(`This browser does not allow WebAssembly, which ${what} needs.`);
  const loader = new GLTFLoader();
  loader.setMeshoptDecoder(MeshoptDecoder);
  const { scene } = await loader.parseAsync(glb, '');
  scene.updateMatrixWorld(true);
  return scene;
}

/** Tightly packed floats of an attribute that may be quantised and strided. */
export function plain(attribute: BufferAttribute | InterleavedBufferAttribute, size: 1 | 3): Float32Array {
  const out = new Float32Array(attribute.count * size);
  for (let i = 0; i < attribute.count; i++) {
    for (let c = 0; c < size; c++) out[i * size + c] = attribute.getComponent(i, c);
  }
  return out;
}

/** The node's scale and place turn grid counts into mm. */
export function moved(points: Float32Array, { elements: m }: Matrix4): Float32Array {
  for (let i = 0; i < points.length; i += 3) {
    const [x, y, z] = [points[i], points[i + 1], points[i + 2]];
    for (let a = 0; a < 3; a++) points[i + a] = m[a] * x + m[4 + a] * y + m[8 + a] * z + m[12 + a];
  }
  return points;
}
