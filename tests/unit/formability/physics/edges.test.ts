import { describe, expect, it } from 'vitest';
import { FILAMENTS } from '@/lib/formability/materials/filaments';
import { cuspMm, treadMm } from '@/lib/formability/physics/layer-surface';
import { modulusAt } from '@/lib/formability/physics/modulus-at';
import { clampedStrip, rigidity, supportedStrip } from '@/lib/formability/physics/plates';

describe('where formulas end', () => {
  const plate = { thicknessMm: 1, pressureMPa: 0.4, modulusMPa: 2300, poisson: 0.35 };

  it('a plate has a Poisson’s ratio of 0.5 at most', () => {
    expect(() => rigidity({ ...plate, poisson: 0.5 })).not.toThrow();
    expect(() => rigidity({ ...plate, poisson: 0.502 })).toThrow(RangeError);
  });

  it('a strip simply supported sags five times as far as a clamped one: 5 q s⁴ / 384 D', () => {
    expect(supportedStrip(plate, 8).sagMm / clampedStrip(plate, 8).sagMm).toBeCloseTo(5, 12);
    expect(supportedStrip(plate, 8).stressMPa).toBeCloseTo((6 * 0.4 * 64) / 8, 12);
  });

  it('steps have no tread on a flat top, and draft ends at 90°', () => {
    expect(treadMm(0.2, 89.5)).toBeCloseTo(0.2 * Math.tan((89.5 * Math.PI) / 180), 9);
    expect(treadMm(0.2, 90)).toBe(Infinity);
    expect(cuspMm(0.2, 90)).toBeCloseTo(0.2, 12);
    expect(() => cuspMm(0.2, 90.5)).toThrow(RangeError);
    expect(() => cuspMm(0.2, -90.5)).toThrow(RangeError);
  });

  it('nothing is colder than −273.15 °C', () => {
    expect(modulusAt(FILAMENTS.pla, -273)).toBeGreaterThan(2700);
    expect(() => modulusAt(FILAMENTS.pla, -274)).toThrow(RangeError);
  });
});
