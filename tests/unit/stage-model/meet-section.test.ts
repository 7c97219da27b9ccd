import { describe, expect, it } from 'vitest';
import { meetSection } from '@/lib/stage-model/meet-section';
import { cutSection } from '@/lib/stage-model/section';
import { frustum } from './shapes';

/** Two frusta 30 mm high, 20 mm wide, 60 mm apart in y, and a plate of 4 mm under both when wanted. */
function pair(withPlate: boolean): { positions: Float32Array } {
  const shift = (soup: Float32Array, dy: number) => soup.map((v, i) => (i % 3 === 1 ? v + dy : v));
  const parts: Float32Array[] = [shift(frustum(20, 30, 5), -30), shift(frustum(20, 30, 5), 30)];
  if (withPlate) parts.push(frustum(100, 4, 5));
  const positions = new Float32Array(parts.reduce((sum, part) => sum + part.length, 0));
  let at = 0;
  for (const part of parts) {
    positions.set(part, at);
    at += part.length;
  }
  return { positions };
}

describe('a cut that nobody placed by hand', () => {
  it('stays where it meets the template', () => {
    const line = { axis: 'y', atMm: 31 } as const;
    expect(meetSection(pair(false), line, [-40, 40])).toBe(line);
  });

  it('moves out of the gap between two parts to the nearest of them', () => {
    const met = meetSection(pair(false), { axis: 'y', atMm: 2 }, [-40, 40]);
    expect(met!.atMm).toBeGreaterThan(20);
    expect(met!.atMm).toBeLessThan(24);
    expect(cutSection(pair(false), met!).boundsMm).not.toBeNull();
  });

  it('goes on to where the part is as high as is asked', () => {
    const low = meetSection(pair(true), { axis: 'y', atMm: 0 }, [-50, 50]);
    expect(low!.atMm).toBe(0);
    const high = meetSection(pair(true), { axis: 'y', atMm: 0 }, [-50, 50], 15);
    expect(cutSection(pair(true), high!).boundsMm!.high).toBeGreaterThanOrEqual(15);
    expect(Math.abs(high!.atMm)).toBeLessThan(28);
  });

  it('says so where no line meets', () => {
    expect(meetSection(pair(false), { axis: 'y', atMm: 0 }, [-15, 15])).toBeNull();
  });
});
