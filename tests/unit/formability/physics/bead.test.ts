import { describe, expect, it } from 'vitest';
import { beadAreaMm2, roundedBeadAreaMm2 } from '@/lib/formability/physics/bead';

describe('bead flow: line × layer × speed', () => {
  it('0.45 × 0.2 at 60 mm/s: 5.4 mm³/s (Q1), 4.884956 mm³/s with round ends (Q2)', () => {
    expect(60 * beadAreaMm2(0.45, 0.2)).toBeCloseTo(5.4, 9);
    expect(60 * roundedBeadAreaMm2(0.45, 0.2)).toBeCloseTo(4.884956, 6);
  });

  it('a bead as wide as high is a circle; narrower than high there is none', () => {
    expect(roundedBeadAreaMm2(0.3, 0.3)).toBeCloseTo((Math.PI / 4) * 0.09, 12);
    expect(() => roundedBeadAreaMm2(0.2, 0.3)).toThrow(/layer \(mm\) is 0.3: give a figure above 0 to 0.2/);
    expect(() => beadAreaMm2(0, 0.2)).toThrow(RangeError);
  });
});
