import { describe, expect, it } from 'vitest';
import { affordWindow } from '@/lib/formability/dexel/afford-window';
import type { Mesh } from '@/lib/formability/mesh/mesh';

/** So many sheets of 100 × 100 (as two facets each) over one another. */
function sheets(count: number): { mesh: Mesh; facets: Uint32Array } {
  const position = new Float64Array(12 * count);
  const index = new Uint32Array(6 * count);
  for (let k = 0; k < count; k++) {
    position.set([0, 0, k, 100, 0, k, 100, 100, k, 0, 100, k], 12 * k);
    index.set(
      [0, 1, 2, 0, 2, 3].map((v) => 4 * k + v),
      6 * k,
    );
  }
  const mesh = {
    triangles: 2 * count,
    vertices: 4 * count,
    index,
    position,
    centre: [0, 0],
  } as unknown as Mesh;
  return { mesh, facets: Uint32Array.from({ length: 2 * count }, (_, t) => t) };
}

describe('cells of a fine window', () => {
  const window = { cell: 0.1, nx: 100, ny: 100, x0: 20, y0: 30 };

  it('stay as wished over few facets: ten sheets over 10 000 cells are at most 200 000 crossings', () => {
    const { mesh, facets } = sheets(10);
    expect(affordWindow(mesh, facets, window)).toEqual(window);
  });

  it('grow over a heap: a thousand sheets, counted by their boxes, 2e7 to 5e5 crossings: √40 times as wide', () => {
    const { mesh, facets } = sheets(1000);
    const coarse = affordWindow(mesh, facets, window);
    expect(coarse.cell).toBeCloseTo(0.1 * Math.sqrt(40), 9);
    expect([coarse.nx, coarse.ny, coarse.x0, coarse.y0]).toEqual([16, 16, 20, 30]);
  });

  it('facets beside the window do not count', () => {
    const { mesh, facets } = sheets(1000);
    expect(affordWindow(mesh, facets, { ...window, x0: 200 }).cell).toBe(0.1);
  });
});
