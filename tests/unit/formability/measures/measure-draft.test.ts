import { describe, expect, it } from 'vitest';
import { box, dome, frustum, lathe, stairs } from '../../../fixtures/meshes/solids';
import { addQuad, mapPoints, turned, type Triangles } from '../../../fixtures/meshes/triangles';
import { reportOn } from '../run-engine';

const rad = Math.PI / 180;
const coarse = { grid: { cellMm: 0.5 } };
const draftOf = (mesh: Triangles) => reportOn(mesh, coarse).draft;

describe('draft of facets: asin(n_z), geometry', () => {
  it('rows D1 and D2: the wall (50,0,0), (50,50,0), (45,0,40) leans by 7.125016° and has 1007.7822 mm²', () => {
    // The wall of a frustum 100 × 100 × 40 with 5 mm of inset; half of it is the facet of the row, times 2 × 50/50.
    const mesh = frustum(100, 100, 40, Math.atan(5 / 40) / rad);
    expect(draftOf(mesh).minUpFacingDeg).toBeCloseTo(7.125016, 4);
    const [a, b, c] = [[50, 0, 0], [50, 50, 0], [45, 0, 40]]; // prettier-ignore
    const u = b.map((value, k) => value - a[k]);
    const v = c.map((value, k) => value - a[k]);
    const n = [u[1] * v[2] - u[2] * v[1], u[2] * v[0] - u[0] * v[2], u[0] * v[1] - u[1] * v[0]];
    expect(Math.hypot(...n) / 2).toBeCloseTo(1007.7822, 3);
    expect(Math.asin(n[2] / Math.hypot(...n)) / rad).toBeCloseTo(7.125016, 4);
  });

  it('row D3: a 16-sided pyramid in a 5° cone leans by 4.9044°', () => {
    const cone = lathe([[0, 0], [40, 0], [40 - 60 * Math.tan(5 * rad), 60], [0, 60]], 16); // prettier-ignore
    expect(draftOf(cone).minUpFacingDeg).toBeCloseTo(4.9044, 3);
  });

  it.each([0.5, 1, 2, 3, 5, 7, 10, 15, 20])('a frustum of %s° is read to 0.02°', (deg) => {
    const found = draftOf(frustum(120, 90, 40, deg));
    expect(Math.abs((found.minUpFacingDeg ?? 0) - deg)).toBeLessThan(0.001);
    expect(Math.abs((found.wallMinMacroDeg ?? 0) - deg)).toBeLessThan(0.02);
    expect(found.verticalAreaMm2).toBe(0);
  });

  it('takes the least of mixed drafts, and negative ones as the least of all', () => {
    expect(draftOf(frustum(120, 90, 40, [3, 8, 12, 6])).minUpFacingDeg).toBeCloseTo(3, 3);
    const leaning = draftOf(frustum(120, 90, 40, [-2, 8, 12, 6]));
    expect(leaning.minDeg).toBeCloseTo(-2, 3);
    expect(leaning.minUpFacingDeg).toBeCloseTo(6, 3);
  });

  it('counts vertical walls apart: a box has none that lean', () => {
    const found = draftOf(box(60, 40, 20));
    expect(found).toMatchObject({
      minUpFacingDeg: null,
      minDeg: 0,
      verticalAreaMm2: 4000,
      wallMinMacroDeg: 0,
    });
  });

  it('leaves the bed face out and gives every other area to one bin', () => {
    const { draft, mesh } = reportOn(frustum(120, 90, 40, [-2, 3, 0, 12]), coarse);
    const sum = draft.areaByBinMm2.reduce((total, area) => total + area, 0);
    expect(sum).toBeCloseTo(mesh.areaMm2 - 120 * 90, 6);
    expect(draft.areaByBinMm2).toHaveLength(16);
    const areaIn = (low: number) => draft.areaByBinMm2[draft.binEdgesDeg.indexOf(low)];
    const long = 40 / Math.cos(2 * rad);
    expect(areaIn(-2)).toBeGreaterThan(0.97 * long * 80);
    expect(areaIn(-0.25)).toBeCloseTo(draft.verticalAreaMm2, 6);
    expect(areaIn(2)).toBeGreaterThan(0);
    expect(areaIn(10)).toBeGreaterThan(0);
    expect(areaIn(85)).toBeGreaterThan(0);
  });

  it('puts a flat top into the last bin, 90° included', () => {
    expect(draftOf(box(60, 40, 20)).areaByBinMm2[15]).toBe(2400);
  });

  it('hangs on the up direction only, not on a turn about it', () => {
    const mesh = frustum(120, 90, 40, [3, 8, 12, 6]);
    const [a, b] = [draftOf(mesh), draftOf(turned(mesh, 37))];
    expect(b.minUpFacingDeg).toBeCloseTo(a.minUpFacingDeg ?? 0, 4);
    b.areaByBinMm2.forEach((area, bin) => expect(area).toBeCloseTo(a.areaByBinMm2[bin], 1));
  });
});

describe('wallMinMacroDeg: the wall behind steps and noise', () => {
  it.each([2, 5, 10, 15])('walls that all lean out by %i° keep that in their corners too', (deg) => {
    const { draft: found } = reportOn(frustum(80, 60, 30, -deg), { grid: { cellMm: 0.5 } });
    expect(Math.abs((found.wallMinMacroDeg ?? 0) + deg)).toBeLessThan(0.02);
  });

  it.each([
    [2, 0.4],
    [3, 0.1],
    [5, 0.2],
    [8, 0.3],
    [10, 0.4],
    [12, 0.3],
  ])('reads %s° through layers of %s mm, where facets say 0 and 90', (deg, layer) => {
    const mesh = stairs(80, 60, Math.round(24 / layer), layer, layer * Math.tan(deg * rad));
    for (const found of [draftOf(mesh), draftOf(turned(mesh, 25))]) {
      expect(found.minUpFacingDeg).toBeNull();
      expect(Math.abs((found.wallMinMacroDeg ?? 0) - deg)).toBeLessThan(0.1);
    }
  });

  it('reads a wall that leans out, and calls it a wall below the limit', () => {
    const found = draftOf(frustum(80, 60, 30, [-5, 8, 8, 8]));
    expect(found.wallMinMacroDeg).toBeCloseTo(-5, 1);
    expect(found.regions).toHaveLength(1);
    expect(found.regions[0].minDeg).toBeCloseTo(-5, 3);
  });

  it('names the regions below what is wanted: area and place of the one wall', () => {
    // Foot 120 × 90, 40 high; only the wall at +x leans by less than 6.8°: a trapezoid, at the foot 90 wide.
    const found = draftOf(frustum(120, 90, 40, [3, 8, 8, 8]));
    const wide = 90 - 40 * Math.tan(8 * rad);
    expect(found.wantedDeg).toBeCloseTo(3 + Math.atan(0.01 / 0.15) / rad, 6);
    expect(found.regions).toHaveLength(1);
    expect(found.regions[0].areaMm2).toBeCloseTo((wide * 40) / Math.cos(3 * rad), 1);
    expect(found.regions[0].at[0]).toBeGreaterThan(56);
  });

  it('sees regions through steps: two walls of a stair below what is wanted', () => {
    const found = draftOf(stairs(80, 60, 100, 0.2, 0.2 * Math.tan(4 * rad)));
    const walls = 2 * (80 + 60) * 20;
    const sum = found.regions.reduce((total, { areaMm2 }) => total + areaMm2, 0);
    expect(sum / walls).toBeGreaterThan(0.5);
    expect(sum / walls).toBeLessThan(1.05);
    for (const { minDeg } of found.regions) expect(Math.abs(minDeg - 4)).toBeLessThan(0.1);
  });

  it('reads a 5° wall through 0.05 mm of noise (xorshift seed 7)', () => {
    let state = 7;
    const noise = () => {
      state ^= state << 13;
      state ^= state >>> 17;
      state ^= state << 5;
      return (state >>> 0) / 2 ** 32 - 0.5;
    };
    const seen = new Map<string, number>();
    const mesh = mapPoints(fineFrustum(80, 60, 40, 5, 60), (x, y, z) => {
      if (z < 0.01) return [x, y, z];
      const key = [x, y, z].map((value) => Math.round(value * 1e4)).join();
      const shift = seen.get(key) ?? 0.1 * noise();
      seen.set(key, shift);
      return [x + shift, y - shift, z];
    });
    const found = draftOf(mesh);
    expect(found.minUpFacingDeg).toBeLessThan(3);
    expect(Math.abs((found.wallMinMacroDeg ?? 0) - 5)).toBeLessThan(0.2);
  });

  it('takes a dome by its steep foot', () => {
    const found = draftOf(dome(40, 96, 48));
    expect(found.wallMinMacroDeg).toBeGreaterThan(0);
    expect(found.wallMinMacroDeg).toBeLessThan(6);
  });
});

/** The walls of a frustum cut into n × n quadrilaterals each, without top and bottom. */
function fineFrustum(w: number, d: number, h: number, deg: number, n: number): Triangles {
  const mesh: Triangles = [];
  const corner = (k: number, z: number): [number, number, number] => {
    const inset = z * Math.tan(deg * rad);
    const [x, y] = [w / 2 - inset, d / 2 - inset];
    return [[-x, -y, z], [x, -y, z], [x, y, z], [-x, y, z]][k] as [number, number, number]; // prettier-ignore
  };
  const between = (k: number, s: number, z: number): [number, number, number] => {
    const [a, b] = [corner(k, z), corner((k + 1) % 4, z)];
    return [a[0] + s * (b[0] - a[0]), a[1] + s * (b[1] - a[1]), z];
  };
  for (let k = 0; k < 4; k++) {
    for (let i = 0; i < n; i++) {
      for (let j = 0; j < n; j++) {
        const [s, t, z, y] = [i / n, (i + 1) / n, (h * j) / n, (h * (j + 1)) / n];
        addQuad(mesh, between(k, s, z), between(k, t, z), between(k, t, y), between(k, s, y));
      }
    }
  }
  return mesh;
}
