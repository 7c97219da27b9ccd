import { describe, expect, it } from 'vitest';
import { meetSection } from '@/lib/stage-model/meet-section';
import { openSection } from '@/lib/stage-model/open-section';
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

  it('says so where no line meets', () => {
    expect(meetSection(pair(false), { axis: 'y', atMm: 0 }, [-15, 15])).toBeNull();
  });
});

describe('the cut that a page opens with', () => {
  it('stays in the middle where that tells as much as any other', () => {
    const line = { axis: 'y', atMm: 0 } as const;
    expect(openSection({ positions: frustum(100, 40, 5) }, line, [-50, 50])).toEqual(line);
  });

  it('goes through the parts where the middle runs between them', () => {
    for (const withPlate of [true, false]) {
      const opened = openSection(pair(withPlate), { axis: 'y', atMm: 0 }, [-50, 50]);
      expect(cutSection(pair(withPlate), opened!).boundsMm!.high).toBeGreaterThan(15);
      expect(Math.abs(opened!.atMm)).toBeLessThan(28);
    }
  });

  it('says so where nothing near the middle is met', () => {
    expect(openSection(pair(false), { axis: 'y', atMm: 0 }, [-15, 15])).toBeNull();
  });
});
