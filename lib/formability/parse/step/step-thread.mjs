// Turns STEP into triangles with occt-import-js (Open CASCADE compiled to WebAssembly, whose memory ends at 2 GB).
import { createRequire } from 'node:module';
import { parentPort, workerData } from 'node:worker_threads';

const load = createRequire(import.meta.url)('occt-import-js');
const { input, limits } = workerData;
const silent = () => undefined;

/** @returns {{ answer: object, coords?: Float32Array }} */
async function convert() {
  const occt = await load({ print: silent, printErr: silent });
  const read = (deflection) =>
    occt.ReadStepFile(input, {
      linearUnit: 'millimeter',
      angularDeflection: limits.angularDeg * (Math.PI / 180),
      ...deflection,
    });
  const first = read({ linearDeflectionType: 'bounding_box_ratio', linearDeflection: limits.sizeShare });
  if (!first.success) return { answer: { failed: 'unreadable' } };
  if (countTriangles(first) === 0) return { answer: { failed: 'nothing' } };
  if (first.meshes.length > limits.bodies)
    return { answer: { failed: 'bodies', bodies: first.meshes.length } };
  // One shape of ordinary size has got its deflection already; others are done again with one for all.
  const wanted = limits.sizeShare * meanSide(first.meshes);
  const deflectionMm = Math.min(limits.coarsestMm, Math.max(limits.finestMm, wanted));
  const fits = deflectionMm === wanted && first.root.children.length === 1;
  const result = fits
    ? first
    : read({ linearDeflectionType: 'absolute_value', linearDeflection: deflectionMm });
  const triangles = countTriangles(result);
  if (triangles === 0) return { answer: { failed: 'nothing' } };
  if (triangles > limits.triangles) return { answer: { failed: 'triangles', triangles } };
  const answer = { triangles, bodies: result.meshes.length, deflectionMm };
  return { answer, coords: flatten(result.meshes, triangles) };
}

function countTriangles({ meshes }) {
  return (meshes ?? []).reduce((sum, mesh) => sum + mesh.index.array.length / 3, 0);
}

function meanSide(meshes) {
  const low = [Infinity, Infinity, Infinity];
  const high = [-Infinity, -Infinity, -Infinity];
  for (const mesh of meshes) {
    const position = mesh.attributes.position.array;
    for (let i = 0; i < position.length; i++) {
      if (position[i] < low[i % 3]) low[i % 3] = position[i];
      if (position[i] > high[i % 3]) high[i % 3] = position[i];
    }
  }
  return low.reduce((sum, least, k) => sum + (high[k] - least) / 3, 0);
}

function flatten(meshes, triangles) {
  const coords = new Float32Array(9 * triangles);
  let at = 0;
  for (const mesh of meshes) {
    const position = mesh.attributes.position.array;
    const index = mesh.index.array;
    for (let c = 0; c < index.length; c++) {
      const v = 3 * index[c];
      coords[at++] = position[v];
      coords[at++] = position[v + 1];
      coords[at++] = position[v + 2];
    }
  }
  return coords;
}

let result;
try {
  result = await convert();
} catch (error) {
  // An abort or trap of the WebAssembly leaves it unusable: told, and the process ends.
  result = { answer: { failed: 'crashed', why: String(error?.message ?? error).slice(0, 200) } };
}
parentPort.postMessage(result, result.coords ? [result.coords.buffer] : []);
