import { describe, expect, it } from 'vitest';
import { box, dome, frustum, lathe } from '../../../fixtures/meshes/solids';
import {
  flipped,
  mapPoints,
  moved,
  scaled,
  together,
  type Triangles,
} from '../../../fixtures/meshes/triangles';
import { reportOn } from '../run-engine';

const coarse = { grid: { cellMm: 0.5 } };
const meshOf = (mesh: Triangles, recipe = {}) => reportOn(mesh, { ...coarse, ...recipe }).mesh;
const withoutFacet = (mesh: Triangles, facet: number) => [
  ...mesh.slice(0, 9 * facet),
  ...mesh.slice(9 * facet + 9),
];

describe('mesh facts (closed forms)', () => {
  it('a box of 60 × 40 × 20 is exact', () => {
    const found = meshOf(box(60, 40, 20));
    expect(found).toMatchObject({
      boundsMm: { min: [-30, -20, 0], max: [30, 20, 20] },
      volumeMm3: 48_000,
      unionVolumeMm3: 48_000,
      areaMm2: 8800,
      bedContactAreaMm2: 2400,
      shells: 1,
      watertight: true,
      edges: { boundary: 0, nonManifold: 0, inconsistent: 0 },
      degenerate: 0,
      suggestedScale: null,
      warnings: [],
      repairs: [],
    });
  });

  it('a frustum has h/3 (A + a + √(A a)) to 1e-5: prismoid of similar ends', () => {
    const inset = 50 * Math.tan((5 * Math.PI) / 180);
    const [foot, top] = [100 * 100, (100 - 2 * inset) ** 2];
    const expected = (50 / 3) * (foot + top + Math.sqrt(foot * top));
    expect(Math.abs(meshOf(frustum(100, 100, 50, 5)).volumeMm3 / expected - 1)).toBeLessThan(1e-5);
  });

  it('keeps its digits 90 m from the origin where the corners are whole millimetres', () => {
    const found = meshOf(moved(box(60, 40, 20), 90_000, -90_000, 500));
    expect(found.volumeMm3).toBeCloseTo(48_000, 6);
    expect(found.boundsMm).toEqual({ min: [89_970, -90_020, 0], max: [90_030, -89_980, 20] });
    expect(found.warnings).toEqual(['floating', 'precision']);
    expect(found.repairs).toEqual(['dropped_to_bed']);
  });

  it('takes the unit and turns the up direction onto +Z', () => {
    const inches = scaled(box(60, 40, 20), 1 / 25.4);
    expect(meshOf(inches, { mesh: { unit: 'in' } }).volumeMm3 / 48_000).toBeCloseTo(1, 5);
    const lying = mapPoints(box(60, 40, 20), (x, y, z) => [x, -z, y]);
    expect(meshOf(lying, { mesh: { up: [0, -1, 0] } }).boundsMm.max[2]).toBe(20);
    expect(meshOf(box(60, 40, 20), { mesh: { up: [0, 0, -1] } })).toMatchObject({
      volumeMm3: 48_000,
      bedContactAreaMm2: 2400,
    });
    expect(meshOf(box(60, 40, 20), { mesh: { up: [1, 0, 0] } }).boundsMm.max[2]).toBe(60);
  });
});

describe('wrong but usable meshes: warning, and repair where one is safe', () => {
  it('inside out: volume as stored is negative, the union after the repair positive', () => {
    const found = meshOf(flipped(box(60, 40, 20)));
    expect(found).toMatchObject({ volumeMm3: -48_000, unionVolumeMm3: 48_000, watertight: true });
    expect(found.warnings).toEqual(['inverted']);
    expect(found.repairs).toEqual(['flipped_inside_out']);
  });

  it('a void shell is negative by right, and inside out only together with its outside', () => {
    const hollow = together(box(60, 40, 20), flipped(moved(box(50, 30, 10), 0, 0, 5)));
    const right = meshOf(hollow);
    expect(right).toMatchObject({ volumeMm3: 33_000, unionVolumeMm3: 33_000, shells: 2, warnings: [] });
    const turned = meshOf(flipped(hollow));
    expect(turned).toMatchObject({ volumeMm3: -33_000, unionVolumeMm3: 33_000, warnings: ['inverted'] });
  });

  it('one of two bodies inside out', () => {
    const found = meshOf(together(box(20, 20, 20), flipped(moved(box(20, 20, 20), 40, 0, 0))));
    expect(found).toMatchObject({ shells: 2, unionVolumeMm3: 16_000, warnings: ['inverted'] });
  });

  it('some facets wound the other way', () => {
    const mesh = box(60, 40, 20);
    const wrong = together(mesh.slice(0, 27), flipped(mesh.slice(27, 45)), mesh.slice(45));
    const found = meshOf(wrong);
    expect(found.edges.inconsistent).toBeGreaterThan(0);
    expect(found).toMatchObject({ watertight: false, unionVolumeMm3: 48_000 });
    expect(found.warnings).toEqual(['inconsistent_winding']);
    expect(found.repairs).toEqual(['rewound_facets']);
  });

  it('a surface that cannot be wound one way (two sheets on one edge) still gives finite figures', () => {
    const strip: Triangles = [];
    const at = (i: number, side: number): [number, number, number] => {
      const [a, half] = [(i * Math.PI) / 12, (i * Math.PI) / 24];
      const r = 30 + side * 8 * Math.cos(half);
      return [r * Math.cos(a), r * Math.sin(a), 20 + side * 8 * Math.sin(half)];
    };
    for (let i = 0; i < 24; i++) {
      strip.push(...at(i, -1), ...at(i + 1, -1), ...at(i + 1, 1), ...at(i, -1), ...at(i + 1, 1), ...at(i, 1));
    }
    const report = reportOn(together(strip, box(20, 20, 10)), coarse);
    expect(report.mesh).toMatchObject({ shells: 2, watertight: false });
    expect(report.mesh.openColumns).toBeGreaterThan(0);
    expect(report.plan.planAreaMm2).toBeGreaterThanOrEqual(400);
    expect(Number.isFinite(report.mesh.unionVolumeMm3)).toBe(true);
  });

  it('a missing base is open, and taken to stand on the bed', () => {
    const open = withoutFacet(withoutFacet(box(60, 40, 20), 0), 0);
    const found = meshOf(open);
    expect(found).toMatchObject({
      watertight: false,
      edges: { boundary: 4, nonManifold: 0, inconsistent: 0 },
    });
    expect(found.warnings).toContain('not_watertight');
    expect(found.repairs).toContain('closed_at_bed');
    expect(found.unionVolumeMm3).toBeCloseTo(48_000, 6);
    expect(found.approximate).toBe(true);
    expect(found.places).toEqual([
      { code: 'not_watertight', at: [0, 0, 0], count: 4, sizeMm: Math.hypot(60, 40) },
    ]);
  });

  it.each(Array.from({ length: 10 }, (_, i) => i + 2))('without its facet %s: the hole is capped', (gone) => {
    const found = meshOf(withoutFacet(box(60, 40, 20), gone));
    expect(found.edges.boundary).toBe(3);
    expect(found.repairs).toEqual(['capped_holes']);
    expect(found.unionVolumeMm3).toBeCloseTo(48_000, 6);
  });

  it('corners up to 0.0001 mm apart are welded, and the repair is named', () => {
    let n = 0;
    const jittered = mapPoints(box(60, 40, 20), (x, y, z) => [x + 2e-5 * Math.sin(n++), y, z]);
    const found = meshOf(jittered);
    expect(found).toMatchObject({
      watertight: true,
      edges: { boundary: 0, nonManifold: 0, inconsistent: 0 },
    });
    expect(found.warnings).toEqual(['needs_tolerant_weld']);
    expect(found.repairs).toEqual(['tolerant_weld']);
    let m = 0;
    const torn = meshOf(mapPoints(box(60, 40, 20), (x, y, z) => [x + 0.01 * Math.sin(m++), y, z]));
    expect(torn.watertight).toBe(false);
    expect(torn.warnings).toContain('not_watertight');
  });

  it('facets without area and facets twice are counted and left out', () => {
    const mesh = box(60, 40, 20);
    const found = meshOf(together(mesh, mesh.slice(18, 27), [0, 0, 20, 0, 0, 20, 5, 5, 20]));
    expect(found).toMatchObject({ degenerate: 1, duplicates: 1, unionVolumeMm3: 48_000, areaMm2: 8800 });
    expect(found.warnings).toContain('degenerate_triangles');
    expect(found.warnings).toContain('duplicate_triangles');
    expect(found.repairs).toEqual(['removed_degenerate', 'removed_duplicates']);
  });

  it('overlapping bodies count once: union of two 20 mm cubes that share 10 × 20 × 20', () => {
    const found = meshOf(together(box(20, 20, 20), moved(box(20, 20, 20), 10, 0, 0)), {
      grid: { cellMm: 0.05 },
    });
    expect(found).toMatchObject({ shells: 2, volumeMm3: 16_000, warnings: ['overlapping_shells'] });
    expect(found.unionVolumeMm3 / 12_000).toBeCloseTo(1, 2);
  });

  it('a body on another touches it; a body in the air floats', () => {
    const on = meshOf(together(box(40, 40, 10), moved(box(20, 20, 10), 0, 0, 10)));
    expect(on.warnings).toEqual(['touching_shells']);
    const above = meshOf(together(box(40, 40, 10), moved(box(20, 20, 10), 0, 0, 15)));
    expect(above.warnings).toEqual(['floating']);
  });

  it('says how the part stands when it may not be dropped', () => {
    const stay = { mesh: { dropToBed: false } };
    expect(meshOf(moved(box(60, 40, 20), 0, 0, 3), stay).warnings).toContain('floating');
    expect(meshOf(moved(box(60, 40, 20), 0, 0, -3), stay).warnings).toContain('below_bed');
  });

  it('proposes the side to stand on: a dome upside down', () => {
    const upsideDown = mapPoints(dome(40, 48, 24), (x, y, z) => [x, -y, 40 - z]);
    const found = meshOf(upsideDown);
    expect(found.warnings).toContain('orientation');
    expect(found.suggestedUp).toEqual([0, 0, -1]);
    expect(meshOf(dome(40, 48, 24)).suggestedUp).toBeNull();
  });
});

describe('suggestedScale', () => {
  const template = frustum(120, 90, 45, 5);
  it.each([
    ['inches', 25.4],
    ['centimetres', 10],
    ['metres', 1000],
  ])('finds %s', (_, factor) => {
    const found = meshOf(scaled(template, 1 / factor), { grid: {} });
    expect(found.suggestedScale).toBe(factor);
    expect(found.warnings).toContain('suspicious_scale');
  });

  it('leaves a plausible size alone', () => {
    expect(meshOf(lathe([[0, 0], [15, 0], [12, 20], [0, 20]], 32)).suggestedScale).toBeNull(); // prettier-ignore
  });
});
