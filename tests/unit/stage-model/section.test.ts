import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { findSectionWalls } from '@/lib/stage-model/find-section-walls';
import { cutSection, sectionArea } from '@/lib/stage-model/section';
import { boxWithBore, frustum, hemisphere, subdivide, tray } from './shapes';

const rad = Math.PI / 180;

describe('cutSection of a square frustum', () => {
  const [side, height, draft] = [60, 30, 5];
  const positions = frustum(side, height, draft);

  it('gives the trapezium of the closed form through the middle', () => {
    const section = cutSection({ positions }, { axis: 'y', atMm: 0 });
    const top = side - 2 * height * Math.tan(draft * rad);
    expect(section.loops).toHaveLength(1);
    expect(section.loops[0].closed).toBe(true);
    expect(sectionArea(section)).toBeCloseTo(((side + top) / 2) * height, 3);
    expect(section.boundsMm).toEqual({ from: -30, to: 30, low: 0, high: 30 });
  });

  it('names both walls with their draft and the top and bed as what they are', () => {
    const walls = findSectionWalls(cutSection({ positions }, { axis: 'x', atMm: 3.5 }));
    const sides = walls.filter((w) => w.kind === 'wall');
    expect(sides).toHaveLength(2);
    for (const wall of sides) {
      expect(wall.draftDeg).toBeCloseTo(draft, 4);
      expect(wall.lengthMm).toBeCloseTo(height / Math.cos(draft * rad), 4);
    }
    expect(walls.map((w) => w.kind).sort()).toEqual(['bed', 'flat', 'wall', 'wall']);
  });

  it('reaches as high as the sloping end wall does at the cut', () => {
    // At y = -29 the front wall is met at z = (30 - 29) / tan(5°) below the top's own edge.
    const atMm = -29;
    const section = cutSection({ positions }, { axis: 'y', atMm });
    expect(section.boundsMm!.high).toBeCloseTo((side / 2 + atMm) / Math.tan(draft * rad), 3);
  });

  it('misses the mesh outside its bounds', () => {
    const section = cutSection({ positions }, { axis: 'y', atMm: 31 });
    expect(section).toEqual({ line: { axis: 'y', atMm: 31 }, loops: [], boundsMm: null });
  });

  it('stays closed when the plane runs along an edge or through vertices only', () => {
    for (const atMm of [-30, 30 - 1e-9, 0]) {
      const section = cutSection({ positions: subdivide(positions, 2) }, { axis: 'x', atMm });
      expect(section.loops.every((l) => l.closed)).toBe(true);
    }
  });

  it('reports the measured draft of the vertices where one is given', () => {
    const draftDeg = new Float32Array(positions.length / 3).fill(7.25);
    const section = cutSection({ positions, draftDeg }, { axis: 'y', atMm: 1 });
    expect(section.loops[0].segments.every((s) => s.draftDeg === 7.25)).toBe(true);
  });
});

describe('cutSection of a box with a bore', () => {
  const [w, d, h, r, n] = [40, 30, 20, 4, 64];
  const positions = boxWithBore(w, d, h, r, n);

  it('shows the bore as a gap of its chord, both parts solid', () => {
    const section = cutSection({ positions }, { axis: 'y', atMm: 0 });
    expect(section.loops).toHaveLength(2);
    expect(sectionArea(section)).toBeCloseTo((w - 2 * r) * h, 3);
    const inner = findSectionWalls(section).filter((x) => x.kind === 'wall' && Math.abs(x.from[0]) < 5);
    expect(inner.map((x) => Math.abs(x.from[0]))).toEqual([r, r]);
  });

  it('runs solid on the left: outlines counter-clockwise, a closed void clockwise', () => {
    // A second, smaller box turned inside out makes a sealed void.
    const inside = boxWithBore(10, 10, 6, 1).map((v, i) => (i % 3 === 2 ? v + 5 : i % 3 === 0 ? v + 12 : v));
    for (let t = 0; t < inside.length; t += 9) {
      for (let a = 0; a < 3; a++) [inside[t + a], inside[t + 3 + a]] = [inside[t + 3 + a], inside[t + a]];
    }
    const both = new Float32Array([...positions, ...inside]);
    const section = cutSection({ positions: both }, { axis: 'y', atMm: 3 });
    const solid = cutSection({ positions }, { axis: 'y', atMm: 3 });
    expect(sectionArea(section)).toBeCloseTo(sectionArea(solid) - 10 * 6, 3);
  });

  it('says where an open mesh does not close', () => {
    const holed = positions.slice(9);
    const sections = [-10, -5, 0.5, 5, 10].map((atMm) =>
      cutSection({ positions: holed }, { axis: 'y', atMm }),
    );
    expect(sections.some((s) => s.loops.some((l) => !l.closed))).toBe(true);
  });
});

describe('cutSection of many meshes', () => {
  it('integrates to the volume of the solid (Cavalieri), seed 41', () => {
    // Hemisphere of 50 x 200 facets: its own polyhedral volume by the divergence theorem, against slices.
    const positions = hemisphere(25, 50);
    const slices = 400;
    let sum = 0;
    for (let i = 0; i < slices; i++) {
      sum +=
        sectionArea(cutSection({ positions }, { axis: 'x', atMm: -25 + ((i + 0.5) * 50) / slices })) *
        (50 / slices);
    }
    expect(sum / volume(positions)).toBeCloseTo(1, 4);
  });

  it('is closed at every place of a tray with vented cups, seed 7', () => {
    const positions = tray({ segments: 24 });
    fc.assert(
      fc.property(
        fc.constantFrom('x' as const, 'y' as const),
        fc.double({ min: -61, max: 61, noNaN: true }),
        (axis, atMm) => {
          const section = cutSection({ positions }, { axis, atMm });
          expect(section.loops.length).toBeGreaterThan(0);
          expect(section.loops.every((l) => l.closed)).toBe(true);
          expect(sectionArea(section)).toBeGreaterThan(0);
        },
      ),
      { seed: 7, numRuns: 200 },
    );
  });
});

function volume(p: Float32Array): number {
  let six = 0;
  for (let t = 0; t < p.length; t += 9) {
    const [ax, ay, az, bx, by, bz, cx, cy, cz] = p.subarray(t, t + 9);
    six += ax * (by * cz - bz * cy) + ay * (bz * cx - bx * cz) + az * (bx * cy - by * cx);
  }
  return six / 6;
}
