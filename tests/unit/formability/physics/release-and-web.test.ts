import { describe, expect, it } from 'vitest';
import { drapedShare, skirtShare } from '@/lib/formability/physics/drape-rules';
import { gripMPa, releaseForceN, selfReleaseDeg } from '@/lib/formability/physics/shrink-grip';
import { ringToFoot, webCriterion } from '@/lib/formability/physics/web-criterion';

describe('a part shrunk onto its template: thin ring and friction, derived', () => {
  const part = { modulusMPa: 2000, shrinkage: 0.005, wallMm: 1 };

  it('pressure (D6), force at no and at 3° of draft (D7), draft that releases by itself', () => {
    expect(gripMPa(part, 30)).toBeCloseTo(1 / 3, 9);
    expect(releaseForceN(part, 40, 0, 0.3)).toBeCloseTo(753.98, 1);
    expect(releaseForceN(part, 40, 3, 0.3)).toBeCloseTo(621.414, 2);
    expect(selfReleaseDeg(0.3)).toBeCloseTo(16.7, 2);
  });

  it('nothing holds from that draft on; a wall that leans out holds more', () => {
    expect(releaseForceN(part, 40, selfReleaseDeg(0.3) + 0.01, 0.3)).toBe(0);
    expect(releaseForceN(part, 40, -2, 0.3)).toBeGreaterThan(releaseForceN(part, 40, 0, 0.3));
    expect(releaseForceN({ ...part, wallMm: 2 }, 40, 3, 0.3)).toBeCloseTo(2 * 621.414, 1);
  });
});

describe('hoop against meridian stretch: A. C. Pipkin 1986, from memory', () => {
  it('a ring 20 mm outside a 60 mm square at twice the length: 0.6563 against 0.7071 (W1, W2)', () => {
    const found = webCriterion(240, 20, 2);
    expect(found.hoopStretch).toBeCloseTo(0.656341, 6);
    expect(found.limit).toBeCloseTo(0.707107, 6);
    expect(found.webs).toBe(true);
    expect(webCriterion(240, 20, 2.4).webs).toBe(false);
    expect(webCriterion(400, 20, 2).webs).toBe(false);
    expect(webCriterion(240, 0, 1)).toMatchObject({ hoopStretch: 1, limit: 1, webs: false });
  });

  it('the ring that ends at the foot, drawn evenly', () => {
    expect(ringToFoot(30, 40)).toEqual({
      ringMm: expect.closeTo(17.142857, 6),
      meridian: expect.closeTo(7 / 3, 9),
    });
    // What lies inside the ring lines the wall: ring × stretch = height.
    for (const [gap, height] of [
      [12, 50],
      [80, 9],
    ]) {
      // prettier-ignore
      const { ringMm, meridian } = ringToFoot(gap, height);
      expect(ringMm * meridian).toBeCloseTo(height, 9);
    }
  });

  it('refuses what is no ring', () => {
    expect(() => webCriterion(0, 20, 2)).toThrow(/perimeter above 0/);
    expect(() => webCriterion(10, 20, 0.9)).toThrow(RangeError);
    expect(() => ringToFoot(0, 10)).toThrow(/gap above 0/);
  });
});

describe('draped over a male template: derived', () => {
  it('straight skirt before suction; walls and bed share what a frozen top leaves (R7, R8)', () => {
    expect(drapedShare(40, 40)).toBeCloseTo(0.70711, 5);
    const clamp = Math.PI * 70 ** 2;
    const formed = clamp + Math.PI * 60 * 40;
    expect(formed / clamp).toBeCloseTo(1.489796, 6);
    expect(2 * skirtShare(clamp, Math.PI * 30 ** 2, formed)).toBeCloseTo(1.25, 9);
    expect(2 / (formed / clamp)).toBeCloseTo(1.34247, 5);
  });

  it('refuses a top larger than the clamp and a gap that is none', () => {
    expect(() => skirtShare(100, 120, 200)).toThrow(/top must be smaller/);
    expect(() => skirtShare(100, 20, 90)).toThrow(RangeError);
    expect(() => drapedShare(0, 10)).toThrow(/gap above 0/);
  });
});
