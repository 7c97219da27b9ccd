import { describe, expect, it } from 'vitest';
import * as rules from '@/lib/formability/sheet/thinning-rules';

const close = (found: number, wanted: number, relative: number) =>
  expect(Math.abs(found / wanted - 1)).toBeLessThan(relative);

describe('thinning of a free sheet of even thickness that freezes on contact', () => {
  // T1 to T5: R. J. Crawford, Plastics Engineering, 3rd ed. 1998 (cone formula, evaluated).
  it.each([
    ['T1', 30, 0.5, 0.838143],
    ['T2', 45, 0.5, 0.640531],
    ['T3', 45, 0.1, 0.328865],
    ['T4', 60, 0.5, 0.375],
    ['T5', 60, 0.1, 0.075],
    ['a cone at its mouth', 45, 1, 0.853553],
  ])('%s: cone of %d° at x = %d', (_, wall, share, wanted) =>
    close(rules.coneThinning(wall, share), wanted, 1e-5),
  );

  it('a shallow cone at its mouth is hardly thinned, and the volume laid down is the sheet’s', () => {
    expect(rules.coneThinning(1, 1)).toBeGreaterThan(0.9999);
    // ∫ t dA over the wall of a 50° cone of mouth radius 1 gives π back: dA = 2π x dx / cos β.
    const n = 20_000;
    let volume = 0;
    for (let k = 0; k < n; k++) {
      const x = (k + 0.5) / n;
      volume += (rules.coneThinning(50, x) * 2 * Math.PI * x) / Math.cos((50 * Math.PI) / 180) / n;
    }
    close(volume, Math.PI, 1e-5);
  });

  // T6, T7: derived from the length of an arc tangent to both walls.
  it.each([
    ['T6', 45, 0.5, 0.744975],
    ['T7', 60, 0.25, 0.334013],
    ['mouth of a 60° trough', 60, 1, 0.826993],
  ])('%s: wedge of %d° at x = %d', (_, wall, share, wanted) =>
    close(rules.wedgeThinning(wall, share), wanted, 1e-5),
  );

  // T8: derived from the balance of the torus arc at the foot.
  it.each([
    ['T8', 5, 0.33923],
    ['sharper', 2, 0.30639],
  ])('%s: truncated cone 50 / 20 at 60°, corner radius %d', (_, corner, wanted) =>
    close(rules.truncatedConeThinning(50, 20, 60, corner), wanted, 1e-4),
  );

  it('a truncated cone whose corner is as round as the first torus is still the cone', () => {
    const first = 20 / Math.tan((30 * Math.PI) / 180);
    close(rules.truncatedConeThinning(50, 20, 60, first), rules.coneThinning(60, 0.6), 1e-12);
  });

  // T9 to T11: derived from a hemisphere that slides down, then the quarter torus at the foot.
  it('T9 to T11: cylinder wall and foot', () => {
    close(rules.cylinderWallThinning(25, 25), 0.18394, 1e-5);
    close(rules.cylinderWallThinning(40, 0), 0.5, 1e-12);
    close(rules.cylinderCornerThinning(1, 2, 0.2), 0.097394, 1e-5);
    close(rules.cylinderCornerThinning(1, 2, 0.1), 0.078991, 1e-5);
    close(rules.cylinderCornerThinning(30, 30, 6), 0.26475, 2e-5);
  });

  // T12: area of a cap. T13: R. Hill (1950), from memory.
  it.each([
    [0.25, 0.941176, 0.885813],
    [0.5, 0.8, 0.64],
    [1, 0.5, 0.25],
    [1.5, 0.307692, 0.094675],
  ])('T12, T13: free dome, h/a = %d', (height, mean, pole) => {
    close(rules.domeMean(height), mean, 2e-6);
    close(rules.domePole(height), pole, 1e-5);
  });

  // T14, T15: derived from one tension in the free strip; exact in plane strain.
  it.each([
    ['T14', 40, 40, 4, 0.339344, 1e-5],
    ['quarter arc', 40, 40, 40, 0.63662, 1e-5],
    ['T15', 40, 80, 5, 0.212921, 1e-4],
    ['top of the wall', 40, 80, 80, 0.43136, 2e-5],
    ['quarter arc below a taller wall', 40, 80, 40, 0.37582, 2e-5],
    ['near the foot', 40, 80, 2, 0.16576, 2e-5],
  ])('%s: ridge of gap %d, height %d, %d from the foot', (_, gap, height, distance, wanted, relative) =>
    close(rules.ridgeThinning(gap, height, distance), wanted, relative),
  );

  it('without a wall nothing thins', () => {
    for (const share of [0.1, 0.5, 1]) {
      expect(rules.wedgeThinning(0, share)).toBe(1);
      expect(rules.coneThinning(0, share)).toBe(1);
      close(rules.wedgeThinning(0.01, share), 1, 1e-5);
    }
  });

  it('refuses what the rules do not cover', () => {
    expect(() => rules.coneThinning(95, 0.5)).toThrow(/wall angle is 95: give 0 to 90/);
    expect(() => rules.wedgeThinning(45, 1.2)).toThrow(/share of the half width/);
    expect(() => rules.ridgeThinning(40, 30, 5)).toThrow(/no lower than the gap/);
    expect(() => rules.ridgeThinning(40, 60, 70)).toThrow(/distance from the foot is 70/);
    expect(() => rules.cylinderCornerThinning(10, 20, 11)).toThrow(/corner radius/);
    expect(() => rules.truncatedConeThinning(50, 40, 60, 2)).toThrow(/floor against mouth/);
  });
});
