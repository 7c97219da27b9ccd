import { describe, expect, it } from 'vitest';
import { STANDARD_VIEWS, fit, rigAxes, type RigState } from '@/app/_components/stage/camera-rig';
import { decodeStageModel, transferables } from '@/app/_components/stage/decode-stage-model';
import { readSurface } from '@/app/_components/stage/read-surface';
import { SurfacePicker, toScreen } from '@/app/_components/stage/surface-picker';
import { buildStageModel } from '@/lib/stage-model/build-stage-model';
import { cutSection, sectionArea } from '@/lib/stage-model/section';
import { frustum, geometryOf, hemisphere, tray } from '../../stage-model/shapes';

const size = { width: 800, height: 500 };
const rad = Math.PI / 180;
const limits = { draftDeg: 5, layerMm: 0.15, stepMm: 0.1, wallMm: 3, sheetMm: 0.35 };

async function load(positions: Float32Array) {
  const { glb, meta } = await buildStageModel(geometryOf(positions));
  const bytes = glb.buffer.slice(glb.byteOffset, glb.byteOffset + glb.byteLength) as ArrayBuffer;
  const model = await decodeStageModel(bytes);
  return { model, meta, picker: new SurfacePicker(model) };
}

function seen(
  view: string,
  bounds: { min: [number, number, number]; max: [number, number, number] },
): RigState {
  const { azimuth, elevation } = STANDARD_VIEWS.find((v) => v.id === view)!;
  return fit({ azimuth, elevation, target: [0, 0, 0], span: 1 }, bounds, size.width / size.height);
}

describe('a decoded stage model', () => {
  it('has every triangle, mm, degrees and flags, and ink lines', async () => {
    const { model, meta } = await load(frustum(60, 30, 5));
    expect(model.index.length / 3).toBe(meta.triangles);
    expect(model.lines.length / 2).toBe(12);
    expect(model.coarse.length).toBe(0);
    expect(
      [...new Set(Array.from(model.draftDeg, (d) => Math.round(d * 100) / 100))].sort((a, b) => a - b),
    ).toEqual([-90, 5, 90]);
    expect(Math.max(...model.positions)).toBeCloseTo(30, 2);
    expect(new Set(transferables(model)).size).toBe(transferables(model).length);
  });

  it('is cut like its source', async () => {
    const positions = tray({ segments: 48 });
    const { model } = await load(positions);
    const line = { axis: 'y', atMm: -29.3 } as const;
    const [source, shown] = [cutSection({ positions }, line), cutSection(model, line)];
    expect(shown.loops.every((l) => l.closed)).toBe(true);
    expect(shown.loops.length).toBe(source.loops.length);
    expect(sectionArea(shown) / sectionArea(source)).toBeCloseTo(1, 4);
  });

  it('brings a lighter index for frames in motion where the model is heavy', async () => {
    const { model, meta } = await load(hemisphere(40, 100));
    expect(meta.triangles).toBe(80_000);
    expect(model.coarse.length / 3).toBeGreaterThan(10_000);
    expect(model.coarse.length / 3).toBeLessThan(40_000);
    expect(Math.max(...model.coarse)).toBeLessThan(model.positions.length / 3);
  });

  it('refuses other bytes', async () => {
    await expect(
      decodeStageModel(new TextEncoder().encode('solid of something').buffer as ArrayBuffer),
    ).rejects.toThrow();
  });
});

describe('picking', () => {
  it('meets the surface of a frustum where the closed form has it, within a hundredth of a mm', async () => {
    const { picker, meta } = await load(frustum(60, 30, 5));
    const rig = seen('front', meta.boundsMm);
    for (const z of [3, 11, 24]) {
      const wanted: [number, number, number] = [7, -(30 - z * Math.tan(5 * rad)), z];
      const hit = picker.pick(...toScreen(wanted, rig, size), rig, size)!;
      hit.at.forEach((v, i) => expect(Math.abs(v - wanted[i])).toBeLessThan(0.01));
      expect(hit.draftDeg).toBeCloseTo(5, 2);
      expect(hit.normal[1]).toBeCloseTo(-Math.cos(5 * rad), 3);
      expect(hit.undercut || hit.bed).toBe(false);
    }
  });

  it('stays within half a mm of a place on a round surface from any standard view', async () => {
    const { picker, meta } = await load(hemisphere(40, 60));
    for (const { id } of STANDARD_VIEWS.filter((v) => v.id !== 'underside')) {
      const rig = seen(id, meta.boundsMm);
      const { toEye, right, up } = rigAxes(rig);
      const away = toEye.map((c, i) => c + 0.3 * right[i] + 0.35 * up[i]);
      const length = Math.hypot(...away);
      const wanted = away.map((c) => (c / length) * 40) as [number, number, number];
      const hit = picker.pick(...toScreen(wanted, rig, size), rig, size)!;
      expect(Math.hypot(...hit.at.map((v, i) => v - wanted[i]))).toBeLessThan(0.5);
    }
  });

  it('finds nothing beside the template, and the bed from below', async () => {
    const { picker, meta } = await load(frustum(60, 30, 5));
    const rig = seen('underside', meta.boundsMm);
    expect(picker.pick(2, 2, rig, size)).toBeNull();
    const hit = picker.pick(size.width / 2, size.height / 2, rig, size)!;
    expect(hit.bed).toBe(true);
    expect(readSurface(hit, 'draft', limits, 'mm')).toMatch(/^Stands on the bed, at x/);
  });

  it('knows which places the template hides', async () => {
    const { picker, meta } = await load(tray({ segments: 48 }));
    const rig = seen('front', meta.boundsMm);
    expect(picker.isHidden([0, -61.7, 1], rig)).toBe(false);
    expect(picker.isHidden([0, 61.7, 1], rig)).toBe(true);
    expect(picker.isHidden([-60, 38, 40], seen('top', meta.boundsMm))).toBe(false);
  });
});

describe('readSurface', () => {
  const hit = {
    at: [12, -3.04, 18] as [number, number, number],
    normal: [0, 0, 1] as [number, number, number],
    wallMm: null,
    sheetMm: null,
    trapMm: null,
    unvented: false,
  };
  it.each([
    [4.21, false, 'Draft 4.2°, below the limit of 5°, at x 12.0\u00a0mm, y −3.0\u00a0mm, z 18.0\u00a0mm'],
    [7.5, false, 'Draft 7.5°, at x 12.0\u00a0mm, y −3.0\u00a0mm, z 18.0\u00a0mm'],
    [-12, true, 'Draft −12.0°, undercut, at x 12.0\u00a0mm, y −3.0\u00a0mm, z 18.0\u00a0mm'],
    [90, false, 'Draft 90.0°, flat, at x 12.0\u00a0mm, y −3.0\u00a0mm, z 18.0\u00a0mm'],
  ])('reads %d° in words', (draftDeg, undercut, words) => {
    expect(readSurface({ ...hit, draftDeg, undercut, bed: false }, 'plain', limits, 'mm')).toBe(words);
  });
});
