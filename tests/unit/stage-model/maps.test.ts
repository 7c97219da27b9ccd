import { WebIO } from '@gltf-transform/core';
import { EXTMeshoptCompression, KHRMeshQuantization } from '@gltf-transform/extensions';
import { MeshoptDecoder } from 'meshoptimizer/decoder';
import { describe, expect, it } from 'vitest';
import { decodeStageModel, NO_TRAP_MM } from '@/app/_components/stage/decode-stage-model';
import { analyse } from '@/lib/formability/analyse';
import { buildStageModel } from '@/lib/stage-model/build-stage-model';
import { areaAbove, areaBelow, totalArea } from '@/lib/stage-model/map-histogram';
import { FLAG_BED, FLAG_UNVENTED, type StageGeometry } from '@/lib/stage-model/stage-model-meta';
import { carved, rectangle } from '../../fixtures/meshes/carved';
import { openFrustum } from '../../fixtures/meshes/hollow';
import { box, lathe } from '../../fixtures/meshes/solids';
import { moved, together, type Triangles } from '../../fixtures/meshes/triangles';
import { binaryStl } from '../../fixtures/meshes/write-stl';
import { frustum, geometryOf, Soup, subdivide } from './shapes';

const engine = (mesh: Triangles | Float32Array) => analyse(binaryStl(mesh)).geometry;

/** Built, and read back by the page's own decoder: one entry a vertex. */
async function load(geometry: StageGeometry, triangleTarget?: number) {
  const { glb, meta } = await buildStageModel(geometry, triangleTarget ? { triangleTarget } : {});
  const bytes = glb.buffer.slice(glb.byteOffset, glb.byteOffset + glb.byteLength) as ArrayBuffer;
  const model = await decodeStageModel(bytes);
  const vertices = Array.from(model.draftDeg, (draftDeg, v) => ({
    at: [...model.positions.subarray(3 * v, 3 * v + 3)] as [number, number, number],
    draftDeg,
    flags: model.flags[v],
    wall: model.wallMm ? model.wallMm[v] : null,
    trap: model.trapMm ? model.trapMm[v] : null,
  }));
  return { glb, meta, model, vertices };
}

describe('wall thickness in the stage model', () => {
  it('is 3.00 mm at every vertex of the outer walls of a box whose walls are 3 mm, and 5.00 mm on its top', async () => {
    const hollow = engine(openFrustum(80, 80, 40, 0, 3, 5));
    const { vertices, meta } = await load(hollow);
    const outer = vertices.filter(
      ({ at: [x, y], draftDeg }) => Math.abs(draftDeg) < 0.1 && Math.max(Math.abs(x), Math.abs(y)) > 39,
    );
    expect(outer.length).toBeGreaterThanOrEqual(16);
    for (const { wall } of outer) expect(wall).toBeCloseTo(3, 5);
    const top = vertices.filter(({ at, draftDeg }) => at[2] > 39.9 && draftDeg > 89);
    expect(top.length).toBeGreaterThanOrEqual(4);
    for (const { wall } of top) expect(wall).toBeCloseTo(5, 5);
    const { histogram, range } = meta.maps!.wall!;
    expect(range![0]).toBeCloseTo(3, 5);
    expect(range![1]).toBeCloseTo(5, 5);
    expect(areaBelow(histogram, 3)).toBe(0);
    expect(areaBelow(histogram, 4)).toBeCloseTo(4 * 80 * 40, 1);
    expect(totalArea(histogram)).toBeCloseTo(4 * 80 * 40 + 80 * 80, 1);
  });

  it('gives no wall to the faces that the sheet does not meet', async () => {
    const { vertices } = await load(engine(openFrustum(80, 80, 40, 0, 3, 5)));
    const inner = vertices.filter(({ at: [x, y, z] }) => Math.max(Math.abs(x), Math.abs(y)) < 38 && z < 36);
    expect(inner.length).toBeGreaterThanOrEqual(8);
    for (const { wall } of inner) expect(wall).toBe(0);
  });

  /** A plate of two halves side by side in one plane, each with a wall of its own. */
  function twoHalves(left: number, right: number): StageGeometry {
    const soup = new Soup().quad([0, 0, 9], [20, 0, 9], [20, 20, 9], [0, 20, 9]);
    const geometry = geometryOf(soup.quad([20, 0, 9], [40, 0, 9], [40, 20, 9], [20, 20, 9]).done());
    return { ...geometry, facetWallMm: Float32Array.of(left, left, right, right) };
  }

  it('keeps a jump of the wall sharp, lets a slow change run, and tells thick from thick by nothing', async () => {
    const walls = async (left: number, right: number) => {
      const { vertices } = await load(twoHalves(left, right));
      return vertices.map(({ wall }) => Number(wall!.toFixed(2))).sort((a, b) => a - b);
    };
    expect(await walls(3, 8)).toEqual([3, 3, 3, 3, 8, 8, 8, 8]);
    expect(await walls(3, 3.6)).toEqual([3, 3, 3.2, 3.4, 3.6, 3.6]);
    expect(await walls(20, 40)).toEqual([20, 20, 26.67, 33.33, 40, 40]);
    expect(await walls(3, NaN)).toEqual([0, 0, 3, 3, 3, 3]);
  });

  it('shows only figures that were measured where the surface was simplified', async () => {
    const fine = engine(subdivide(Float32Array.from(openFrustum(80, 80, 40, 5, 3, 5)), 4));
    const { vertices, meta, model } = await load(fine, 800);
    expect(meta.triangles).toBeLessThanOrEqual(960);
    const used = new Set(model.index);
    const measured = [...fine.facetWallMm].filter((mm) => mm > 0);
    const [low, high] = [Math.min(...measured), Math.max(...measured)];
    const shown = vertices.filter(({ wall }, v) => used.has(v) && wall! > 0);
    expect(shown.length).toBeGreaterThan(8);
    for (const { wall } of shown) {
      expect(wall).toBeGreaterThanOrEqual(low - 0.006);
      expect(wall).toBeLessThanOrEqual(high + 0.006);
    }
  });
});

describe('pocket depth in the stage model', () => {
  const profile = (bore: number): [number, number][] => [
    [bore, 0],
    [40, 0],
    [40, 30],
    [20, 30],
    [15, 10],
    [bore, 10],
  ];
  const cup = (bore: number) => lathe(bore > 0 ? profile(bore) : [[0, 0], ...profile(0).slice(1)], 64);

  it('is each vertex’s own depth below the rim, on floor and walls alike, and none elsewhere', async () => {
    const { vertices, meta } = await load(engine(cup(0)));
    const inside = vertices.filter(({ trap }) => trap! > NO_TRAP_MM);
    expect(inside.length).toBeGreaterThan(64 * 2);
    for (const { at, trap, flags } of inside) {
      expect(Math.hypot(at[0], at[1])).toBeLessThan(20.1);
      expect(trap).toBeCloseTo(30 - at[2], 2);
      expect(flags & FLAG_UNVENTED).toBe(FLAG_UNVENTED);
    }
    for (const { at, draftDeg, flags } of vertices.filter(({ trap }) => trap! <= NO_TRAP_MM)) {
      expect(Math.hypot(at[0], at[1]) > 19.9 || (flags & FLAG_BED) === FLAG_BED || draftDeg < -1).toBe(true);
      expect(flags & FLAG_UNVENTED).toBe(0);
    }
    const { range, histogram, unventedMm2 } = meta.maps!.trap!;
    expect(range).toEqual([0, 20]);
    const k = 64 * Math.sin(Math.PI / 64);
    const floor = k * Math.cos(Math.PI / 64) * 15 * 15;
    const slant = Math.hypot(20, 5 * Math.cos(Math.PI / 64));
    const wall = k * (15 + 20) * slant;
    expect(totalArea(histogram) / (floor + wall)).toBeCloseTo(1, 3);
    expect(unventedMm2).toBeCloseTo(totalArea(histogram), 3);
    expect(areaAbove(histogram, 19.3)).toBeGreaterThan(floor);
  });

  it('is the same with a vent, but nothing is marked as closed', async () => {
    const { vertices, meta } = await load(engine(cup(0.4)));
    expect(Math.max(...vertices.map(({ trap }) => trap!))).toBeCloseTo(20, 2);
    expect(vertices.every(({ flags }) => (flags & FLAG_UNVENTED) === 0)).toBe(true);
    expect(meta.maps!.trap!.unventedMm2).toBe(0);
  });

  it('runs on above the rim where a wall stands out of the moat, so that it reads right between its ends', async () => {
    const moat = carved(rectangle(120, 120), 15, [{ ring: rectangle(80, 80), z: 5 }]);
    const { vertices, meta } = await load(engine(together(moat, moved(box(30, 30, 45), 0, 0, 5))));
    const tower = vertices.filter(
      ({ at, draftDeg }) => Math.max(Math.abs(at[0]), Math.abs(at[1])) < 15.1 && Math.abs(draftDeg) < 0.1,
    );
    expect(new Set(tower.map(({ trap }) => Math.round(trap!)))).toEqual(new Set([10, -35]));
    expect(meta.maps!.trap!.range).toEqual([0, 10]);
    // The moat's floor runs on under the tower, which only stands on it.
    const whole = 80 * 80 + 4 * 80 * 10 + 4 * 30 * 10;
    expect(totalArea(meta.maps!.trap!.histogram) / whole).toBeCloseTo(1, 3);
  });

  it('is not in the file of a part without pockets, and its record says so', async () => {
    const { model, meta } = await load(engine(frustum(60, 30, 5)));
    expect(model.trapMm).toBeNull();
    expect(meta.maps!.trap).toMatchObject({ range: null, unventedMm2: 0 });
  });
});

describe('the record of the maps', () => {
  it('is of schema 2, and tells attribute, unit, step and range in the file as well', async () => {
    const { glb, meta } = await load(engine(openFrustum(80, 80, 40, 5, 3, 5)));
    expect(meta.schema).toBe(2);
    await MeshoptDecoder.ready;
    const io = new WebIO()
      .registerExtensions([EXTMeshoptCompression, KHRMeshQuantization])
      .registerDependencies({ 'meshopt.decoder': MeshoptDecoder });
    const mesh = (await io.readBinary(glb)).getRoot().listMeshes()[0];
    const wall = mesh.listPrimitives()[0].getAttribute('_WALL')!;
    expect(wall.getArray()).toBeInstanceOf(Uint16Array);
    expect(mesh.getExtras()).toMatchObject({
      wall: { attribute: '_WALL', unit: 'mm', step: 0.01, none: 0, range: meta.maps!.wall!.range },
      trap: { attribute: '_TRAP', unit: 'mm', step: 0.01, none: -32768, range: null },
      layers: { attribute: '_DRAFT', range: meta.maps!.layers.range },
    });
  });

  it('counts layer lines by |n_z|: all walls of a frustum at sin 5°, its flat top and its bed at none', async () => {
    const { meta } = await load(geometryOf(frustum(60, 30, 5)));
    const { range, histogram } = meta.maps!.layers;
    const sin5 = Math.sin((5 * Math.PI) / 180);
    expect(range!.map((share) => share / sin5)).toEqual([expect.closeTo(1, 4), expect.closeTo(1, 4)]);
    const top = 60 - 60 * Math.tan((5 * Math.PI) / 180);
    const walls = (4 * ((60 + top) / 2) * 30) / Math.cos((5 * Math.PI) / 180);
    expect(totalArea(histogram)).toBeCloseTo(walls, 1);
    expect(areaAbove(histogram, 0.1)).toBeCloseTo(0, 6);
    expect(areaAbove(histogram, 0.08)).toBeCloseTo(walls, 1);
  });

  it('leaves the inside of a hollow, which looks down and is no undercut, out of the draft figures', async () => {
    const { meta } = await load(engine(openFrustum(80, 80, 40, 5, 3, 5)));
    const top = 80 - 80 * Math.tan((5 * Math.PI) / 180);
    const walls = (4 * ((80 + top) / 2) * 40) / Math.cos((5 * Math.PI) / 180);
    expect(meta.draftRangeDeg[0]).toBeCloseTo(5, 3);
    expect(meta.histogram.areaMm2.reduce((a, b) => a + b, 0) / (walls + top * top)).toBeCloseTo(1, 4);
    expect(meta.areaMm2.undercut).toBe(0);
  });

  it('leaves out what nobody measured, and refuses figures that do not fit the facets', async () => {
    const plain = geometryOf(frustum(60, 30, 5));
    const { model, meta } = await load(plain);
    expect(model.wallMm).toBeNull();
    expect(Object.keys(meta.maps!)).toEqual(['layers']);
    await expect(buildStageModel({ ...plain, facetWallMm: new Float32Array(3) })).rejects.toThrow(
      /16 facets, 3 figures of facetWallMm/,
    );
  });
});
