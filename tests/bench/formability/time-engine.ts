import { analyse } from '@/lib/formability/analyse';
import { buildColumns } from '@/lib/formability/dexel/columns';
import { makeGrid } from '@/lib/formability/dexel/grid';
import { rasterise } from '@/lib/formability/dexel/raster';
import { prepareMesh } from '@/lib/formability/mesh/prepare-mesh';
import { readMesh } from '@/lib/formability/parse/read-mesh';
import { binaryStl } from '../../fixtures/meshes/write-stl';
import { benchMesh } from './bench-mesh';

export interface EngineTimes {
  triangles: number;
  nx: number;
  ny: number;
  bestMs: number;
  cpuMs: number;
  columnsMs: number;
  hits: number;
  peakMB: number;
  stages: Record<string, number>;
}

const ROUNDS = 5;

function timeEngine(size: number, order: 'ordered' | 'shuffled'): EngineTimes {
  const bytes = binaryStl(Float32Array.from(benchMesh(size, order)));
  let bestMs = Infinity;
  let cpuMs = Infinity;
  let stages: Record<string, number> = {};
  let field = { nx: 0, ny: 0, cellMm: 0 };
  for (let round = 0; round < ROUNDS; round++) {
    const cpu = process.cpuUsage();
    const began = performance.now();
    const { report, geometry } = analyse(bytes, {}, { now: () => performance.now() });
    const took = performance.now() - began;
    const used = process.cpuUsage(cpu);
    cpuMs = Math.min(cpuMs, (used.user + used.system) / 1000);
    if (took >= bestMs) continue;
    bestMs = took;
    stages = report.timings;
    field = geometry.heightField;
  }
  const peakMB = process.resourceUsage().maxRSS / 1024;
  const { columnsMs, hits } = timeColumns(bytes, field.cellMm);
  const triangles = (bytes.length - 84) / 50;
  return { triangles, nx: field.nx, ny: field.ny, bestMs, cpuMs, columnsMs, hits, peakMB, stages };
}

/** The core alone: raster of both passes, sort, winding, intervals. */
function timeColumns(bytes: Uint8Array, cellMm: number): { columnsMs: number; hits: number } {
  const { mesh, shells, min, max } = prepareMesh(readMesh(bytes), {
    mmPerUnit: 1,
    up: [0, 0, 1],
    dropToBed: true,
  });
  const { centre } = mesh;
  const grid = makeGrid(
    [min[0] - centre[0], min[1] - centre[1]],
    [max[0] - centre[0], max[1] - centre[1]],
    cellMm,
  );
  let columnsMs = Infinity;
  let hits = 0;
  for (let round = 0; round < ROUNDS; round++) {
    const began = performance.now();
    const found = rasterise(mesh, grid, 0);
    hits = found.z.length;
    buildColumns(found, grid, shells.ofFacet);
    columnsMs = Math.min(columnsMs, performance.now() - began);
  }
  return { columnsMs, hits };
}

const [size, order] = process.argv.slice(2);
process.stdout.write(JSON.stringify(timeEngine(Number(size), order as 'ordered' | 'shuffled')));
