import ManifoldModule, { type Manifold, type ManifoldToplevel } from 'manifold-3d';
import { BufferAttribute, BufferGeometry, DoubleSide, Ray, Vector3 } from 'three';
import { MeshBVH } from 'three-mesh-bvh';
import { beforeAll, describe, expect, it } from 'vitest';
import { analyse } from '@/lib/formability/analyse';
import { scannedRabbit, teapot } from '../../../fixtures/meshes/known-models';
import { ballOnStem, box, frustum, lathe } from '../../../fixtures/meshes/solids';
import { moved, together, turned, type Triangles } from '../../../fixtures/meshes/triangles';
import { binaryStl } from '../../../fixtures/meshes/write-stl';
import { abs, missesOf, rel } from './claims';

let wasm: ManifoldToplevel;
beforeAll(async () => {
  wasm = await ManifoldModule();
  wasm.setup();
});

function solid(mesh: Triangles): Manifold {
  const made = new wasm.Mesh({
    numProp: 3,
    vertProperties: Float32Array.from(mesh),
    triVerts: Uint32Array.from({ length: mesh.length / 3 }, (_, i) => i),
  });
  made.merge();
  return new wasm.Manifold(made);
}

/** The same figures by the plain way: every hit of an upward ray through each of a grid of points. */
function byRays(mesh: Triangles, step: number) {
  const geometry = new BufferGeometry();
  geometry.setAttribute('position', new BufferAttribute(Float32Array.from(mesh), 3));
  const bvh = new MeshBVH(geometry, { indirect: true });
  geometry.computeBoundingBox();
  const { min, max } = geometry.boundingBox ?? { min: new Vector3(), max: new Vector3() };
  const ray = new Ray(new Vector3(), new Vector3(0, 0, 1));
  const topAt = (x: number, y: number): { z: number; up: boolean } | null => {
    ray.origin.set(x, y, min.z - 1);
    const hits = bvh.raycast(ray, DoubleSide);
    if (hits.length === 0) return null;
    const top = hits.reduce((a, b) => (b.point.z > a.point.z ? b : a));
    return { z: top.point.z - min.z, up: (top.face?.normal.z ?? 0) > 0 };
  };
  let [plan, under, solidVolume] = [0, 0, 0];
  for (let y = min.y + 0.43 * step; y < max.y; y += step) {
    for (let x = min.x + 0.39 * step; x < max.x; x += step) {
      ray.origin.set(x, y, min.z - 1);
      const hits = bvh
        .raycast(ray, DoubleSide)
        .map((hit) => ({ z: hit.point.z - min.z, up: (hit.face?.normal.z ?? 0) > 0 }))
        .sort((a, b) => a.z - b.z);
      // A ray through an edge is told twice.
      const once = hits.filter(
        (hit, i) => i === 0 || hit.z - hits[i - 1].z > 1e-7 || hit.up !== hits[i - 1].up,
      );
      if (once.length === 0) continue;
      plan += step * step;
      under += once[once.length - 1].z * step * step;
      for (const hit of once) solidVolume += (hit.up ? hit.z : -hit.z) * step * step;
    }
  }
  /** Area from whose facets' middles the upward ray meets the mesh again; facets below −0.25° always. */
  const shadowed = (limitDeg = -0.25) => {
    let [area, overhang] = [0, 0];
    const [a, b, c, n, at] = Array.from({ length: 5 }, () => new Vector3());
    for (let i = 0; i < mesh.length; i += 9) {
      a.fromArray(mesh, i);
      b.fromArray(mesh, i + 3);
      c.fromArray(mesh, i + 6);
      n.subVectors(b, a).cross(at.subVectors(c, a));
      const size = n.length() / 2;
      n.normalize();
      const draft = (Math.asin(n.z) * 180) / Math.PI;
      const onBed = Math.max(a.z, b.z, c.z) - min.z <= 1e-4 && n.z < 0;
      if (onBed) continue;
      at.copy(a).add(b).add(c).divideScalar(3).addScaledVector(n, 0.01);
      ray.origin.copy(at);
      if (draft < limitDeg) overhang += size;
      if (draft < limitDeg || bvh.raycastFirst(ray, DoubleSide)) area += size;
    }
    return { area, overhang };
  };
  return { plan, under, solidVolume, topAt, shadowed };
}

describe.each([
  ['a scanned rabbit', () => scannedRabbit(8)],
  ['a scanned rabbit turned by 40°', () => turned(scannedRabbit(8), 40)],
  ['a ball on a stem', () => ballOnStem(30, 10, 45, 96, 60)],
])('%s against manifold-3d and three-mesh-bvh', (_, make) => {
  const mesh = make();

  it('volume, area, plan, shadow, undercut, heights', () => {
    const { report, geometry } = analyse(binaryStl(mesh), {}, { geometryOnly: true });
    const exact = solid(mesh);
    const rays = byRays(mesh, 0.4);
    const { area, overhang } = rays.shadowed();
    expect(
      missesOf(report, {
        'mesh.volumeMm3': rel(exact.volume(), 1e-5),
        'mesh.unionVolumeMm3': rel(exact.volume(), 1e-5),
        'mesh.areaMm2': rel(exact.surfaceArea(), 1e-5),
        'mesh.watertight': true,
        'mesh.shells': 1,
        'plan.planAreaMm2': rel(rays.plan, 0.005),
        'undercut.shadowVolumeMm3': rel(rays.under - exact.volume(), 0.015),
        'undercut.overhangAreaMm2': rel(overhang, 1e-4),
        'undercut.shadowedAreaMm2': rel(area, 0.01),
      }),
    ).toEqual([]);
    expect(Math.abs(rays.solidVolume / exact.volume() - 1)).toBeLessThan(0.005);
    const { heightField: field } = geometry;
    let [far, seen] = [0, 0];
    for (let j = 3; j < field.ny; j += 17) {
      for (let i = 5; i < field.nx; i += 13) {
        const x = field.originX + (i + 0.5) * field.cellMm;
        const y = field.originY + (j + 0.5) * field.cellMm;
        const height = rays.topAt(x, y)?.z ?? 0;
        const found = field.heights[j * field.nx + i];
        if (height > 0 || found > 0) seen++;
        if (Math.abs(height - found) > 1e-3) far++;
      }
    }
    expect(seen).toBeGreaterThan(500);
    // A ray along the silhouette may fall to either side.
    expect(far / seen).toBeLessThan(0.002);
  });
});

describe('unions against manifold-3d', () => {
  it('two rabbits that run into each other', () => {
    const one = scannedRabbit(8);
    const two = moved(turned(one, 65), 21, 9, 0);
    const { report } = analyse(binaryStl(together(one, two)), {}, { geometryOnly: true });
    const union = solid(one).add(solid(two));
    expect(
      missesOf(report.mesh, {
        volumeMm3: rel(2 * solid(one).volume(), 1e-5),
        unionVolumeMm3: rel(union.volume(), 1e-4),
        shells: 2,
      }),
    ).toEqual([]);
    expect(report.mesh.warnings).toContain('overlapping_shells');
  });

  it.each([1, 2])('six bodies thrown together (linear congruential generator, seed %s)', (seed) => {
    let state = seed;
    const roll = (limit: number) => {
      state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
      return (state / 2 ** 32) * limit;
    };
    const bodies = Array.from({ length: 6 }, (_, i) => {
      const r = 8 + roll(10);
      const body =
        i % 3 === 0
          ? frustum(2 * r, 1.5 * r, 10 + roll(15), roll(8))
          : i % 3 === 1
            ? lathe([[0, 0], [r, 0], [r * 0.8, 12 + roll(9)], [0, 12 + roll(9)]], 24)
            : box(r, r, 8 + roll(20)); // prettier-ignore
      return moved(turned(body, roll(360)), roll(40), roll(40), i === 5 ? 4 + roll(5) : 0);
    });
    const { report } = analyse(binaryStl(together(...bodies)), {}, { geometryOnly: true });
    const union = bodies.map(solid).reduce((a, b) => a.add(b));
    const rays = byRays(together(...bodies), 0.4);
    expect(
      missesOf(report, {
        'mesh.unionVolumeMm3': rel(union.volume(), 1e-4),
        'mesh.volumeMm3': rel(bodies.reduce((sum, body) => sum + solid(body).volume(), 0), 1e-5),
        'plan.planAreaMm2': rel(rays.plan, 0.005),
        'undercut.shadowVolumeMm3': abs(rays.under - union.volume(), Math.max(0.003 * rays.under, 0.015 * (rays.under - union.volume()))),
      }),
    ).toEqual([]);
  }); // prettier-ignore
});

describe('the teapot: sheets that cross and do not close', () => {
  it('is told so, and seen from above as rays see it', () => {
    const mesh = teapot(30, 10);
    const { report, geometry } = analyse(binaryStl(mesh), {}, { geometryOnly: true });
    expect(report.mesh.watertight).toBe(false);
    expect(report.mesh.warnings).toContain('not_watertight');
    const rays = byRays(mesh, 0.5);
    expect(missesOf(report.plan, { planAreaMm2: rel(rays.plan, 0.01) })).toEqual([]);
    const { heightField: field } = geometry;
    let [far, seen] = [0, 0];
    for (let j = 2; j < field.ny; j += 11) {
      for (let i = 2; i < field.nx; i += 11) {
        const top = rays.topAt(
          field.originX + (i + 0.5) * field.cellMm,
          field.originY + (j + 0.5) * field.cellMm,
        );
        // Where the sheet over a place faces down, its rim is open: the engine closes it.
        if (!top?.up) continue;
        seen++;
        if (Math.abs(top.z - field.heights[j * field.nx + i]) > 0.01) far++;
      }
    }
    expect(seen).toBeGreaterThan(1000);
    expect(far / seen).toBeLessThan(0.02);
  });
});
