import { describe, expect, it } from 'vitest';
import { box, extrude, frustum, lathe, stairs } from '../../../fixtures/meshes/solids';
import { moved, together, turned } from '../../../fixtures/meshes/triangles';
import { checkOf, reportOn } from '../run-engine';

const rad = Math.PI / 180;

describe('spacing: height of the lower neighbour over the gap at the bed', () => {
  it('a round trough begins where its sides are walls: at 45°, not at its bottom', () => {
    // Arc of radius 17 whose middle lies 5 above the top at 26: at 45° it is 24.04 wide and 18.98 high.
    const half = Math.acos(5 / 17);
    const arc = Array.from({ length: 97 }, (_, k): [number, number] => {
      const angle = half - (2 * half * k) / 96;
      return [17 * Math.sin(angle), 31 - 17 * Math.cos(angle)];
    });
    const profile: [number, number][] = [[-60, 0], [60, 0], [60, 26], ...arc, [-60, 26]]; // prettier-ignore
    const report = reportOn(extrude(profile, 80), { grid: { cellMm: 0.4 } });
    expect(report.spacing).toHaveLength(1);
    expect(report.spacing[0].gapAtBedMm).toBeCloseTo(34 * Math.SQRT1_2, 0);
    expect(report.spacing[0].heightMm).toBeCloseTo(26 - (31 - 17 * Math.SQRT1_2), 0);
    expect(report.spacing[0].gapMm).toBeCloseTo(2 * Math.sqrt(17 ** 2 - 25), 0);
    expect(checkOf(report, 'spacing').status).toBe('pass');
  });

  it('a V groove is judged by its opening: its sides meet at the bottom', () => {
    const groove = (half: number): [number, number][] => [[-60, 0], [60, 0], [60, 26], [half, 26], [0, 6], [-half, 26], [-60, 26]]; // prettier-ignore
    const at = (half: number) => reportOn(extrude(groove(half), 80), { grid: { cellMm: 0.4 } });
    expect(at(15).spacing[0].gapMm).toBeCloseTo(30, 0);
    expect(checkOf(at(15), 'spacing')).toMatchObject({ status: 'pass' });
    expect(checkOf(at(15), 'spacing').measured).toBeCloseTo(20 / 30, 1);
    expect(checkOf(at(8), 'spacing').status).toBe('caution');
  });

  it('a hollow gentler than 45° all over is no gap', () => {
    const profile: [number, number][] = [[-60, 0], [60, 0], [60, 26], [30, 26], [0, 8], [-30, 26], [-60, 26]]; // prettier-ignore
    expect(reportOn(extrude(profile, 80), { grid: { cellMm: 0.4 } }).spacing).toEqual([]);
  });

  it('two boxes, 45 and 30 high, 26 apart', () => {
    const report = reportOn(together(box(30, 40, 45), moved(box(30, 40, 30), 56, 0, 0)));
    expect(report.spacing).toHaveLength(1);
    const [pair] = report.spacing;
    expect(Math.abs(pair.gapAtBedMm - 26)).toBeLessThan(0.15);
    expect(pair.heightMm).toBeCloseTo(30, 6);
    expect(pair.heightOverGap).toBeCloseTo(30 / 26, 1);
    expect(checkOf(report, 'spacing')).toMatchObject({ status: 'caution', limit: 1 });
    expect(checkOf(report, 'spacing').remedy).toMatch(/^Widen the gap to 30 mm/);
  });

  it('passes when its remedy is followed, turned out of the grid as well', () => {
    const mesh = turned(together(box(30, 40, 45), moved(box(30, 40, 30), 60.5, 0, 0)), 30);
    expect(checkOf(reportOn(mesh), 'spacing').status).toBe('pass');
  });

  it('drafted neighbours are wider apart at the top', () => {
    const tower = frustum(30, 40, 30, 8);
    const { spacing } = reportOn(together(tower, moved(tower, 40, 0, 0)));
    expect(Math.abs(spacing[0].gapAtBedMm - 10)).toBeLessThan(0.01);
    expect(Math.abs(spacing[0].gapMm - (10 + 60 * Math.tan(8 * rad)))).toBeLessThan(0.01);
    expect(spacing[0].heightOverGap).toBeGreaterThan(2.9);
  });

  it('a tower inside a ring has the ring all round; a lone part has no neighbour', () => {
    const ringAndTower = together(
      lathe([[30, 0], [40, 0], [40, 20], [30, 20]], 96),
      lathe([[0, 0], [10, 0], [10, 25], [0, 25]], 96),
    ); // prettier-ignore
    const { spacing } = reportOn(ringAndTower);
    expect(spacing).toHaveLength(1);
    expect(Math.abs(spacing[0].gapAtBedMm - 20)).toBeLessThan(0.2);
    expect(spacing[0].heightMm).toBeCloseTo(20, 6);
    expect(reportOn(box(30, 40, 45)).spacing).toEqual([]);
  });

  it('towers on a common plate stand over the plate, not over the bed', () => {
    const plateAndTowers = together(
      box(120, 60, 10),
      moved(box(20, 20, 40), -25, 0, 0),
      moved(box(20, 20, 40), 25, 0, 0),
    );
    const { spacing } = reportOn(plateAndTowers);
    expect(Math.abs(spacing[0].heightMm - 30)).toBeLessThan(0.2);
    expect(Math.abs(spacing[0].gapAtBedMm - 30)).toBeLessThan(0.3);
  });
});

describe('gaps cut from the mesh, in a template of 300 mm', () => {
  const tower = (r: number, h: number, deg: number) =>
    lathe([[0, 0], [r, 0], [r - h * Math.tan(deg * rad), h], [0, h]], 96); // prettier-ignore
  const far = moved(box(10, 10, 5), 260, 0, 0);

  it('round towers of 30 and 20, drafted by 4°: gap at the bed and at the head of the lower', () => {
    // Corners of both polygons lie on the line between the axes, so the distances are the circles'.
    const report = reportOn(together(tower(12, 30, 4), moved(tower(9, 20, 4), 12 + 9 + 7.3, 0, 0), far));
    const [pair] = report.spacing;
    expect(pair.gapAtBedMm).toBeCloseTo(7.3, 2);
    expect(pair.gapMm).toBeCloseTo(7.3 + 2 * 20 * Math.tan(4 * rad), 2);
    expect(pair.heightMm).toBeCloseTo(20, 6);
  });

  it('a slot through a block: its two sides are neighbours over its floor', () => {
    const block: [number, number][] = [[-150, 0], [150, 0], [150, 30], [4.15, 30], [2.15, 8], [-2.15, 8], [-4.15, 30], [-150, 30]]; // prettier-ignore
    const { spacing } = reportOn(extrude(block, 80));
    expect(spacing).toHaveLength(1);
    expect(spacing[0].gapAtBedMm).toBeCloseTo(4.3, 2);
    expect(spacing[0].gapMm).toBeCloseTo(8.3, 2);
    expect(spacing[0].heightMm).toBeCloseTo(22, 2);
  });

  it('a V between two ridges has no floor: the gap is that of its foot, nearly none', () => {
    const ridges: [number, number][] = [[-60, 0], [60, 0], [60, 30], [15, 30], [0, 10], [-15, 30], [-60, 30]]; // prettier-ignore
    const { spacing } = reportOn(extrude(ridges, 80));
    expect(spacing).toHaveLength(1);
    expect(spacing[0].heightMm).toBeCloseTo(20, 0);
    expect(spacing[0].gapMm).toBeCloseTo(30, 1);
  });

  it('towers on a narrow plate beside a wide block: each pair once, over its own floor', () => {
    const mesh = together(
      box(100, 80, 40),
      moved(box(60, 20, 6), 100, 0, 0),
      moved(box(10, 20, 20), 80, 0, 6),
      moved(box(10, 20, 14), 105, 0, 6),
    );
    const { spacing } = reportOn(mesh);
    const heights = spacing.map(({ heightMm, gapAtBedMm }) =>
      [heightMm, gapAtBedMm].map((v) => Math.round(v * 100) / 100),
    );
    // The towers stand 15 mm apart over the plate at 6; the block and the plate's towers 20 (and 25) over the bed.
    expect(heights).toContainEqual([14, 15]);
    expect(heights).toContainEqual([26, 20]);
    expect(spacing).toHaveLength(2);
  });
});

describe('edges: radius against the gauge', () => {
  it('a box has four upright edges and four round its top, all sharp; the foot is on the bed', () => {
    const { edges } = reportOn(box(60, 40, 20), { grid: { cellMm: 0.5 } });
    expect(edges.sharpConvexMm).toBeCloseTo(4 * 20 + 2 * 100, 6);
    expect(edges).toMatchObject({ sharpConcaveMm: 0, minConvexRadiusMm: 0, minConcaveRadiusMm: null });
  });

  it('a rounded rim of radius 3 in twelve strips reads 3', () => {
    const rim: [number, number][] = [[0, 0], [40, 0]]; // prettier-ignore
    for (let i = 0; i <= 12; i++) rim.push([37 + 3 * Math.cos((i * 7.5 * Math.PI) / 180), 17 + 3 * Math.sin((i * 7.5 * Math.PI) / 180)]); // prettier-ignore
    rim.push([0, 20]);
    const report = reportOn(lathe(rim, 180), { grid: { cellMm: 0.5 } });
    expect(report.edges.sharpConvexMm).toBe(0);
    expect(report.edges.minConvexRadiusMm).toBeCloseTo(3, 1);
    expect(checkOf(report, 'edges')).toMatchObject({ status: 'pass', limit: 0.8 });
  });

  it.each([
    [1, 8],
    [1, 4],
    [2, 16],
    [0.5, 6],
  ])('a rounded rim of radius %s in %s strips reads it within 5 %', (radius, strips) => {
    const rim: [number, number][] = [[0, 0], [40, 0]]; // prettier-ignore
    for (let i = 0; i <= strips; i++) {
      const angle = ((i / strips) * Math.PI) / 2;
      rim.push([40 - radius + radius * Math.cos(angle), 20 - radius + radius * Math.sin(angle)]);
    }
    rim.push([0, 20]);
    const { edges } = reportOn(lathe(rim, 120), { grid: { cellMm: 0.5 }, sheet: { gaugeMm: 3 } });
    expect(edges.sharpConvexMm).toBe(0);
    expect(Math.abs((edges.minConvexRadiusMm ?? 0) / radius - 1)).toBeLessThan(0.05);
    // One ring along the middle of the rounding: between the circles of its foot and its head.
    const [line] = edges.lines;
    expect(edges.lines.length).toBeLessThanOrEqual(2);
    expect(line).toMatchObject({ kind: 'convex' });
    expect(line.lengthMm).toBeGreaterThan(2 * Math.PI * (40 - radius) * 0.99);
    expect(line.lengthMm).toBeLessThan(2 * Math.PI * 40);
    expect(line.points.length).toBeLessThanOrEqual(64);
  });

  it('layer steps and beads are no edges', () => {
    const steps = reportOn(stairs(80, 60, 60, 0.2, 0.2 * Math.tan(5 * rad)), { grid: { cellMm: 0.5 } }).edges;
    // What is left: the rim of the top, 2·(w + d), and the four upright corners, a piece of 0.2 mm a layer.
    const [w, d] = [80, 60].map((side) => side - 2 * 59 * 0.2 * Math.tan(5 * rad));
    expect(steps.lines.filter(({ points }) => points.every((point) => point[2] > 11.9))).not.toEqual([]);
    expect(steps.sharpConcaveMm).toBe(0);
    expect(steps.sharpConvexMm).toBeCloseTo(2 * (w + d) + 4 * 12, 1);
  });

  it('draws a box as its eight edges above the bed', () => {
    const { lines } = reportOn(moved(box(60, 40, 20), 5, 7, 0), { grid: { cellMm: 0.5 } }).edges;
    expect(lines.map(({ lengthMm }) => lengthMm)).toEqual([60, 60, 40, 40, 20, 20, 20, 20]);
    for (const line of lines) {
      expect(line).toMatchObject({ kind: 'convex', radiusMm: 0 });
      expect(line.points).toHaveLength(2);
      for (const [x, y] of line.points) expect([Math.abs(x - 5), Math.abs(y - 7)]).toEqual([30, 20]);
    }
  });

  it('an inside corner is concave', () => {
    const step: [number, number][] = [[0, 0], [40, 0], [40, 10], [20, 10], [20, 30], [0, 30]]; // prettier-ignore
    const { edges } = reportOn(lathe(step, 180), { grid: { cellMm: 0.5 } });
    expect(edges.sharpConcaveMm / (2 * Math.PI * 20)).toBeCloseTo(1, 2);
    expect(edges.sharpConvexMm / (2 * Math.PI * 60)).toBeCloseTo(1, 2);
  });
});
