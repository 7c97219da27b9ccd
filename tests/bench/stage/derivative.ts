import { gzipSync } from 'node:zlib';
import { analyse } from '@/lib/formability/analyse';
import { buildStageModel } from '@/lib/stage-model/build-stage-model';
import { renderPicture, THUMBNAIL_SIZE } from '@/lib/stage-model/render-picture';
import { cutSection } from '@/lib/stage-model/section';
import { lathe } from '../../fixtures/meshes/solids';
import { binaryStl } from '../../fixtures/meshes/write-stl';
import { hemisphere, roughen, subdivide, tray } from '../../unit/stage-model/shapes';

interface BenchRow {
  what: string;
  measured: number;
  unit: string;
  /** the most that is allowed, where the budget is not the machine's */
  budget?: number;
  ok?: boolean;
}

/** Stage model of meshes from 5 k to 1.5 M triangles: with the engine's maps: size against the budget of 6 MB, times as measured; prints a table. */
export async function run(): Promise<void> {
  const shapes: [string, Float32Array][] = [
    ['tray', tray()],
    ['dome of 980 k', hemisphere(60, 350)],
    ['cup with a pocket, 819 k', subdivide(cup(), 4)],
    ['tray with scan noise, 1.5 M', roughen(subdivide(tray({ segments: 120 }), 4), 0.02, 3)],
  ];
  const rows: BenchRow[] = [];
  const row = (what: string, measured: number, unit: string, budget?: number) =>
    rows.push({ what, measured, unit, budget, ok: budget === undefined ? undefined : measured <= budget });
  for (const [name, positions] of shapes) {
    const { geometry } = analyse(binaryStl(positions));
    const { facetWallMm: _wall, facetSpillMm: _spill, ...withoutMaps } = geometry;
    const [{ glb, meta }, build] = await timed(() => buildStageModel(geometry));
    row(`${name}: build`, build.wallMs, 'ms');
    row(`${name}: build, processor time`, build.cpuMs, 'ms');
    row(`${name}: size`, glb.byteLength / 1e6, 'MB', 6);
    const bare = await buildStageModel(withoutMaps);
    row(`${name}: of it for walls and pockets`, (glb.byteLength - bare.glb.byteLength) / 1e6, 'MB');
    row(`${name}: size as gzip`, gzipSync(glb).byteLength / 1e6, 'MB');
    row(`${name}: triangles shown`, meta.triangles, '', 300_000);
    row(`${name}: surface moved at most`, meta.simplificationErrorMm, 'mm');
    row(`${name}: picture`, (await timed(() => renderPicture(geometry)))[1].cpuMs, 'ms of processor');
    row(
      `${name}: picture for lists`,
      (await timed(() => renderPicture(geometry, THUMBNAIL_SIZE)))[1].cpuMs,
      'ms of processor',
    );
    row(
      `${name}: one cut`,
      (await timed(() => cutSection(geometry, { axis: 'y', atMm: -29.3 })))[1].cpuMs,
      'ms of processor',
    );
  }
  console.log('stage model');
  for (const { what, measured, unit, budget, ok } of rows) {
    const verdict = budget === undefined ? '' : `at most ${budget}: ${ok ? 'kept' : 'BROKEN'}`;
    console.log(`  ${what.padEnd(48)}${measured.toFixed(3).padStart(12)} ${unit.padEnd(16)} ${verdict}`);
  }
  if (rows.some((r) => r.ok === false)) process.exitCode = 1;
}

/** A pocket 40 mm deep in a drafted block with walls of its own: every map has something to tell. */
function cup(): Float32Array {
  const profile: [number, number][] = [[0, 0], [60, 0], [52, 50], [35, 50], [25, 10], [0, 10]]; // prettier-ignore
  return Float32Array.from(lathe(profile, 400));
}

async function timed<T>(work: () => T | Promise<T>): Promise<[T, { wallMs: number; cpuMs: number }]> {
  const [start, cpu] = [performance.now(), process.cpuUsage()];
  const result = await work();
  const { user, system } = process.cpuUsage(cpu);
  return [result, { wallMs: performance.now() - start, cpuMs: (user + system) / 1000 }];
}
