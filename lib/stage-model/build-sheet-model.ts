import { Document } from '@gltf-transform/core';
import { binOf } from './map-histogram';
import {
  LIES_ATTRIBUTE,
  SHEET_ATTRIBUTE,
  SHEET_STEP_MM,
  type FormedSurface,
  type SheetModelMeta,
} from './sheet-model-meta';
import { compressGlb } from './compress-glb';

export interface SheetModel {
  /** binary glTF 2.0 with EXT_meshopt_compression and KHR_mesh_quantization */
  glb: Uint8Array;
  meta: SheetModelMeta;
}

const BINS = 60;
const MOST_COUNT = 65535;

/**
 * The formed sheet as the page draws it: positions on a 16-bit grid (mm by the node's scale), `_SHEET` in counts of
 * 0.001 mm of thickness, `_LIES` 1 where it lies on template or bed. Nodes keep their order, so that the page can look
 * thickness up by place.
 */
export async function buildSheetModel(surface: FormedSurface, gaugeMm: number): Promise<SheetModel> {
  const { positions, indices, thicknessMm, contact, nodes } = surface;
  const { min, max } = boundsOf(positions);
  const step = Math.max(...max.map((m, a) => m - min[a])) / MOST_COUNT || 1e-6;
  const doc = new Document();
  const buffer = doc.createBuffer();
  const accessor = (type: 'SCALAR' | 'VEC3', array: Uint16Array | Uint8Array | Uint32Array) =>
    doc.createAccessor().setType(type).setArray(array.slice()).setBuffer(buffer);
  const grid = Uint16Array.from(positions, (v, i) => Math.round((v - min[i % 3]) / step));
  const counts = Uint16Array.from(thicknessMm, (t) => Math.min(MOST_COUNT, Math.round(t / SHEET_STEP_MM)));
  const small = thicknessMm.length <= MOST_COUNT;
  const primitive = doc
    .createPrimitive()
    .setIndices(accessor('SCALAR', small ? Uint16Array.from(indices) : indices))
    .setAttribute('POSITION', accessor('VEC3', grid))
    .setAttribute(SHEET_ATTRIBUTE, accessor('SCALAR', counts))
    .setAttribute(LIES_ATTRIBUTE, accessor('SCALAR', contact));
  const shape = doc.createMesh('formed sheet').addPrimitive(primitive);
  shape.setExtras({
    unit: 'mm',
    up: 'z',
    sheet: { attribute: SHEET_ATTRIBUTE, unit: 'mm', step: SHEET_STEP_MM },
    lies: { attribute: LIES_ATTRIBUTE, touching: 1 },
    nodes,
  });
  const node = doc.createNode('formed sheet').setMesh(shape).setTranslation(min);
  doc.createScene().addChild(node.setScale([step, step, step]));
  const glb = await compressGlb(doc, 'QUANTIZE');
  const meta: SheetModelMeta = {
    schema: 1,
    nodes: [...nodes],
    triangles: indices.length / 3,
    bytes: glb.byteLength,
    gaugeMm,
    quantumMm: step / 2,
    boundsMm: { min, max },
    ...measurePart(surface, gaugeMm),
  };
  return { glb, meta };
}

/** Range and area by thickness of what stays on the part, as the file holds it. */
function measurePart(
  { indices, thicknessMm, foot, areaMm2 }: FormedSurface,
  gaugeMm: number,
): Pick<SheetModelMeta, 'rangeMm' | 'histogram' | 'areaMm2'> {
  const edges = Array.from({ length: BINS + 1 }, (_, i) => (gaugeMm * i) / BINS);
  const areas = new Array<number>(BINS).fill(0);
  const area = { part: 0, foot: 0 };
  let [low, high] = [Infinity, -Infinity];
  for (let t = 0; t < foot.length; t++) {
    if (foot[t]) {
      area.foot += areaMm2[t];
      continue;
    }
    area.part += areaMm2[t];
    const corners = [0, 1, 2].map((c) => thicknessMm[indices[3 * t + c]]);
    low = Math.min(low, ...corners);
    high = Math.max(high, ...corners);
    areas[binOf(edges, (corners[0] + corners[1] + corners[2]) / 3)] += areaMm2[t];
  }
  return {
    rangeMm: low > high ? null : [low, high],
    histogram: { edges, areaMm2: areas },
    areaMm2: area,
  };
}

function boundsOf(positions: Float32Array): SheetModelMeta['boundsMm'] {
  const min: [number, number, number] = [Infinity, Infinity, Infinity];
  const max: [number, number, number] = [-Infinity, -Infinity, -Infinity];
  for (let i = 0; i < positions.length; i++) {
    min[i % 3] = Math.min(min[i % 3], positions[i]);
    max[i % 3] = Math.max(max[i % 3], positions[i]);
  }
  return { min, max };
}
