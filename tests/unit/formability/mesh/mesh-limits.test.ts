import { describe, expect, it } from 'vitest';
import { prepareMesh } from '@/lib/formability/mesh/prepare-mesh';
import { suggestScale } from '@/lib/formability/mesh/suggest-scale';
import { box } from '../../../fixtures/meshes/solids';
import { mapPoints, moved, scaled, type Triangles } from '../../../fixtures/meshes/triangles';

const prepare = (mesh: Triangles, mmPerUnit = 1) =>
  prepareMesh(
    { format: 'stl-binary', triangles: mesh.length / 9, coords: Float32Array.from(mesh), warnings: [] },
    { mmPerUnit, up: [0, 0, 1], dropToBed: true },
  );

/** A box with a corner at the origin, where float32 tells hundredths of a nanometre apart; one use of it moved. */
const apart = (far: number, unit = 1) => {
  let uses = 0;
  return mapPoints(scaled(moved(box(60, 40, 20), 30, 20, 0), 1 / unit), (x, y, z) =>
    x === 0 && y === 0 && z === 0 && ++uses === 2 ? [far / unit, 0, 0] : [x, y, z],
  );
};

describe('limits of the mesh stage, each held from both sides', () => {
  it('welds at 0.0001 mm, in whatever unit', () => {
    for (const unit of [1, 25.4]) {
      expect(prepare(apart(0.995e-4, unit), unit).repairs).toContain('tolerant_weld');
      expect(prepare(apart(1.005e-4, unit), unit).repairs).not.toContain('tolerant_weld');
    }
  });

  it('takes a facet to lie on the bed up to 0.0001 mm', () => {
    const tilted = (rise: number) =>
      mapPoints(box(60, 40, 20), (x, y, z) => [x, y, z === 0 && x > 0 ? rise : z]);
    expect(prepare(tilted(0.995e-4)).facets.bedArea).toBeCloseTo(2400, 3);
    expect(prepare(tilted(1.005e-4)).facets.bedArea).toBe(0);
  });

  it('calls a facet without area below a ten-millionth of its length', () => {
    const needle = (height: number) => [...box(60, 40, 20), 0, 0, 20, 10, 0, 20, 5, height, 20];
    expect(prepare(needle(0.995e-6)).facts.degenerate).toBe(1);
    expect(prepare(needle(1.005e-6)).facts.degenerate).toBe(0);
  });

  it('warns of precision where half a float32 step is 0.002 mm: 33.55 m from the origin', () => {
    const at = (reach: number) => prepare(moved(box(60, 40, 20), reach - 30, 0, 0)).warnings.has('precision');
    expect([at(33_400), at(33_700), at(-33_700)]).toEqual([false, true, true]);
  });

  it('asks for another scale below 20 mm and above 2 m', () => {
    expect(suggestScale([19.9, 10, 5])).not.toBeNull();
    expect(suggestScale([20.1, 10, 5])).toBeNull();
    expect(suggestScale([1990, 10, 5])).toBeNull();
    expect(suggestScale([2010, 1000, 500])).not.toBeNull();
  });

  it.each([
    ['inches', 120 / 25.4, 25.4],
    ['centimetres', 12, 10],
    ['metres', 0.12, 1000],
    ['millimetres read as inches', 120 * 25.4, 1 / 25.4],
    ['millimetres read as metres', 120_000, 0.001],
    ['microns', 120_000, 0.001],
  ])('a template of 120 × 90 × 45 mm in %s', (_, size, factor) => {
    expect(suggestScale([size, size * 0.75, size * 0.375])).toBeCloseTo(factor, 9);
  });

  it('offers nothing where no unit makes a template of it', () => {
    expect(suggestScale([1e-5, 1e-5, 1e-5])).toBeNull();
    expect(suggestScale([9e6, 9e6, 9e6])).toBeNull();
  });
});
