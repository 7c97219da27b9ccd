import { describe, expect, it } from 'vitest';
import { carved, rectangle, turnedRing } from '../../../fixtures/meshes/carved';
import { openFrustum } from '../../../fixtures/meshes/hollow';
import {
  ballOnStem,
  box,
  dome,
  extrude,
  frustum,
  lathe,
  plate,
  stairs,
} from '../../../fixtures/meshes/solids';
import { moved, together, turned, type Triangles } from '../../../fixtures/meshes/triangles';
import { analysed, hold } from '../acceptance/claims';

const rad = Math.PI / 180;
const detailOf = (mesh: Triangles, cellMm = 1) => analysed(mesh, { grid: { cellMm } }).detail;
const base = box(300, 200, 10);
const pin = (r: number, h: number, sides = 24) => lathe([[0, 0], [r, 0], [r, h], [0, h]], sides); // prettier-ignore

describe('the smallest feature: solid between two walls, measured level', () => {
  it.each([0.3, 0.7, 1.2])('a rib of %s mm on a template of 300 mm, turned out of the grid', (wide) => {
    const mesh = turned(together(base, moved(box(wide, 20, 3), 40, 30, 10)), 17);
    const { smallestFeatureMm, smallestFeatureAt } = detailOf(mesh);
    expect(smallestFeatureMm).toBeCloseTo(wide, 4);
    const [x, y, z] = smallestFeatureAt ?? [0, 0, 0];
    const [u, v] = [x * Math.cos(17 * rad) + y * Math.sin(17 * rad), y * Math.cos(17 * rad) - x * Math.sin(17 * rad)]; // prettier-ignore
    expect(Math.abs(u - 40)).toBeLessThan(0.01);
    expect(Math.abs(v - 30)).toBeLessThan(10);
    expect(z).toBeGreaterThan(10);
  });

  it('a pin of 0.6 mm across: the flats of its 24 sides are 0.6 · cos(π/24) apart', () => {
    const mesh = together(base, moved(pin(0.3, 2), -60, 40, 10));
    expect(detailOf(mesh).smallestFeatureMm).toBeCloseTo(0.6 * Math.cos(Math.PI / 24), 4);
  });

  it('a rib whose sides lean by 5° is narrowest at its top', () => {
    const mesh = together(base, moved(frustum(2, 30, 6, 5), 20, 0, 10));
    const { smallestFeatureMm, smallestFeatureAt } = detailOf(mesh);
    expect(smallestFeatureMm).toBeCloseTo(2 - 12 * Math.tan(5 * rad), 2);
    expect(smallestFeatureAt?.[2]).toBeCloseTo(16, 1);
  });

  it('the wall of a hollow template, 2 mm along its normal at 8°, is 2 / cos 8° level', () => {
    expect(detailOf(openFrustum(120, 90, 40, 8, 2, 3)).smallestFeatureMm).toBeCloseTo(
      2 / Math.cos(8 * rad),
      3,
    );
  });

  it('a letter with a stroke of 0.8 mm raised by 0.4 mm', () => {
    const strokes: [number, number][] = [[0, 0], [0.8, 0], [0.8, 5], [4, 5], [4, 6.5], [0, 6.5]]; // prettier-ignore
    const { smallestFeatureMm } = detailOf(together(base, moved(plate(strokes, [], 0, 0.4), 70, 20, 10)));
    expect(smallestFeatureMm).toBeCloseTo(0.8, 4);
  });

  it('plain bodies are as wide as they are, and edges, tips, layers and balls are no details', () => {
    expect(detailOf(box(60, 40, 20))).toMatchObject({ smallestFeatureMm: 40, smallestGapMm: null });
    expect(
      detailOf(
        lathe(
          [
            [0, 0],
            [40, 0],
            [0, 240],
          ],
          64,
        ),
      ).smallestFeatureMm,
    ).toBeNull();
    expect(detailOf(extrude([[-2, 0], [2, 0], [0, 20]], 40)).smallestFeatureMm).toBeCloseTo(40, 2); // prettier-ignore
    expect(detailOf(stairs(80, 60, 60, 0.2, 0.2 * Math.tan(5 * rad))).smallestGapMm).toBeNull();
    expect(detailOf(dome(30, 48, 24)).smallestGapMm).toBeNull();
    expect(detailOf(ballOnStem(20, 6, 26, 60, 40)).smallestFeatureMm).toBeCloseTo(
      12 * Math.cos(Math.PI / 60),
      1,
    );
  });

  it('what lies inside another body is no detail', () => {
    const mesh = together(box(60, 40, 20), moved(box(1, 10, 10), 5, 5, 5));
    expect(detailOf(mesh)).toMatchObject({ smallestFeatureMm: 40, smallestGapMm: null });
  });
});

describe('the smallest gap: air between two walls', () => {
  it.each([0.25, 0.9])('a slot of %s mm in a template of 300 mm, narrower than a cell or not', (wide) => {
    const mesh = carved(rectangle(300, 200), 20, [{ ring: rectangle(wide, 30, 50, 20), z: 17 }]);
    const { smallestGapMm, smallestGapAt } = detailOf(mesh, 0.8);
    expect(smallestGapMm).toBeCloseTo(wide, 4);
    expect(smallestGapAt?.[0]).toBeCloseTo(50, 2);
  });

  it('a groove whose sides lean by 10° is narrowest at its floor', () => {
    const half = 1 + 4 * Math.tan(10 * rad);
    const profile: [number, number][] = [[-60, 0], [60, 0], [60, 20], [half, 20], [1, 16], [-1, 16], [-half, 20], [-60, 20]]; // prettier-ignore
    expect(detailOf(extrude(profile, 50)).smallestGapMm).toBeCloseTo(2, 2);
  });

  it('a groove without a floor has none; towers have theirs', () => {
    const v: [number, number][] = [[-60, 0], [60, 0], [60, 20], [2, 20], [0, 10], [-2, 20], [-60, 20]]; // prettier-ignore
    expect(detailOf(extrude(v, 50)).smallestGapMm).toBeNull();
    const towers = together(box(30, 40, 45), moved(box(30, 40, 30), 48, 0, 0));
    expect(detailOf(towers).smallestGapMm).toBeCloseTo(18, 4);
  });

  it('vents are no gaps', () => {
    const bores = [-10, 0, 10].map((x) => ({ ring: turnedRing(0.3, 16, x, 0), z: 0 }));
    const pit = carved(rectangle(80, 60), 30, [{ ring: rectangle(40, 30), z: 10, pockets: bores }]);
    expect(detailOf(pit).smallestGapMm).toBeCloseTo(30, 3);
  });

  it('places lie in the file’s own frame', () => {
    const mesh = moved(together(box(30, 40, 45), moved(box(30, 40, 30), 48, 0, 0)), 500, -200, 0);
    hold(mesh, {
      'detail.smallestGapAt.0': (x: unknown) => (Math.abs((x as number) - 524) < 0.01 ? null : '524'),
    });
  });
});
