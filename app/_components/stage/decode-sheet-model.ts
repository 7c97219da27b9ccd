import { BufferAttribute, BufferGeometry, type Mesh } from 'three';
import { LIES_ATTRIBUTE, SHEET_ATTRIBUTE, SHEET_STEP_MM } from '@/lib/stage-model/sheet-model-meta';
import { FLAG_BED, FLAG_UNDERCUT } from '@/lib/stage-model/stage-model-meta';
import { moved, openGlb, plain } from './open-glb';
import { refineSurface, type Surface } from './refine-surface';
import { elementMm, makeReachSampler, type SampledSheet } from './sheet-reach';

/** The formed sheet ready to draw, cut and read; plain arrays, so that a worker can hand it over. */
export interface SheetModelData {
  /** mm, three numbers a node, on the template's side */
  positions: Float32Array;
  normals: Float32Array;
  index: Uint32Array;
  thicknessMm: Float32Array;
  /** 1 where it lies on template or bed */
  lies: Float32Array;
  nodes: [number, number];
  /** the template's surface, fine enough for the sheet's figures, with the thickness over each corner, mm; 0 without */
  over: Surface & { sheetMm: Float32Array };
}

export async function fetchSheetModel(
  url: string,
  nodes: readonly [number, number],
  template: Surface,
): Promise<SheetModelData> {
  const answer = await fetch(url, { credentials: 'same-origin' }).catch(() => null);
  if (!answer?.ok) throw new Error('The formed sheet could not be fetched. Reload the page.');
  return decodeSheetModel(await answer.arrayBuffer(), nodes, template);
}

/** Throws when the bytes are not a sheet model. */
export async function decodeSheetModel(
  glb: ArrayBuffer,
  nodes: readonly [number, number],
  template: Surface,
): Promise<SheetModelData> {
  const scene = await openGlb(glb, 'the formed sheet');
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
  const surface = { nodes: [...nodes] as [number, number], positions, index, thicknessMm };
  return {
    positions,
    normals: normalsOf(positions, index),
    index,
    thicknessMm,
    lies: plain(lies, 1),
    nodes: surface.nodes,
    over: layOver(surface, template),
  };
}

export function sheetTransferables({ over, nodes: _, ...sheet }: SheetModelData): ArrayBuffer[] {
  const arrays = [...Object.values(sheet), ...Object.values(over)];
  return [...new Set(arrays.map((array) => array.buffer as ArrayBuffer))];
}

/** Thickness over the template's surface: none on the bed, under an overhang, and where the sheet bridges it. */
function layOver(sheet: SampledSheet, template: Surface): SheetModelData['over'] {
  const fine = refineSurface(template, elementMm(sheet));
  const at = makeReachSampler(sheet);
  const { positions: p } = fine;
  const sheetMm = Float32Array.from(fine.flags, (flag, v) =>
    flag & (FLAG_BED | FLAG_UNDERCUT) ? 0 : (at([p[3 * v], p[3 * v + 1], p[3 * v + 2]]) ?? 0),
  );
  return { ...fine, sheetMm };
}

function normalsOf(positions: Float32Array, index: Uint32Array): Float32Array {
  const geometry = new BufferGeometry();
  geometry.setAttribute('position', new BufferAttribute(positions, 3));
  geometry.setIndex(new BufferAttribute(index, 1));
  geometry.computeVertexNormals();
  return geometry.getAttribute('normal').array as Float32Array;
}
