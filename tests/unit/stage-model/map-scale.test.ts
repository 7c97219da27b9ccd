import { describe, expect, it } from 'vitest';
import { areaAbove, areaBelow, binOf, totalArea } from '@/lib/stage-model/map-histogram';
import {
  colourAt,
  draftMapScale,
  layerMapScale,
  placeOnScale,
  roundUp,
  sheetMapScale,
  trapMapScale,
  wallMapScale,
  type StageLimits,
} from '@/lib/stage-model/map-scale';
import type { StageMaps } from '@/lib/stage-model/stage-model-meta';

const limits: StageLimits = { draftDeg: 5, layerMm: 0.15, stepMm: 0.1, wallMm: 3, sheetMm: 0.35 };
const pockets = (deepest: number | null) =>
  trapMapScale({ trap: { range: deepest === null ? null : [0, deepest] } } as unknown as StageMaps);

describe('scales of the maps', () => {
  it('stand with their limit on them and the broken side dark', () => {
    const scales = [draftMapScale(limits), layerMapScale(0.15, limits), wallMapScale(limits)];
    for (const scale of scales) {
      const limit = scale.limit!;
      const step = scale.max / 20;
      expect(limit).toBeGreaterThan(0);
      expect(limit).toBeLessThan(scale.max);
      const broken = scale.dark === 'low' ? limit - step : limit + step;
      const kept = scale.dark === 'low' ? limit + step : limit - step;
      expect(colourAt(broken, scale)).toBeLessThan(colourAt(kept, scale));
    }
    expect(scales.map(({ limit, dark }) => [limit, dark])).toEqual([
      [5, 'low'],
      [0.1, 'high'],
      [3, 'low'],
    ]);
  });

  it('end at the layer, which no step exceeds, or beyond a limit that no step reaches', () => {
    expect(layerMapScale(0.3, limits).max).toBe(0.3);
    expect(layerMapScale(0.08, limits).max).toBeCloseTo(0.125, 9);
    expect(layerMapScale(0.2, { ...limits, stepMm: null })).toMatchObject({ max: 0.2, limit: null });
  });

  it('are three limits long for walls, and 6 mm where the limit is small or missing', () => {
    expect(wallMapScale(limits).max).toBe(9);
    expect(wallMapScale({ ...limits, wallMm: 0.9 }).max).toBe(6);
    expect(sheetMapScale(1.2, limits)).toEqual({
      max: 1.2,
      limit: 0.35,
      dark: 'low',
      isoStep: 0.24,
      closed: true,
    });
    expect(sheetMapScale(0.4, { sheetMm: 0.4 }).max).toBe(0.5);
    expect(sheetMapScale(1, { sheetMm: 0 }).limit).toBeNull();
    expect(wallMapScale({ ...limits, wallMm: null })).toMatchObject({ max: 6, limit: null });
  });

  it.each([
    [null, 1],
    [0.06, 0.1],
    [7, 8],
    [20, 20],
    [20.01, 25],
    [36, 40],
    [81, 100],
  ])('pockets %s mm deep: a scale to %d mm', (deepest, max) => expect(pockets(deepest).max).toBe(max));

  it('never round down, whatever the figure', () => {
    for (let figure = 0.1; figure < 500; figure *= 1.013) {
      expect(roundUp(figure)).toBeGreaterThanOrEqual(figure - 1e-3);
      expect(roundUp(figure)).toBeLessThanOrEqual(figure * 1.51);
    }
  });

  it('hold what lies beyond their ends at the ends', () => {
    const scale = wallMapScale(limits);
    expect([-1, 0, 4.5, 9, 80].map((mm) => placeOnScale(mm, scale))).toEqual([0, 0, 0.5, 1, 1]);
  });
});

describe('area by figure', () => {
  const histogram = { edges: [0, 1, 2, 4], areaMm2: [10, 20, 40] };
  it('is cut in proportion where the limit falls into a bin', () => {
    expect([-1, 0, 0.5, 1, 3, 4, 9].map((limit) => areaBelow(histogram, limit))).toEqual([
      0, 0, 5, 10, 50, 70, 70,
    ]);
    expect(areaAbove(histogram, 3)).toBe(20);
    expect(totalArea(histogram)).toBe(70);
  });
  it('has each figure in the bin that begins at or below it, those beyond in the last', () => {
    expect([-5, 0, 0.99, 1, 3.9, 4, 60].map((figure) => binOf(histogram.edges, figure))).toEqual([
      0, 0, 0, 1, 2, 2, 2,
    ]);
  });
});
