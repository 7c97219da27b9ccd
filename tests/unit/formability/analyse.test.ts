import fc from 'fast-check';
import { BufferAttribute, BufferGeometry, DoubleSide, Ray, Vector3 } from 'three';
import { MeshBVH } from 'three-mesh-bvh';
import { describe, expect, it } from 'vitest';
import { analyse } from '@/lib/formability/analyse';
import { ENGINE_VERSION } from '@/lib/formability/version';
import type { Report } from '@/lib/formability/report';
import { ballOnStem, frustum, lathe } from '../../fixtures/meshes/solids';
import { moved, reordered, scaled, together, turned, type Triangles } from '../../fixtures/meshes/triangles';
import { asciiStl, binaryStl } from '../../fixtures/meshes/write-stl';
import { refusal, reportOn } from './run-engine';

/** Numbers in 0 … 1 from a seed (mulberry32). */
function random(seed: number): () => number {
  let state = seed;
  return () => {
    state = (state + 0x6d2b79f5) | 0;
    let t = Math.imul(state ^ (state >>> 15), 1 | state);
    t = (t + Math.imul(t ^ (t >>> 7), 61 | t)) ^ t;
    return ((t ^ (t >>> 14)) >>> 0) / 2 ** 32;
  };
}

function shuffled(mesh: Triangles, seed: number): Triangles {
  const next = random(seed);
  const order = Array.from({ length: mesh.length / 9 }, (_, i) => i);
  for (let i = order.length - 1; i > 0; i--) {
    const j = Math.floor(next() * (i + 1));
    [order[i], order[j]] = [order[j], order[i]];
  }
  return reordered(mesh, order);
}

/** A template with a bit of everything: pocket with a vent, a tower beside it, an undercut knob. */
function everything(): Triangles {
  const cup = lathe([[0.5, 0], [30, 0], [26, 25], [14, 25], [11, 8], [0.5, 8]], 48); // prettier-ignore
  return together(
    cup,
    moved(frustum(20, 30, 18, 6), 55, 0, 0),
    moved(ballOnStem(8, 4, 12, 40, 24), -50, 10, 0),
  );
}

function figures(report: Report): number[] {
  const { mesh, draft, plan, undercut, airTraps, vents, spacing, layers, print } = report;
  return [
    mesh.volumeMm3, mesh.areaMm2, mesh.bedContactAreaMm2, mesh.shells,
    draft.minUpFacingDeg ?? 0, draft.verticalAreaMm2,
    plan.planAreaMm2, plan.formedAreaMm2, plan.depthRatio,
    undercut.overhangAreaMm2, undercut.shadowedAreaMm2, undercut.undercutVolumeMm3, undercut.maxDepthMm,
    airTraps.length, airTraps[0].volumeMm3, vents.length, vents[0].diameterMm, spacing.length,
    layers.cuspMaxMm, layers.cuspMedianMm, print.materialMm3,
  ]; // prettier-ignore
}

function expectNear(found: Report, expected: Report, share: number): void {
  const [a, b] = [figures(found), figures(expected)];
  a.forEach((value, i) => expect(Math.abs(value - b[i]), `figure ${i}: ${value} against ${b[i]}`).toBeLessThanOrEqual(share * Math.max(1, Math.abs(b[i])))); // prettier-ignore
}

describe('the same input gives the same bits', () => {
  const bytes = binaryStl(everything());
  it('twice, with other work between', () => {
    const first = analyse(bytes);
    reportOn(frustum(60, 40, 20, 3));
    const second = analyse(bytes);
    expect(JSON.stringify(second.report)).toBe(JSON.stringify(first.report));
    for (const key of ['positions', 'facetDraftDeg', 'facetFlags'] as const) {
      expect(
        Buffer.compare(Buffer.from(first.geometry[key].buffer), Buffer.from(second.geometry[key].buffer)),
      ).toBe(0);
    }
    expect(second.geometry.heightField).toEqual(first.geometry.heightField);
  });

  it('without a clock there are no timings; with one only they differ', () => {
    const coarse = { grid: { cellMm: 0.5 } };
    const plain = analyse(bytes, coarse).report;
    let now = 0;
    const timed = analyse(bytes, coarse, { now: () => (now += 5) }).report;
    expect(plain.timings).toEqual({});
    expect(Object.keys(timed.timings)).toContain('parseMs');
    expect({ ...timed, timings: {} }).toEqual(plain);
  });

  it('leaves the bytes and the recipe it was given alone', () => {
    const copy = bytes.slice();
    const recipe = { grid: { cellMm: 0.5 }, limits: { draftMinDeg: 4 } };
    analyse(bytes, recipe);
    expect(Buffer.compare(Buffer.from(bytes), Buffer.from(copy))).toBe(0);
    expect(recipe).toEqual({ grid: { cellMm: 0.5 }, limits: { draftMinDeg: 4 } });
  });
});

describe('the figures hang on the shape only', () => {
  const mesh = everything();
  const base = reportOn(mesh);

  it('not on the order of facets (seed 11)', () => expectNear(reportOn(shuffled(mesh, 11)), base, 1e-6));
  it('not on the corner a facet begins with', () => {
    const rolled: Triangles = [];
    for (let i = 0; i < mesh.length; i += 9)
      rolled.push(...mesh.slice(i + 3, i + 9), ...mesh.slice(i, i + 3));
    expectNear(reportOn(rolled), base, 1e-6);
  });
  it('not on binary or ASCII', () => {
    const ascii = analyse(asciiStl(mesh)).report;
    expect({ ...ascii, input: base.input }).toEqual(base);
  });
  it('not on the place on the bed', () => expectNear(reportOn(moved(mesh, 37.7, -12.3, 8)), base, 0.005));
  it('not on the unit', () => {
    expectNear(reportOn(scaled(mesh, 1 / 25.4), { mesh: { unit: 'in' } }), base, 1e-3);
    expectNear(reportOn(scaled(mesh, 1000), { mesh: { unit: 'micron' } }), base, 1e-3);
  });
  it('not on a turn about the pull direction, frame and grid aside', () => {
    const frame = { machine: { frameMm: [220, 220] as [number, number] } };
    expectNear(reportOn(turned(mesh, 30), frame), reportOn(mesh, frame), 0.015);
  });
  it('reports places in the file’s own frame', () => {
    const there = reportOn(moved(mesh, 1000, 2000, 0));
    expect(there.vents[0].at[0] - base.vents[0].at[0]).toBeCloseTo(1000, 2);
    expect(there.airTraps[0].floor[1] - base.airTraps[0].floor[1]).toBeCloseTo(2000, 0);
    expect(there.undercut.regions[0].at[0]).toBeGreaterThan(900);
  });
});

describe('property: any frustum (fast-check, seed 20)', () => {
  it('has its draft, its volume, no undercut, no trap', () => {
    const side = fc.integer({ min: 40, max: 200 });
    const deg = fc.integer({ min: 5, max: 200 }).map((n) => n / 10);
    fc.assert(
      fc.property(
        side,
        side,
        fc.integer({ min: 5, max: 60 }),
        deg,
        fc.integer({ min: 0, max: 359 }),
        (w, d, h, a, turn) => {
          const inset = h * Math.tan((a * Math.PI) / 180);
          fc.pre(2 * inset < Math.min(w, d) - 2);
          const bytes = binaryStl(turned(frustum(w, d, h, a), turn));
          const { report } = analyse(bytes, { grid: { cellMm: 1 } }, { geometryOnly: true });
          const { draft, mesh, undercut, airTraps, plan } = report;
          const volume = h * (w * d - inset * (w + d) + (4 * inset * inset) / 3);
          expect(Math.abs((draft.minUpFacingDeg ?? 0) - a)).toBeLessThan(0.02);
          expect(Math.abs(mesh.volumeMm3 / volume - 1)).toBeLessThan(1e-5);
          expect(Math.abs(plan.planAreaMm2 / (w * d) - 1)).toBeLessThan(0.005);
          expect([undercut.undercutVolumeMm3, undercut.shadowVolumeMm3, airTraps.length]).toEqual([0, 0, 0]);
        },
      ),
      { seed: 20, numRuns: 60 },
    );
  });
});

describe('against three-mesh-bvh rays', () => {
  it('heights of a ball on a stem agree at 400 cell centres (seed 3), where a ray grazes no edge', () => {
    const mesh = ballOnStem(20, 6, 26, 90, 60);
    const { heightField } = analyse(binaryStl(mesh)).geometry;
    const geometry = new BufferGeometry();
    geometry.setAttribute('position', new BufferAttribute(Float32Array.from(mesh), 3));
    const bvh = new MeshBVH(geometry);
    const next = random(3);
    let hits = 0;
    for (let n = 0; n < 400; n++) {
      const i = Math.floor(next() * heightField.nx);
      const j = Math.floor(next() * heightField.ny);
      const x = heightField.originX + (i + 0.5) * heightField.cellMm;
      const y = heightField.originY + (j + 0.5) * heightField.cellMm;
      const hit = bvh.raycastFirst(new Ray(new Vector3(x, y, 100), new Vector3(0, 0, -1)), DoubleSide);
      const height = heightField.heights[j * heightField.nx + i];
      expect(Math.abs(height - (hit ? hit.point.z : 0)), `at ${x}, ${y}`).toBeLessThan(2e-3);
      if (hit) hits++;
    }
    expect(hits).toBeGreaterThan(250);
  });
});

describe('what the page’s derivative is made of', () => {
  const { geometry, report } = analyse(binaryStl(everything()));

  it('has 9 coordinates, one draft and one flag a facet, oriented and on the bed', () => {
    expect(geometry.positions).toHaveLength(9 * report.input.triangles);
    expect(geometry.facetDraftDeg).toHaveLength(report.input.triangles);
    expect(geometry.facetFlags).toHaveLength(report.input.triangles);
    const p = geometry.positions;
    let volume = 0;
    for (let i = 0; i < p.length; i += 9) {
      const cross = [p[i + 4] * p[i + 8] - p[i + 5] * p[i + 7], p[i + 5] * p[i + 6] - p[i + 3] * p[i + 8], p[i + 3] * p[i + 7] - p[i + 4] * p[i + 6]]; // prettier-ignore
      volume += (p[i] * cross[0] + p[i + 1] * cross[1] + p[i + 2] * cross[2]) / 6;
    }
    expect(volume / report.mesh.volumeMm3).toBeCloseTo(1, 4);
    expect(p.reduce((least, z, k) => (k % 3 === 2 ? Math.min(least, z) : least), Infinity)).toBe(0);
  });

  it('flags the bed and the undercut', () => {
    const area = (flag: number) =>
      geometry.facetFlags.reduce((sum, flags, t) => {
        if (!(flags & flag)) return sum;
        const [a, b, c] = [0, 3, 6].map((k) => new Vector3().fromArray(geometry.positions, 9 * t + k));
        return sum + b.sub(a).cross(c.sub(a)).length() / 2;
      }, 0);
    expect(area(1) / report.mesh.bedContactAreaMm2).toBeCloseTo(1, 4);
    expect(area(2) / report.undercut.shadowedAreaMm2).toBeCloseTo(1, 1);
  });

  it('has a height field that covers the box', () => {
    const { cellMm, nx, ny, originX, originY, heights } = geometry.heightField;
    const { min, max } = report.mesh.boundsMm;
    expect(heights).toHaveLength(nx * ny);
    expect(Math.max(nx, ny)).toBeLessThanOrEqual(1024);
    expect(originX).toBeLessThanOrEqual(min[0]);
    expect(originY).toBeLessThanOrEqual(min[1]);
    expect(originX + nx * cellMm).toBeGreaterThanOrEqual(max[0] - 1e-6);
    expect(originY + ny * cellMm).toBeGreaterThanOrEqual(max[1] - 1e-6);
    expect(heights.reduce((most, z) => Math.max(most, z), 0)).toBeCloseTo(25, 5);
  });
});

describe('running', () => {
  const bytes = binaryStl(frustum(60, 40, 20, 5));

  it('tells its stages, rising to 1', () => {
    const seen: [string, number][] = [];
    analyse(bytes, {}, { onProgress: (stage, fraction) => seen.push([stage, fraction]) });
    expect(seen.map(([stage]) => stage)).toEqual(['parse', 'mesh', 'columns', 'vents', 'air', 'undercut', 'sort', 'pits', 'facets', 'walls', 'draft', 'sections', 'physics', 'checks', 'advice', 'geometry', 'done']); // prettier-ignore
    seen.forEach(([, fraction], i) => expect(fraction).toBeGreaterThanOrEqual(i === 0 ? 0 : seen[i - 1][1]));
    expect(seen.at(-1)?.[1]).toBe(1);
  });

  it('stops between stages when asked', () => {
    let asked = 0;
    const found = refusal(() => analyse(bytes, {}, { shouldStop: () => ++asked > 3 }));
    expect(found).toMatchObject({ code: 'stopped' });
    expect(found.message).toContain('vents');
  });

  it('names the input it reports on', () => {
    const { report } = analyse(bytes);
    expect(report).toMatchObject({ schema: 1, engine: ENGINE_VERSION, input: { bytes: 684, format: 'stl-binary', unit: 'mm', triangles: 12 } }); // prettier-ignore
    expect(report.input.sha256).toMatch(/^[0-9a-f]{64}$/);
  });

  it('bounds its memory: 20,000 stacked sheets over one plan do not make 20 billion hits', () => {
    const stack: Triangles = [];
    for (let k = 0; k < 20_000; k++) {
      const z = k * 0.005;
      stack.push(0, 0, z, 100, 0, z, 0, 100, z);
    }
    const { report } = analyse(binaryStl(stack));
    expect(report.mesh.watertight).toBe(false);
    expect(report.recipe.grid.cellMm).toBeGreaterThan(1);
  });
});
