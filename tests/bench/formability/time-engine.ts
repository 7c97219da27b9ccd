import { readFileSync } from 'node:fs';
import { analyse } from '@/lib/formability/analyse';
import { buildColumns } from '@/lib/formability/dexel/columns';
import { makeGrid } from '@/lib/formability/dexel/grid';
import { rasterise } from '@/lib/formability/dexel/raster';
import { prepareMesh } from '@/lib/formability/mesh/prepare-mesh';
import { readMesh } from '@/lib/formability/parse/read-mesh';

export interface EngineTimes {
  triangles: number;
  nx: number;
  ny: number;
  /** With physics and advice. */
  bestMs: number;
  cpuMs: number;
  /** Without. */
  geometryMs: number;
  geometryCpuMs: number;
  columnsMs: number;
  hits: number;
  peakMB: number;
  stages: Record<string, number>;
}

const ROUNDS = 5;

function timeEngine(file: string): EngineTimes {
  const { buffer, byteOffset, byteLength } = readFileSync(file);
  const bytes = new Uint8Array(buffer, byteOffset, byteLength);
  const whole = timeReport(bytes, false);
  const geometry = timeReport(bytes, true);
  const peakMB = process.resourceUsage().maxRSS / 1024;
  const { columnsMs, hits } = timeColumns(bytes, whole.field.cellMm);
  return {
    triangles: (bytes.length - 84) / 50,
    nx: whole.field.nx,
    ny: whole.field.ny,
    bestMs: whole.bestMs,
    cpuMs: whole.cpuMs,
    geometryMs: geometry.bestMs,
    geometryCpuMs: geometry.cpuMs,
    columnsMs,
    hits,
    peakMB,
    stages: whole.stages,
  };
}

function timeReport(bytes: Uint8Array, geometryOnly: boolean) {
  let bestMs = Infinity;
  let cpuMs = Infinity;
  let stages: Record<string, number> = {};
  let field = { nx: 0, ny: 0, cellMm: 0 };
  for (let round = 0; round < ROUNDS; round++) {
    const cpu = process.cpuUsage();
    const began = performance.now();
    const { report, geometry } = analyse(bytes, {}, { now: () => performance.now(), geometryOnly });
    const took = performance.now() - began;
    const used = process.cpuUsage(cpu);
    cpuMs = Math.min(cpuMs, (used.user + used.system) / 1000);
    if (took >= bestMs) continue;
    bestMs = took;
    stages = report.timings;
    field = geometry.heightField;
  }
  return { bestMs, cpuMs, stages, field };
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

process.stdout.write(JSON.stringify(timeEngine(process.argv[2])));
