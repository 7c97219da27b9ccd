import { describe, expect, it } from 'vitest';
import {
  binAreas,
  frustumAnswer,
  polygonFactor,
  totalArea,
  turnedFacets,
  turnedVolume,
} from '../../../fixtures/meshes/answers';
import { dome, frustum, lathe } from '../../../fixtures/meshes/solids';
import type { Triangles } from '../../../fixtures/meshes/triangles';
import { abs, hold, holdChecks, rel, tight, type Claims } from './claims';

/** Round bodies on coarser cells than the default; the rectangular ones are held on the default. */
const round = (mesh: Triangles, claims: Claims) => hold(mesh, claims, { grid: { cellMm: 0.2 } });

const rad = Math.PI / 180;
const LAYER = 0.15;

/** A body without overhang, void, pit or neighbour. */
const plain: Claims = {
  'mesh.shells': 1,
  'mesh.watertight': true,
  'mesh.edges.boundary': 0,
  'mesh.edges.nonManifold': 0,
  'mesh.edges.inconsistent': 0,
  'mesh.degenerate': 0,
  'mesh.suggestedScale': null,
  'mesh.warnings': [],
  'mesh.repairs': [],
  'undercut.overhangAreaMm2': 0,
  'undercut.shadowedAreaMm2': 0,
  'undercut.undercutVolumeMm3': 0,
  'undercut.enclosedVolumeMm3': 0,
  'undercut.maxDepthMm': 0,
  airTraps: [],
  vents: [],
  spacing: [],
  'walls.hollow': false,
};

type Four = [number, number, number, number];

function rectangular(w: number, d: number, h: number, drafts: Four): Claims {
  const { volumeMm3, topMm, facets } = frustumAnswer(w, d, h, drafts);
  const leaning = drafts.filter((angle) => angle > 0.25);
  const [fx, fy] = [w + 60, d + 60];
  const formed = fx * fy - w * d + totalArea(facets);
  const rise = (a: number, b: number) => h / Math.cos(a * rad) + h / Math.cos(b * rad);
  return {
    ...plain,
    'mesh.boundsMm.min': [-w / 2, -d / 2, 0],
    'mesh.boundsMm.max': [w / 2, d / 2, h],
    'mesh.volumeMm3': tight(volumeMm3),
    'mesh.unionVolumeMm3': tight(volumeMm3),
    'mesh.areaMm2': tight(w * d + totalArea(facets)),
    'mesh.bedContactAreaMm2': tight(w * d),
    'draft.minUpFacingDeg': abs(Math.min(...leaning), 0.02),
    'draft.minDeg': abs(Math.min(...drafts), 0.02),
    'draft.verticalAreaMm2': tight(totalArea(facets.filter(({ draftDeg }) => Math.abs(draftDeg) <= 0.25))),
    'draft.areaByBinMm2': binAreas(facets).map((area) => abs(area, 1e-5 * w * d)),
    'draft.wallMinMacroDeg': abs(Math.min(...drafts), 0.02),
    'plan.frameAreaMm2': tight(fx * fy),
    'plan.planAreaMm2': rel(w * d, 0.005),
    'plan.formedAreaMm2': rel(formed, 0.005),
    'plan.arealDrawRatio': rel(formed / (fx * fy), 0.005),
    'plan.linearDrawRatioX': rel((fx - w + topMm[0] + rise(drafts[0], drafts[1])) / fx, 0.005),
    'plan.linearDrawRatioY': rel((fy - d + topMm[1] + rise(drafts[2], drafts[3])) / fy, 0.005),
    'plan.depthRatio': tight(h / Math.min(fx, fy)),
    'layers.cuspMaxMm': abs(LAYER * Math.sin(Math.max(...leaning) * rad), 1e-5),
    'layers.treadMinMm': abs(LAYER * Math.tan(Math.min(...leaning) * rad), 1e-5),
  };
}

describe('rectangular frusta', () => {
  it.each([0.5, 1, 2, 3, 5, 7, 10, 20])('%s° on every side', (deg) => {
    const report = hold(frustum(100, 70, 30, deg), {
      ...rectangular(100, 70, 30, [deg, deg, deg, deg]),
      'layers.cuspMedianMm': abs(LAYER * Math.sin(deg * rad), 1e-5),
    });
    holdChecks(report, {
      mesh: 'pass',
      fit: 'pass',
      draft: deg >= 7 ? 'pass' : deg < 3 ? 'fail' : 'caution',
      undercut: 'pass',
      overhang: 'pass',
      spacing: 'pass',
    });
  });

  it.each<[Four]>([[[1, 5, 10, 20]], [[0.5, 2, 2, 0.5]], [[20, 10, 5, 2]], [[3, 3, 0, 8]], [[0, 0, 0, 12]]])(
    'drafts %s',
    (drafts) => {
      hold(frustum(90, 120, 25, drafts), rectangular(90, 120, 25, drafts));
    },
  );

  it.each([2, 5, 10, 15])('walls that all lean out by %s°: the macro draft is that of the facets', (deg) => {
    // Under each wall hangs a wedge: W = (w + 2 z s)(d + 2 z s) from the foot up, cover at the top's outline.
    const s = Math.tan((deg * Math.PI) / 180);
    const [w, d, h] = [80, 60, 30];
    const volume = w * d * h + (w + d) * s * h * h + (4 * s * s * h ** 3) / 3;
    hold(
      frustum(w, d, h, -deg),
      {
        'mesh.volumeMm3': tight(volume),
        'draft.wallMinMacroDeg': abs(-deg, 0.02),
        'draft.minDeg': abs(-deg, 0.02),
        'draft.minUpFacingDeg': null,
        'undercut.undercutVolumeMm3': rel((w + 2 * h * s) * (d + 2 * h * s) * h - volume, 0.015),
        'undercut.maxDepthMm': abs(h * s, 0.2),
      },
      { grid: { cellMm: 0.2 } },
    );
  });

  it('the median cusp weighs areas: 2/3 of the wall at 5°, the rest at 20°', () => {
    // Long walls 120 wide at 5°, short ones 30 wide at 20°.
    const drafts: Four = [20, 20, 5, 5];
    hold(frustum(120, 30, 10, drafts), {
      'layers.cuspMedianMm': abs(LAYER * Math.sin(5 * rad), 1e-5),
      'layers.cuspMaxMm': abs(LAYER * Math.sin(20 * rad), 1e-5),
    });
  });
});

/** Half the area of the walls and slopes has a smaller cusp. */
function medianCusp(facets: { draftDeg: number; areaMm2: number }[]): number {
  const sorted = [...facets].sort((a, b) => a.draftDeg - b.draftDeg);
  let left = totalArea(sorted) / 2;
  for (const { draftDeg, areaMm2 } of sorted) {
    left -= areaMm2;
    if (left <= 0) return LAYER * Math.sin(draftDeg * rad);
  }
  return NaN;
}

function turned(profile: [number, number][], sides: number): Claims {
  const segments = profile.map((from, i) => [from, profile[(i + 1) % profile.length]]);
  const isSkin = segments.map(([[r, z], [s, y]]) => r + s > 0 && z + y > 0);
  const skin = turnedFacets(profile, sides).filter((_, i) => isSkin[i]);
  const foot = Math.max(...profile.map(([r]) => r));
  const top = Math.max(...profile.map(([, z]) => z));
  const plan = polygonFactor(sides) * foot * foot;
  const side = 2 * foot + 60;
  const formed = side * side - plan + totalArea(skin);
  const leaning = skin.filter(({ draftDeg }) => draftDeg > 0.25 && draftDeg < 85);
  const slopes = skin.filter(({ draftDeg }) => draftDeg > 0.25 && draftDeg < 89.5);
  const cusp = ({ draftDeg }: { draftDeg: number }) => LAYER * Math.sin(draftDeg * rad);
  const tread = ({ draftDeg }: { draftDeg: number }) => LAYER * Math.tan(draftDeg * rad);
  // Corners lie on the x and y axes (sides is a multiple of 4): that section follows the profile itself.
  const section = segments.reduce(
    (sum, [[r, z], [s, y]], i) => (isSkin[i] ? sum + 2 * Math.hypot(s - r, y - z) : sum),
    0,
  );
  const linear = rel((side - 2 * foot + section) / side, 0.005);
  return {
    ...plain,
    'mesh.volumeMm3': tight(turnedVolume(profile, sides)),
    'mesh.unionVolumeMm3': tight(turnedVolume(profile, sides)),
    'mesh.areaMm2': tight(plan + totalArea(skin)),
    'mesh.bedContactAreaMm2': tight(plan),
    'draft.minUpFacingDeg': abs(Math.min(...leaning.map(({ draftDeg }) => draftDeg)), 0.02),
    'draft.minDeg': abs(Math.min(...skin.map(({ draftDeg }) => draftDeg)), 0.02),
    'draft.areaByBinMm2': binAreas(skin).map((area) => abs(area, 1e-5 * plan)),
    'layers.cuspMaxMm': abs(Math.max(...slopes.map(cusp)), 1e-5),
    'layers.cuspMedianMm': abs(medianCusp(slopes), 2e-3 * LAYER),
    'layers.treadMinMm': abs(Math.min(...slopes.map(tread)), 1e-5),
    'plan.planAreaMm2': rel(plan, 0.005),
    'plan.formedAreaMm2': rel(formed, 0.005),
    'plan.arealDrawRatio': rel(formed / side ** 2, 0.005),
    'plan.linearDrawRatioX': linear,
    'plan.linearDrawRatioY': linear,
    'plan.depthRatio': rel(top / side, 1e-5),
  };
}

describe('round frusta, cones and domes', () => {
  it.each([32, 64, 128, 256])('a frustum of 5° in %s sides', (sides) => {
    const profile: [number, number][] = [[0, 0], [40, 0], [40 - 30 * Math.tan(5 * rad), 30], [0, 30]]; // prettier-ignore
    const facet = Math.atan(Math.tan(5 * rad) * Math.cos(Math.PI / sides)) / rad;
    const report = round(lathe(profile, sides), {
      ...turned(profile, sides),
      'draft.minUpFacingDeg': abs(facet, 0.02),
      'draft.wallMinMacroDeg': abs(facet, 0.1),
    });
    holdChecks(report, { draft: 'caution', undercut: 'pass', mesh: 'pass' });
  });

  it.each([0.5, 1, 2, 10, 20])('a frustum of %s° in 96 sides', (deg) => {
    const profile: [number, number][] = [[0, 0], [45, 0], [45 - 40 * Math.tan(deg * rad), 40], [0, 40]]; // prettier-ignore
    round(lathe(profile, 96), turned(profile, 96));
  });

  it.each([
    [50, 100, 128],
    [40, 20, 64],
    [30, 5, 32],
  ])('a cone r %s, h %s in %s sides', (r, h, sides) => {
    const profile: [number, number][] = [[0, 0], [r, 0], [0, h]]; // prettier-ignore
    round(lathe(profile, sides), turned(profile, sides));
  });

  it.each([
    [50, 128, 48],
    [30, 64, 16],
  ])(
    'a hemisphere r %s of %s × %s facets, by its own rings and by the zones of the sphere',
    (radius, sides, rings) => {
      const profile: [number, number][] = [[0, 0]];
      for (let i = 0; i < rings; i++) {
        const angle = (Math.PI / 2) * (i / rings);
        profile.push([radius * Math.cos(angle), radius * Math.sin(angle)]);
      }
      profile.push([0, radius]);
      const { draft } = round(dome(radius, sides, rings), turned(profile, sides));
      // Zone between drafts a and b: 2πr² (sin b − sin a), here within one ring of facets either side.
      const zone = (a: number, b: number) =>
        2 * Math.PI * radius ** 2 * (Math.sin(b * rad) - Math.sin(a * rad));
      const ring = zone(0, 90 / rings);
      draft.areaByBinMm2.forEach((area, bin) => {
        const [low, high] = draft.binEdgesDeg.slice(bin, bin + 2);
        expect(Math.abs(area - (low >= 0 ? zone(low, high) : 0)), `bin from ${low}`).toBeLessThan(2 * ring);
      });
    },
  );
});
