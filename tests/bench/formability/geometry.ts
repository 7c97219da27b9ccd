import { spawnSync } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { binaryStl } from '../../fixtures/meshes/write-stl';
import { benchMesh } from './bench-mesh';
import type { EngineTimes } from './time-engine';
import type { RayTimes } from './time-rays';

const HERE = path.dirname(fileURLToPath(import.meta.url));
const SIZES = [100_000, 1_000_000];
/** Taken as well with `--large`. */
const LARGE = 4_000_000;

/** Each measurement has a process of its own, so that memory is its own and no heat is inherited. */
function measure<T>(script: string, ...args: (string | number)[]): T {
  const done = spawnSync(
    process.execPath,
    ['--import', 'tsx', path.join(HERE, script), ...args.map(String)],
    {
      cwd: path.resolve(HERE, '../../..'),
      encoding: 'utf8',
      maxBuffer: 1 << 26,
    },
  );
  if (done.status !== 0) throw new Error(`${script} ${args.join(' ')} failed: ${done.stderr}`);
  return JSON.parse(done.stdout) as T;
}

function row(...cells: (string | number)[]): string {
  return cells.map((cell, i) => (i === 0 ? String(cell).padEnd(34) : String(cell).padStart(14))).join('');
}

const ms = (value: number) => `${value.toFixed(0)} ms`;
const times = (value: number) => `${value.toFixed(1)} ×`;

/** The engine on a file of its own, so that making the mesh is no part of its memory. */
function timeEngine(folder: string, size: number, order: 'ordered' | 'shuffled'): EngineTimes {
  const file = path.join(folder, `${size}-${order}.stl`);
  writeFileSync(file, binaryStl(Float32Array.from(benchMesh(size, order))));
  const found = measure<EngineTimes>('time-engine.ts', file);
  rmSync(file);
  return found;
}

/**
 * Binary STL in memory → full geometric report, with and without physics and advice, against a plain three-mesh-bvh ray
 * grid (build, then every hit of one ray a cell) over the same cells in the same run. Prints a table; times are the best
 * of five, processor time beside, for machines that do other things as well. `--large` adds four million facets.
 *
 * All in one thread: a server gives each thread of its pool a part, and a second thread for one part would take the core
 * of another. A young generation of 64 MB was no faster and took 100 MB more; what else lost is told in `analyse`.
 */
export function run(): void {
  const sizes = process.argv.includes('--large') ? [...SIZES, LARGE] : SIZES;
  const folder = mkdtempSync(path.join(tmpdir(), 'bench-'));
  const measured = (size: number) => ({
    ordered: timeEngine(folder, size, 'ordered'),
    shuffled: timeEngine(folder, size, 'shuffled'),
    rays: measure<RayTimes>('time-rays.ts', size),
  });
  let found: ReturnType<typeof measured>[];
  try {
    found = sizes.map(measured);
  } finally {
    rmSync(folder, { recursive: true });
  }
  const line = (label: string, value: (one: (typeof found)[number]) => string) =>
    console.log(row(label, ...found.map(value)));
  console.log('\nformability: geometry of a ball on a stem');
  line('facets', (one) => one.ordered.triangles.toLocaleString('en'));
  line('grid', (one) => `${one.ordered.nx} × ${one.ordered.ny}`);
  for (const stage of Object.keys(found[0].ordered.stages)) {
    line(`  ${stage.replace(/Ms$/, '')}`, (one) => ms(one.ordered.stages[stage]));
  }
  line('geometric report alone, best', (one) => ms(one.ordered.geometryMs));
  line('geometric report, processor time', (one) => ms(one.ordered.geometryCpuMs));
  line('with physics and advice, best', (one) => ms(one.ordered.bestMs));
  line('the same, processor time', (one) => ms(one.ordered.cpuMs));
  line('facets in random order, best', (one) => ms(one.shuffled.bestMs));
  line('  against ordered', (one) => times(one.shuffled.bestMs / one.ordered.bestMs));
  line('peak memory', (one) => `${one.ordered.peakMB.toFixed(0)} MB`);
  line('columns: raster, sort, intervals', (one) => ms(one.ordered.columnsMs));
  line('three-mesh-bvh: build', (one) => ms(one.rays.buildMs));
  line('three-mesh-bvh: all hits a cell', (one) => ms(one.rays.raysMs));
  line('rays / columns', (one) => times((one.rays.buildMs + one.rays.raysMs) / one.ordered.columnsMs));
  line('hits: columns', (one) => one.ordered.hits.toLocaleString('en'));
  line('hits: rays', (one) => one.rays.hits.toLocaleString('en'));
}

if (process.argv[1] === fileURLToPath(import.meta.url)) run();
