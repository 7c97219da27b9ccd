import { describe, expect, it } from 'vitest';
import {
  layoutWallLabels,
  mainWalls,
  profilePath,
  scaleBarMm,
  scaleProfile,
} from '@/app/_components/stage/layout-profile';
import { stepSection } from '@/app/_components/stage/step-section';
import { traceOfCut } from '@/app/_components/stage/trace-of-cut';
import { findSectionWalls } from '@/lib/stage-model/find-section-walls';
import { cutSection } from '@/lib/stage-model/section';
import { boxWithBore, frustum, tray } from '../../stage-model/shapes';

const frame = { from: -92, to: 92, high: 40, widthPx: 900 };

describe('the drawing of a section', () => {
  it('has one scale both ways, the bed at its foot, and all of it on the paper', () => {
    for (const widthPx of [320, 700, 1400]) {
      const scale = scaleProfile({ ...frame, widthPx });
      expect((scale.x(10) - scale.x(0)) / 10).toBeCloseTo(scale.pxPerMm, 9);
      expect((scale.y(0) - scale.y(10)) / 10).toBeCloseTo(scale.pxPerMm, 9);
      expect(scale.y(0)).toBe(scale.bedY);
      expect(scale.x(-92)).toBeGreaterThan(0);
      expect(scale.x(92)).toBeLessThan(widthPx);
      expect(scale.y(40)).toBeGreaterThan(38);
      expect(scale.heightPx).toBeGreaterThan(scale.bedY);
    }
  });

  it('writes each outline as a closed path through its corners', () => {
    const section = cutSection({ positions: frustum(60, 30, 5) }, { axis: 'y', atMm: 0 });
    const scale = scaleProfile({ from: -30, to: 30, high: 30, widthPx: 600 });
    const path = profilePath(section, scale);
    expect(path).toMatch(/^M[^M]*Z$/);
    expect(path).toContain(`${scale.x(-30).toFixed(2)} ${scale.bedY.toFixed(2)}`);
    expect(path).toContain(scale.x(30 - 30 * Math.tan((5 * Math.PI) / 180)).toFixed(2));
  });

  it.each([
    [1.2, []],
    [2.9, []],
    [6, [0, 0]],
  ])('leaves out the two sides of a vent: bore of %d mm', (bore, drafts) => {
    const positions = boxWithBore(40, 30, 20, bore / 2, 64);
    const walls = mainWalls(findSectionWalls(cutSection({ positions }, { axis: 'y', atMm: 0 })), 20);
    const inner = walls.filter((w) => Math.abs(w.from[0]) < 5);
    expect(inner.map((w) => Math.round(w.draftDeg))).toEqual(drafts);
    expect(walls.filter((w) => Math.abs(w.from[0]) > 19)).toHaveLength(2);
  });

  it('tells each draft once, every wall below the limit, and no words upon others', () => {
    const positions = tray({ segments: 96, drafts: [9, 4, 12], flute: 0 });
    const section = cutSection({ positions }, { axis: 'y', atMm: -30 });
    const walls = mainWalls(findSectionWalls(section), 40);
    const scale = scaleProfile(frame);
    const labels = layoutWallLabels(walls, 5, scale, frame.widthPx);
    const texts = labels.map((l) => l.text);
    expect(texts.filter((t) => t === 'draft 4.0°')).toHaveLength(2);
    for (const once of ['draft 9.0°', 'draft 12.0°', 'draft 7.0°'])
      expect(texts.filter((t) => t === once)).toHaveLength(1);
    expect(labels.filter((l) => l.broken)).toHaveLength(2);
    for (const [i, a] of labels.entries()) {
      expect(Math.min(a.elbow[0], a.end)).toBeGreaterThan(0);
      expect(Math.max(a.elbow[0], a.end)).toBeLessThan(frame.widthPx);
      for (const b of labels.slice(i + 1)) {
        if (a.elbow[1] !== b.elbow[1]) continue;
        const [a0, a1, b0, b1] = [a.elbow[0], a.end, b.elbow[0], b.end];
        expect(Math.max(a0, a1) < Math.min(b0, b1) || Math.max(b0, b1) < Math.min(a0, a1)).toBe(true);
      }
    }
  });

  it('measures with a round bar of 1, 2 or 5', () => {
    expect(scaleBarMm(4.5, 900)).toBe(20);
    expect(scaleBarMm(1, 320)).toBe(50);
    expect(scaleBarMm(100, 900)).toBe(1);
    expect(scaleBarMm(0.1, 900)).toBe(1000);
  });

  it('lies on the model where it was cut', () => {
    const section = cutSection({ positions: frustum(60, 30, 5) }, { axis: 'x', atMm: 4 });
    const points = traceOfCut(section);
    expect(points.length / 6).toBe(section.loops[0].segments.length);
    for (let i = 0; i < points.length; i += 3) expect(points[i]).toBe(4);
    expect(Math.max(...points)).toBeCloseTo(30, 4);
  });
});

describe('stepping the cutting line', () => {
  const line = { axis: 'y', atMm: 0 } as const;
  it.each([
    ['ArrowRight', false, 1],
    ['ArrowDown', false, -1],
    ['ArrowUp', true, 10],
    ['PageDown', false, -6],
    ['Home', false, -30],
    ['End', false, 30],
  ])('%s (Shift %s) goes to %d', (key, shiftKey, atMm) => {
    expect(stepSection(line, { key, shiftKey }, -30, 30)).toEqual({ axis: 'y', atMm });
  });
  it('stops at the ends, leaves other keys alone', () => {
    expect(stepSection({ ...line, atMm: 29.7 }, { key: 'ArrowUp', shiftKey: false }, -30, 30)!.atMm).toBe(30);
    expect(stepSection(line, { key: 'a', shiftKey: false }, -30, 30)).toBeNull();
  });
});
