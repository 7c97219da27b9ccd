import { describe, expect, it } from 'vitest';
import { formSheet } from '@/lib/formability/sheet/form-sheet';
import { ridgeThinning } from '@/lib/formability/sheet/thinning-rules';
import { block, field } from './templates';

describe('drape over a long ridge against the exact law of the no-slip strip', () => {
  // Half-width 10 mm, ends of the ridge 90 mm from the section that is measured: there the sheet is in plane strain.
  const drape = (gap: number, high: number, nodes: number) =>
    formSheet(
      {
        template: field([20, 180], block(20, 180, high, 0)),
        frameMm: [20 + 2 * gap, 180 + 2 * gap],
        gaugeMm: 1,
        minFormedMm: 0.3,
      },
      { nodes },
    );
  const differences = (gap: number, high: number, nodes: number, heights: number[]) => {
    const law = (distance: number) => ridgeThinning(gap, high, distance);
    const formed = drape(gap, high, nodes);
    return heights.flatMap((z) => {
      const wall = formed.thicknessAt(10, 0, z) / law(z) - 1;
      return z <= gap - 5 ? [wall, formed.thicknessAt(10 + z, 0) / law(z) - 1] : [wall];
    });
  };
  const rms = (values: number[]) => Math.sqrt(values.reduce((sum, v) => sum + v * v, 0) / values.length);

  it('wall and floor agree with it where g = H = 40', () => {
    const off = differences(40, 40, 128, [34, 28, 22, 16]);
    expect(rms(off)).toBeLessThan(0.015);
    expect(Math.max(...off.map(Math.abs))).toBeLessThan(0.03);
  });

  it('and where the wall is twice the gap; what is left falls with the mesh', () => {
    // Two elements below the rim and more: nodes on the rim carry the mean of top and wall.
    const heights = [65, 55, 45, 35, 25];
    const [coarse, fine] = [48, 96].map((nodes) => differences(40, 80, nodes, heights));
    expect(rms(fine)).toBeLessThan(0.015);
    expect(rms(fine)).toBeLessThan(0.6 * rms(coarse));
  });
});
