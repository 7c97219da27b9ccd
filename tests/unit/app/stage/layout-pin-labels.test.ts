import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { layoutPinLabels, type PinMark } from '@/app/_components/stage/layout-pin-labels';

const mark = (id: string, x: number, y: number, first = false): PinMark => ({
  id,
  x,
  y,
  labelWidth: 120,
  first,
});

describe('layoutPinLabels', () => {
  it('stands right and below, and turns away from the edges', () => {
    const [a] = layoutPinLabels([mark('a', 100, 100)], 800, 500);
    expect(a).toEqual({ id: 'a', x: 126, y: 128, elbowX: 126 });
    const [b] = layoutPinLabels([mark('b', 780, 480)], 800, 500);
    expect(b.elbowX).toBeLessThan(780);
    expect(b.x + 120).toBe(b.elbowX);
    expect(b.y).toBeLessThan(480);
  });

  it('keeps clear of the legend', () => {
    const [a] = layoutPinLabels([mark('a', 500, 380)], 800, 500, { left: 480, top: 390 });
    expect(a.y <= 390 || a.x + 120 <= 480).toBe(true);
  });

  it('always shows the active one, and drops what is off the stage', () => {
    const crowd = Array.from({ length: 12 }, (_, i) => mark(`m${i}`, 300 + i * 3, 200 + i * 2, i === 7));
    const labels = layoutPinLabels(crowd, 800, 500);
    expect(labels.map((l) => l.id)).toContain('m7');
    expect(labels.length).toBeLessThan(12);
    expect(layoutPinLabels([mark('out', -4, 20)], 800, 500)).toEqual([]);
  });

  it('never lays words on words, seed 23', () => {
    const place = fc.record({ x: fc.integer({ min: 0, max: 800 }), y: fc.integer({ min: 0, max: 500 }) });
    fc.assert(
      fc.property(fc.array(place, { maxLength: 30 }), (places) => {
        const labels = layoutPinLabels(
          places.map((p, i) => mark(String(i), p.x, p.y)),
          800,
          500,
        );
        for (const [i, a] of labels.entries()) {
          for (const b of labels.slice(i + 1)) {
            expect(Math.abs(a.y - b.y) >= 20 || a.x + 120 <= b.x || b.x + 120 <= a.x).toBe(true);
          }
        }
      }),
      { seed: 23, numRuns: 200 },
    );
  });
});
