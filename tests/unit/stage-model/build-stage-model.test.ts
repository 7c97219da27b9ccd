import { WebIO } from '@gltf-transform/core';
import { EXTMeshoptCompression, KHRMeshQuantization } from '@gltf-transform/extensions';
import { MeshoptDecoder } from 'meshoptimizer/decoder';
import { BufferAttribute, BufferGeometry, Vector3 } from 'three';
import { MeshBVH } from 'three-mesh-bvh';
import { describe, expect, it } from 'vitest';
import { buildStageModel } from '@/lib/stage-model/build-stage-model';
import { DRAFT_STEP_DEG, type StageGeometry } from '@/lib/stage-model/stage-model-meta';
import { boxWithBore, frustum, geometryOf, hemisphere, roughen, subdivide, tray } from './shapes';

/** Reads a stage model as any glTF program would. */
async function read(glb: Uint8Array) {
  await MeshoptDecoder.ready;
  const io = new WebIO()
    .registerExtensions([EXTMeshoptCompression, KHRMeshQuantization])
    .registerDependencies({ 'meshopt.decoder': MeshoptDecoder });
  const root = (await io.readBinary(glb)).getRoot();
  const node = root.listNodes()[0];
  const [surface, ink] = root.listMeshes()[0].listPrimitives();
  const [scale, origin] = [node.getScale(), node.getTranslation()];
  const grid = surface.getAttribute('POSITION')!.getArray()!;
  return {
    extensions: root
      .listExtensionsUsed()
      .map((e) => e.extensionName)
      .sort(),
    extras: root.listMeshes()[0].getExtras() as {
      draft: { step: number; range: [number, number]; unit: string };
    },
    positions: Float32Array.from(grid as Uint16Array, (v, i) => v * scale[i % 3] + origin[i % 3]),
    normals: surface.getAttribute('NORMAL')!,
    draft: surface.getAttribute('_DRAFT')!.getArray()!,
    flags: surface.getAttribute('_FLAGS')!.getArray()!,
    index: surface.getIndices()!.getArray()!,
    lines: ink?.getIndices()!.getArray() ?? [],
  };
}

/** Source facets by their centre, rounded to a tenth, to find a read triangle's own facet again. */
function facetByCentre({ positions }: StageGeometry, at: (corner: number) => ArrayLike<number>): number {
  const centre = [0, 1, 2].map((a) => (at(0)[a] + at(1)[a] + at(2)[a]) / 3);
  let best = -1;
  let least = Infinity;
  for (let f = 0; f < positions.length / 9; f++) {
    let d = 0;
    for (let a = 0; a < 3; a++) {
      d += Math.abs(
        (positions[f * 9 + a] + positions[f * 9 + 3 + a] + positions[f * 9 + 6 + a]) / 3 - centre[a],
      );
    }
    if (d < least) [least, best] = [d, f];
  }
  return best;
}

describe('buildStageModel', () => {
  it('writes a quantised meshopt GLB that reads back with every triangle, in mm', async () => {
    const geometry = geometryOf(tray({ segments: 24 }));
    const { glb, meta } = await buildStageModel(geometry);
    const model = await read(glb);
    expect(model.extensions).toEqual(['EXT_meshopt_compression', 'KHR_mesh_quantization']);
    expect(model.index.length / 3).toBe(geometry.facetDraftDeg.length);
    expect(meta.triangles).toBe(meta.sourceTriangles);
    expect(meta.simplificationErrorMm).toBe(0);
    expect(meta.bytes).toBe(glb.byteLength);
    for (const a of [0, 1, 2]) {
      const read = Array.from(model.positions).filter((_, i) => i % 3 === a);
      const source = Array.from(geometry.positions).filter((_, i) => i % 3 === a);
      expect(Math.abs(Math.min(...read) - Math.min(...source))).toBeLessThanOrEqual(meta.quantumMm + 1e-5);
      expect(Math.abs(Math.max(...read) - Math.max(...source))).toBeLessThanOrEqual(meta.quantumMm + 1e-5);
      expect(meta.boundsMm.max[a]).toBeCloseTo(Math.max(...read), 4);
    }
  });

  it('gives every corner the draft of its own facet within the split and the quantum, and its own flag', async () => {
    const geometry = geometryOf(tray({ segments: 24, drafts: [9, 3, -4, 0, 12, 6] }));
    const { glb, meta } = await buildStageModel(geometry);
    const { positions, draft, flags, index, extras } = await read(glb);
    expect(extras.draft).toMatchObject({ unit: 'deg', step: DRAFT_STEP_DEG, range: meta.draftRangeDeg });
    let undercut = 0;
    for (let t = 0; t < index.length; t += 3) {
      const facet = facetByCentre(geometry, (k) =>
        positions.subarray(index[t + k] * 3, index[t + k] * 3 + 3),
      );
      for (let k = 0; k < 3; k++) {
        const shown = draft[index[t + k]] * DRAFT_STEP_DEG;
        expect(Math.abs(shown - geometry.facetDraftDeg[facet])).toBeLessThanOrEqual(
          meta.draftSplitDeg + DRAFT_STEP_DEG,
        );
        expect(flags[index[t + k]]).toBe(geometry.facetFlags[facet]);
      }
      if (flags[index[t]] & 2) undercut++;
    }
    expect(undercut).toBeGreaterThan(20);
  });

  it('keeps the draft of plane walls exact and never mixes it across an edge', async () => {
    const { glb } = await buildStageModel(geometryOf(frustum(60, 30, 5)));
    const { draft } = await read(glb);
    expect(
      [...new Set(Array.from(draft as Int16Array, (v) => v * DRAFT_STEP_DEG))].sort((a, b) => a - b),
    ).toEqual([-90, 5, 90]);
  });

  it('draws the twelve edges of a frustum and no other in ink', async () => {
    const { glb } = await buildStageModel(geometryOf(frustum(60, 30, 5)));
    const { lines, positions } = await read(glb);
    expect(lines.length / 2).toBe(12);
    let length = 0;
    for (let i = 0; i < lines.length; i += 2) {
      const [a, b] = [lines[i] * 3, lines[i + 1] * 3];
      length += Math.hypot(...[0, 1, 2].map((k) => positions[a + k] - positions[b + k]));
    }
    const top = 60 - 60 * Math.tan((5 * Math.PI) / 180);
    const slant = Math.hypot(30, ((60 - top) / 2) * Math.SQRT2);
    expect(length).toBeCloseTo(4 * 60 + 4 * top + 4 * slant, 1);
  });

  it('shades round walls smoothly and edges sharply', async () => {
    const { glb } = await buildStageModel(geometryOf(hemisphere(30, 60)));
    const { normals, positions, flags } = await read(glb);
    let seen = 0;
    for (let v = 0; v < normals.getCount(); v++) {
      if (flags[v] & 1 || positions[v * 3 + 2] < 1) continue;
      const n = normals.getElement(v, []);
      const along = [0, 1, 2].reduce((sum, a) => sum + n[a] * positions[v * 3 + a], 0);
      const dot = along / (30 * Math.hypot(n[0], n[1], n[2]));
      expect(dot).toBeGreaterThan(0.999);
      seen++;
    }
    expect(seen).toBeGreaterThan(5000);
  });

  it('simplifies above the target and states how far the surface moved, as an independent measure finds', async () => {
    const geometry = geometryOf(hemisphere(40, 90));
    const { glb, meta } = await buildStageModel(geometry, { triangleTarget: 8000 });
    expect(meta.sourceTriangles).toBe(64_800);
    expect(meta.triangles).toBeLessThanOrEqual(8000 * 1.2);
    expect(meta.simplificationErrorMm).toBeGreaterThan(0);
    expect(meta.simplificationErrorMm).toBeLessThan(0.25);
    const model = await read(glb);
    const surface = new BufferGeometry();
    surface.setAttribute('position', new BufferAttribute(model.positions, 3));
    surface.setIndex(new BufferAttribute(Uint32Array.from(model.index), 1));
    const bvh = new MeshBVH(surface);
    let worst = 0;
    for (let i = 0; i < geometry.positions.length; i += 27) {
      const point = new Vector3(...geometry.positions.subarray(i, i + 3));
      worst = Math.max(worst, bvh.closestPointToPoint(point)!.distance);
    }
    // The two look at different samples of the source and one of them before the grid rounded it.
    expect(worst).toBeLessThanOrEqual(meta.simplificationErrorMm * 1.1 + 2 * meta.quantumMm);
    expect(meta.simplificationErrorMm).toBeLessThanOrEqual(worst * 1.25 + 2 * meta.quantumMm);
  });

  it('flat faces cost nothing: a finely divided frustum comes back to its own shape', async () => {
    const geometry = geometryOf(subdivide(frustum(60, 30, 5), 5));
    const { glb, meta } = await buildStageModel(geometry, { triangleTarget: 500 });
    expect(meta.sourceTriangles).toBe(16_384);
    expect(meta.triangles).toBeLessThanOrEqual(600);
    // Two roundings of each of three axes.
    expect(meta.simplificationErrorMm).toBeLessThanOrEqual(2 * Math.sqrt(3) * meta.quantumMm);
    const { draft } = await read(glb);
    const drafts = [...new Set(Array.from(draft as Int16Array, (v) => v * DRAFT_STEP_DEG))];
    for (const shown of drafts) {
      expect(Math.min(...[-90, 5, 90].map((d) => Math.abs(d - shown)))).toBeLessThanOrEqual(DRAFT_STEP_DEG);
    }
  });

  it('widens the split on a mesh that is rough all over and says so, seed 11', async () => {
    const rough = (segments: number) => geometryOf(roughen(subdivide(tray({ segments }), 3), 0.2, 11));
    const [light, heavy] = [await buildStageModel(rough(12)), await buildStageModel(rough(100))];
    expect(light.meta.draftSplitDeg).toBe(1);
    expect(heavy.meta.draftSplitDeg).toBeGreaterThan(1);
    expect(heavy.meta.triangles).toBeLessThanOrEqual(240_000);
    expect(heavy.meta.bytes).toBeLessThan(6_000_000);
  });

  it('counts areas by draft with the bed left out of the bins', async () => {
    const [side, height, draft] = [60, 30, 5];
    const { meta } = await buildStageModel(geometryOf(frustum(side, height, draft)));
    const rad = (draft * Math.PI) / 180;
    const top = side - 2 * height * Math.tan(rad);
    const walls = 4 * ((side + top) / 2) * (height / Math.cos(rad));
    const binned = meta.histogram.areaMm2.reduce((a, b) => a + b, 0);
    expect(meta.areaMm2.bed).toBeCloseTo(side * side, 1);
    expect(binned).toBeCloseTo(top * top + walls, 1);
    expect(meta.areaMm2.undercut).toBe(0);
    expect(meta.draftRangeDeg[0]).toBeCloseTo(5, 4);
    expect(meta.draftRangeDeg[1]).toBeCloseTo(90, 4);
  });

  it('gives the same bytes for the same geometry', async () => {
    const geometry = geometryOf(boxWithBore(40, 30, 20, 4));
    const [a, b] = await Promise.all([buildStageModel(geometry), buildStageModel(geometry)]);
    expect(Buffer.from(a.glb).equals(Buffer.from(b.glb))).toBe(true);
  });

  it.each([
    ['no triangle', new Float32Array(0), 0, /no triangle/],
    ['only a point', new Float32Array(9).fill(3), 1, /no facet with an area/],
    [
      'a coordinate that is not a number',
      Float32Array.of(0, 0, 0, 1, 0, 0, NaN, 1, 0),
      1,
      /Triangle 0 .* not a number/,
    ],
    ['arrays that disagree', new Float32Array(18), 1, /does not agree/],
  ])('refuses %s', async (_, positions, facets, message) => {
    const geometry = {
      positions,
      facetDraftDeg: new Float32Array(facets),
      facetFlags: new Uint8Array(facets),
    };
    await expect(buildStageModel(geometry)).rejects.toThrow(message);
  });
});
