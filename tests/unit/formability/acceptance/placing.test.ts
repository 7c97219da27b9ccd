import { describe, expect, it } from 'vitest';
import type { RecipeInput } from '@/lib/formability/recipe';
import { frustumAnswer, polygonFactor } from '../../../fixtures/meshes/answers';
import { frustum, lathe } from '../../../fixtures/meshes/solids';
import {
  mapPoints,
  moved,
  reordered,
  scaled,
  together,
  turned,
  type Triangles,
} from '../../../fixtures/meshes/triangles';
import { abs, analysed, has, hold, holdChecks, missesOf, rel, tight, type Claims } from './claims';

/** Coarser cells than the default: what is held here needs no finer ones. */
const quick = (mesh: Triangles, claims: Claims, recipe: RecipeInput = {}) =>
  hold(mesh, claims, { grid: { cellMm: 0.2 }, ...recipe });

const facets = (mesh: Triangles) => mesh.length / 9;

describe('size, place and stand', () => {
  const part = frustum(120, 90, 40, [3, 5, 8, 10]);
  const answer = frustumAnswer(120, 90, 40, [3, 5, 8, 10]);

  it.each([
    [1e3, []],
    [1e4, []],
    [1e5, ['precision']],
  ] as const)('%s mm away', (far, wanted) => {
    quick(moved(part, far, -far, 0), {
      'mesh.volumeMm3': rel(answer.volumeMm3, far > 5e4 ? 1e-3 : 1e-4),
      'mesh.warnings': wanted.length ? has(...wanted) : [],
      'mesh.watertight': true,
      'draft.minUpFacingDeg': abs(3, far > 5e4 ? 0.05 : 0.02),
      'plan.planAreaMm2': rel(10_800, 0.005),
      'mesh.boundsMm.min.0': abs(far - 60, 0.01),
    });
  });

  it('high above and far below the bed: dropped onto it', () => {
    for (const z of [500, -500]) {
      quick(moved(part, 0, 0, z), {
        'mesh.boundsMm.min.2': abs(0, 1e-4),
        'mesh.boundsMm.max.2': abs(40, 1e-3),
        'mesh.bedContactAreaMm2': tight(10_800),
        'mesh.volumeMm3': rel(answer.volumeMm3, 1e-4),
      });
    }
  });

  it('left where it is: floating, and below the bed', () => {
    const stay = { mesh: { dropToBed: false } };
    const floating = quick(moved(part, 0, 0, 5), {
      'mesh.warnings': has('floating'),
      'mesh.bedContactAreaMm2': 0,
      'mesh.boundsMm.min.2': abs(5, 1e-5),
      'plan.depthRatio': rel(45 / 150, 0.2),
    }, stay); // prettier-ignore
    holdChecks(floating, { mesh: 'caution|fail' });
    quick(moved(part, 0, 0, -4), { 'mesh.warnings': has('below_bed') }, stay);
  });

  it.each([
    ['inches', 'in', 25.4],
    ['centimetres', 'cm', 10],
    ['metres', 'm', 1000],
  ] as const)('drawn in %s', (_, unit, factor) => {
    const small = scaled(part, 1 / factor);
    quick(small, { 'mesh.suggestedScale': factor, 'mesh.warnings': has('suspicious_scale') });
    quick(
      small,
      {
        'mesh.suggestedScale': null,
        'mesh.warnings': [],
        'mesh.volumeMm3': rel(answer.volumeMm3, 1e-4),
        'draft.minUpFacingDeg': abs(3, 0.02),
      },
      { mesh: { unit } },
    );
  });

  it.each([
    ['metres', 200, 1000],
    ['inches', 200, 25.4],
    ['metres', 60, 1000],
    ['inches', 300, 25.4],
  ])('a template in %s, %s mm long', (_, size, factor) => {
    const mesh = scaled(frustum(size, size * 0.7, size * 0.25, 5), 1 / factor);
    quick(mesh, { 'mesh.suggestedScale': factor });
  });

  it.each([25, 60, 120, 300, 450])('a template of %s mm is of a likely size', (size) => {
    quick(frustum(size, size * 0.7, size * 0.25, 5), { 'mesh.suggestedScale': null, 'mesh.warnings': [] }, { grid: { cellMm: size / 200 } }); // prettier-ignore
  });

  it.each([
    ['on its back', (x: number, y: number, z: number) => [x, -z, y] as const, [0, -1, 0]],
    ['on its side', (x: number, y: number, z: number) => [z, y, -x] as const, [1, 0, 0]],
    ['on its head', (x: number, y: number, z: number) => [x, -y, -z] as const, [0, 0, -1]],
  ])('lying %s: says how to stand it, and stands when told', (_, lay, up) => {
    const lying = mapPoints(part, lay);
    const report = quick(lying, { 'mesh.warnings': has('orientation') });
    expect(report.mesh.suggestedUp?.map((value) => Math.round(value * 100) / 100 + 0)).toEqual(up);
    quick(
      lying,
      {
        'mesh.warnings': [],
        'mesh.volumeMm3': tight(answer.volumeMm3),
        'mesh.bedContactAreaMm2': tight(10_800),
        'draft.minUpFacingDeg': abs(3, 0.02),
        'draft.minDeg': abs(3, 0.02),
        'plan.planAreaMm2': rel(10_800, 0.005),
      },
      { mesh: { up: up as [number, number, number] } },
    );
  });
});

describe('the same part turned, moved, renumbered and scaled', () => {
  const part = together(
    lathe([[0, 0], [30, 0], [27, 20], [35, 20], [35, 26], [10, 26], [10, 12], [0, 12]], 48), // prettier-ignore
    moved(frustum(30, 40, 18, 6), 62, 0, 0),
  );
  const base = analysed(part);
  const figures = (factor: number, share: number) => ({
    'mesh.volumeMm3': rel(base.mesh.volumeMm3 * factor ** 3, 1e-5),
    'mesh.areaMm2': rel(base.mesh.areaMm2 * factor ** 2, 1e-5),
    'mesh.bedContactAreaMm2': rel(base.mesh.bedContactAreaMm2 * factor ** 2, 1e-5),
    'mesh.shells': 2,
    'mesh.watertight': true,
    'draft.minUpFacingDeg': abs(base.draft.minUpFacingDeg ?? NaN, 0.02),
    'draft.minDeg': abs(-90, 0.02),
    'draft.wallMinMacroDeg': abs(base.draft.wallMinMacroDeg ?? NaN, 0.3),
    'plan.planAreaMm2': rel(base.plan.planAreaMm2 * factor ** 2, share),
    'undercut.overhangAreaMm2': rel(base.undercut.overhangAreaMm2 * factor ** 2, 1e-4),
    'undercut.shadowedAreaMm2': rel(base.undercut.shadowedAreaMm2 * factor ** 2, 0.015),
    'undercut.undercutVolumeMm3': rel(base.undercut.undercutVolumeMm3 * factor ** 3, 0.015),
    'undercut.maxDepthMm': rel(base.undercut.maxDepthMm * factor, 0.02),
    'airTraps.length': 1,
    'airTraps.0.volumeMm3': rel(base.airTraps[0].volumeMm3 * factor ** 3, 0.015),
    'spacing.length': 1,
    'spacing.0.gapAtBedMm': rel(base.spacing[0].gapAtBedMm * factor, 0.02),
    'spacing.0.heightOverGap': rel(base.spacing[0].heightOverGap, 0.02),
  });

  it('is as worked out', () => {
    expect(missesOf(base, { 'airTraps.0.volumeMm3': rel(polygonFactor(48) * 100 * 14, 0.01) })).toEqual([]);
  });

  it.each([17, 45, 90, 133])('turned by %s° about Z', (deg) => {
    quick(turned(part, deg), figures(1, 0.005));
  });

  it('moved', () => {
    quick(moved(part, 1234.56, -77.7, 55), figures(1, 0.003));
  });

  it('with its facets in another order (stride 101)', () => {
    const n = facets(part);
    const order = Array.from({ length: n }, (_, i) => (i * 101) % n);
    expect(new Set(order).size).toBe(n);
    quick(reordered(part, order), figures(1, 1e-9));
  });

  it('with each facet beginning at another corner', () => {
    const rolled: Triangles = [];
    for (let i = 0; i < part.length; i += 9)
      rolled.push(...part.slice(i + 3, i + 9), ...part.slice(i, i + 3));
    quick(rolled, figures(1, 1e-6));
  });

  it.each([
    ['micron', 1000],
    ['m', 1e-3],
    ['cm', 0.1],
    ['in', 1 / 25.4],
  ] as const)('in %s with that unit named', (unit, factor) => {
    quick(scaled(part, factor), figures(1, 0.003), { mesh: { unit } });
  });
});
