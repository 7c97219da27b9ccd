import { describe, expect, it } from 'vitest';
import { decodeSheetModel } from '@/app/_components/stage/decode-sheet-model';
import { formSheet } from '@/lib/formability/sheet/form-sheet';
import { buildSheetModel } from '@/lib/stage-model/build-sheet-model';
import { SHEET_STEP_MM } from '@/lib/stage-model/sheet-model-meta';
import { block, field } from '../formability/sheet/templates';

const high = block(60, 40, 18, 6);
const template = field([60, 40], (x, y) => high(x - 200, y + 30), 0.5, [200, -30]);
const { surface, report } = formSheet(
  { template, frameMm: [100, 80], gaugeMm: 1, minFormedMm: 0.3 },
  { nodes: 48, single: true },
);
const built = buildSheetModel(surface, 1);

/** Template vertices: on top, half way up a wall, on the bed (flag 1), under an overhang (flag 2), far above. */
const wallX = 200 + 30 - 9 * Math.tan((6 * Math.PI) / 180);
const seen = {
  positions: Float32Array.from([200, -30, 18, wallX, -30, 9, 200, -30, 0, 200, -30, 18, 200, -30, 40]),
  flags: Float32Array.from([0, 0, 1, 2, 0]),
  normals: new Float32Array(15),
  index: new Uint32Array(0),
};
const decode = async (glb: Uint8Array, nodes = surface.nodes) =>
  decodeSheetModel(glb.slice().buffer as ArrayBuffer, nodes, seen);

describe('the formed sheet for the page', () => {
  it('comes back as it was formed, within the steps of its file', async () => {
    const { glb, meta } = await built;
    const sheet = await decode(glb);
    expect(sheet.index).toHaveLength(surface.indices.length);
    const worst = (a: Float32Array, b: Float32Array) =>
      a.reduce((most, v, i) => Math.max(most, Math.abs(v - b[i])), 0);
    expect(worst(sheet.positions, surface.positions)).toBeLessThanOrEqual(1.1 * meta.quantumMm + 1e-5);
    expect(worst(sheet.thicknessMm, surface.thicknessMm)).toBeLessThanOrEqual(0.51 * SHEET_STEP_MM);
    expect([...sheet.lies]).toEqual([...surface.contact]);
  });

  it('lays its thickness over the template: none on the bed, under an overhang, or where it does not reach', async () => {
    const { over } = await decode((await built).glb);
    const onTemplateMm = over.sheetMm;
    expect(onTemplateMm[0]).toBeCloseTo(1, 2);
    expect(onTemplateMm[1]).toBeGreaterThan(0.3);
    expect(onTemplateMm[1]).toBeLessThan(0.8);
    expect([...onTemplateMm.slice(2)]).toEqual([0, 0, 0]);
  });

  it('says how much of the part has which thickness, the foot apart', async () => {
    const { glb, meta } = await built;
    const sum = meta.histogram.areaMm2.reduce((all, area) => all + area, 0);
    expect(sum).toBeCloseTo(report.part!.areaMm2, 1);
    expect(meta.areaMm2.foot).toBeCloseTo(report.foot!.areaMm2, 1);
    expect(meta.rangeMm![1]).toBeCloseTo(1, 5);
    expect(meta).toMatchObject({ schema: 1, nodes: [49, 41], gaugeMm: 1, bytes: glb.byteLength });
    expect(glb.byteLength).toBeLessThan(10 * surface.nodes[0] * surface.nodes[1]);
  });

  it('is refused when the file is another one', async () => {
    await expect(decode((await built).glb, [10, 10])).rejects.toThrow(/not a formed sheet/);
  });
});
