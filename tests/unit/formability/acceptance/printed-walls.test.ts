import { describe, expect, it } from 'vitest';
import { totalArea, turnedFacets, turnedVolume } from '../../../fixtures/meshes/answers';
import { dome, lathe, stairs } from '../../../fixtures/meshes/solids';
import { addQuad, mapPoints, turned, type Triangles } from '../../../fixtures/meshes/triangles';
import { abs, hold, holdChecks, rel, tight } from './claims';

type P = [number, number];
const rad = Math.PI / 180;
const below = (limit: number) => (value: unknown) =>
  (value as number) < limit ? null : `less than ${limit}`;

/** A lathe profile of `layers` steps of height h, each set back by h·tan(deg). */
function steps(radius: number, layers: number, h: number, deg: number): P[] {
  const profile: P[] = [[0, 0]];
  for (let k = 0; k < layers; k++) {
    const r = radius - k * h * Math.tan(deg * rad);
    profile.push([r, k * h], [r, (k + 1) * h]);
  }
  return [...profile, [0, layers * h]];
}

describe('explicit layers: facets say 0° and 90°, the wall leans', () => {
  it.each([
    [3, 0.2, 150],
    [5, 0.2, 150],
    [8, 0.2, 100],
    [12, 0.3, 80],
    [5, 0.1, 200],
  ])('a frustum of %s° in layers of %s mm', (deg, h, layers) => {
    const tread = h * Math.tan(deg * rad);
    const slices = Array.from({ length: layers }, (_, k) => [80 - 2 * k * tread, 60 - 2 * k * tread]);
    const report = hold(stairs(80, 60, layers, h, tread), {
      'mesh.watertight': true,
      'mesh.warnings': [],
      'mesh.volumeMm3': rel(
        slices.reduce((sum, [w, d]) => sum + w * d * h, 0),
        1e-4,
      ),
      'draft.minUpFacingDeg': null,
      'draft.minDeg': abs(0, 0.02),
      'draft.verticalAreaMm2': rel(
        slices.reduce((sum, [w, d]) => sum + 2 * (w + d) * h, 0),
        1e-4,
      ),
      'draft.areaByBinMm2.15': rel(4800, 1e-4),
      'draft.wallMinMacroDeg': abs(deg, 0.3),
      'undercut.overhangAreaMm2': 0,
      'undercut.undercutVolumeMm3': 0,
      'plan.planAreaMm2': rel(4800, 0.005),
      airTraps: [],
    });
    holdChecks(report, {
      undercut: 'pass',
      draft: deg > 7 ? 'pass' : deg < 3.2 ? 'caution|fail' : 'caution|fail',
    });
  });

  it('turned out of the grid', () => {
    hold(turned(stairs(80, 60, 100, 0.2, 0.2 * Math.tan(6 * rad)), 31), {
      'draft.wallMinMacroDeg': abs(6, 0.3),
      'draft.minDeg': abs(0, 0.02),
    });
  });

  it.each([4, 8])('round, of %s°', (deg) => {
    const profile = steps(40, 120, 0.2, deg);
    hold(lathe(profile, 96), {
      'mesh.volumeMm3': rel(turnedVolume(profile, 96), 1e-4),
      'draft.wallMinMacroDeg': abs(deg, 0.3),
      'draft.minUpFacingDeg': null,
    });
  });

  it('coarse steps of 2 mm are steps, not a printed wall', () => {
    hold(stairs(80, 60, 10, 2, 2), { 'draft.minDeg': abs(0, 0.02), 'draft.wallMinMacroDeg': (value: unknown) => ((value as number) < 46 ? null : 'at most the slope of the stairs') }); // prettier-ignore
  });
});

describe('bulging beads', () => {
  /** Each layer a bead standing out by `bulge` in five points, on a wall of `deg`. */
  function beads(radius: number, layers: number, h: number, deg: number, bulge: number): P[] {
    const profile: P[] = [[0, 0]];
    for (let k = 0; k < layers; k++) {
      for (let i = 0; i < 4; i++) {
        const z = h * (k + i / 4);
        profile.push([radius - z * Math.tan(deg * rad) + bulge * Math.sin((Math.PI * i) / 4), z]);
      }
    }
    const top = layers * h;
    return [...profile, [radius - top * Math.tan(deg * rad), top], [0, top]];
  }

  it.each([
    [5, 0.03],
    [5, 0.06],
    [8, 0.04],
  ])('on a wall of %s°, %s mm: texture, and the wall keeps its draft', (deg, bulge) => {
    const profile = beads(40, 100, 0.2, deg, bulge);
    const facets = turnedFacets(profile, 96);
    const under = facets.filter(({ draftDeg }, i) => draftDeg < -0.25 && profile[i][1] + profile[(i + 1) % profile.length][1] > 0); // prettier-ignore
    const report = hold(lathe(profile, 96), {
      'mesh.volumeMm3': tight(turnedVolume(profile, 96)),
      'mesh.watertight': true,
      'draft.minDeg': abs(Math.min(...under.map(({ draftDeg }) => draftDeg)), 0.1),
      'draft.wallMinMacroDeg': abs(deg, 0.5),
      'undercut.overhangAreaMm2': rel(totalArea(under), 0.001),
      'undercut.maxDepthMm': below(0.2),
    });
    holdChecks(report, { undercut: 'pass' });
  });
});

describe('a scan with noise (xorshift seed 23)', () => {
  function noise(seed: number): () => number {
    let state = seed;
    return () => {
      state ^= state << 13;
      state ^= state >>> 17;
      state ^= state << 5;
      return (state >>> 0) / 2 ** 31 - 1;
    };
  }

  /** The walls and top of a frustum in squares of about `size`, every corner above the foot moved at random. */
  function scan(w: number, d: number, h: number, deg: number, size: number, amount: number): Triangles {
    const mesh: Triangles = [];
    const corner = (k: number, z: number): [number, number] => {
      const inset = z * Math.tan(deg * rad);
      const [x, y] = [w / 2 - inset, d / 2 - inset];
      return ([[-x, -y], [x, -y], [x, y], [-x, y]] as P[])[k]; // prettier-ignore
    };
    const nz = Math.round(h / size);
    for (let k = 0; k < 4; k++) {
      const n = Math.round((k % 2 === 0 ? w : d) / size);
      const at = (i: number, j: number): [number, number, number] => {
        const z = (h * j) / nz;
        const [a, b] = [corner(k, z), corner((k + 1) % 4, z)];
        return [a[0] + ((b[0] - a[0]) * i) / n, a[1] + ((b[1] - a[1]) * i) / n, z];
      };
      for (let i = 0; i < n; i++) for (let j = 0; j < nz; j++) addQuad(mesh, at(i, j), at(i + 1, j), at(i + 1, j + 1), at(i, j + 1)); // prettier-ignore
    }
    const [nx, ny] = [Math.round(w / size), Math.round(d / size)];
    for (const [z, up] of [
      [h, true],
      [0, false],
    ] as const) {
      const [a, , c] = [corner(0, z), 0, corner(2, z)];
      const at = (i: number, j: number): [number, number, number] => [a[0] + ((c[0] - a[0]) * i) / nx, a[1] + ((c[1] - a[1]) * j) / ny, z]; // prettier-ignore
      for (let i = 0; i < nx; i++) {
        for (let j = 0; j < ny; j++) {
          const quad = [at(i, j), at(i + 1, j), at(i + 1, j + 1), at(i, j + 1)] as const;
          if (up) addQuad(mesh, ...quad);
          else addQuad(mesh, quad[0], quad[3], quad[2], quad[1]);
        }
      }
    }
    const roll = noise(23);
    const seen = new Map<string, readonly [number, number, number]>();
    return mapPoints(mesh, (x, y, z) => {
      if (z < 1e-6) return [x, y, z];
      const key = [x, y, z].map((value) => Math.round(value * 1e4)).join();
      const moved = seen.get(key) ?? [x + amount * roll(), y + amount * roll(), z + amount * roll()];
      seen.set(key, moved);
      return moved;
    });
  }

  it.each([
    [5, 1, 0.03],
    [5, 1, 0.05],
    [8, 1.5, 0.05],
    [3, 1, 0.02],
  ])('a wall of %s° in squares of %s mm, corners off by up to %s mm', (deg, size, amount) => {
    const top = frustumVolume(60, 40, 24, deg);
    const report = hold(scan(60, 40, 24, deg, size, amount), {
      'mesh.watertight': true,
      'mesh.shells': 1,
      'mesh.warnings': [],
      'mesh.volumeMm3': rel(top, 0.002),
      'draft.wallMinMacroDeg': abs(deg, 1),
      'undercut.maxDepthMm': below(0.2),
      'plan.planAreaMm2': rel(2400, 0.01),
    });
    expect(report.draft.minUpFacingDeg ?? 90).toBeLessThan(deg);
    holdChecks(report, { undercut: 'pass', mesh: 'pass' });
  });

  it('a dome with noise has no forming undercut', () => {
    const roll = noise(29);
    const seen = new Map<string, readonly [number, number, number]>();
    const mesh = mapPoints(dome(30, 120, 40), (x, y, z) => {
      if (z < 1e-6) return [x, y, z];
      const key = [x, y, z].map((value) => Math.round(value * 1e4)).join();
      const s = 1 + 0.001 * roll();
      const at = seen.get(key) ?? [x * s, y * s, z * s];
      seen.set(key, at);
      return at;
    });
    const report = hold(mesh, { 'undercut.maxDepthMm': below(0.2), 'mesh.warnings': [] });
    holdChecks(report, { undercut: 'pass' });
  });
});

function frustumVolume(w: number, d: number, h: number, deg: number): number {
  const t = Math.tan(deg * rad);
  return w * d * h - h * h * t * (w + d) + (4 / 3) * t * t * h ** 3;
}
