import { spawn } from 'node:child_process';
import { readdirSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { Worker } from 'node:worker_threads';
import { describe, expect, it } from 'vitest';
import { analyse } from '@/lib/formability/analyse';
import { analyseFile } from '@/lib/formability/analyse-file';
import { inspectFile } from '@/lib/formability/inspect';
import { loadMesh } from '@/lib/formability/parse/load-mesh';
import { MAX_STEP_BYTES } from '@/lib/formability/parse/size-caps';
import { isStep } from '@/lib/formability/parse/sniff-format';
import { UnusableInput } from '@/lib/formability/unusable-input';
import { frustum } from '../../../../fixtures/meshes/solids';
import { plain3mf } from '../../../../fixtures/meshes/write-3mf';
import { binaryStl } from '../../../../fixtures/meshes/write-stl';
import { cylindersStep, frustumStep } from '../../../../fixtures/meshes/write-step';
import { dice } from '../../dice';

const sampleFolder = fileURLToPath(new URL('../test/testfiles', import.meta.resolve('occt-import-js')));
const sample = (name: string) => readFileSync(path.join(sampleFolder, name));
const text = (value: string) => new TextEncoder().encode(value);
const edited = (bytes: Uint8Array, from: string | RegExp, to: string) =>
  text(new TextDecoder().decode(bytes).replace(from, to));

async function refusal(work: Promise<unknown>): Promise<UnusableInput> {
  const error = await work.then(
    () => null,
    (found: unknown) => found,
  );
  if (!(error instanceof UnusableInput)) throw error ?? new Error('the input was taken');
  expect(error.message).not.toContain('\n');
  return error;
}

// 60 × 40 × 20 mm at 5°: V = h (w d − s (w + d) + 4 s² / 3), s = h tan 5°.
const inset = 20 * Math.tan((5 * Math.PI) / 180);
const volume = 20 * (60 * 40 - inset * 100 + (4 * inset * inset) / 3);
const block = frustumStep(60, 40, 20, 5);

describe('a STEP file', { timeout: 120_000 }, () => {
  it('gives the figures that the same shape gives as 3MF and STL', async () => {
    const { report } = await analyseFile(block);
    const mesh = frustum(60, 40, 20, 5);
    const [as3mf, asStl] = [plain3mf(mesh), binaryStl(mesh)].map((bytes) => analyse(bytes).report);
    expect(report.input).toMatchObject({ format: 'step', unit: 'mm', triangles: 12, bodies: 1, bytes: block.length }); // prettier-ignore
    expect(report.mesh).toMatchObject({ watertight: true, shells: 1, warnings: [], repairs: [] });
    for (const other of [as3mf, asStl]) {
      expect(report.mesh.volumeMm3 / other.mesh.volumeMm3).toBeCloseTo(1, 5);
      expect(report.mesh.areaMm2 / other.mesh.areaMm2).toBeCloseTo(1, 5);
      expect(report.draft.minUpFacingDeg).toBeCloseTo(other.draft.minUpFacingDeg ?? NaN, 4);
      expect(report.plan.planAreaMm2 / other.plan.planAreaMm2).toBeCloseTo(1, 4);
      expect(report.checks.map(({ id, status }) => [id, status])).toEqual(
        other.checks.map(({ id, status }) => [id, status]),
      );
    }
    expect(report.mesh.volumeMm3 / volume).toBeCloseTo(1, 5);
  });

  it('is read in its own unit, whatever unit is asked for; of AP203, AP214 and AP242', async () => {
    const files = [
      [frustumStep(60, 40, 20, 5, { schema: 'ap203' }), 1],
      [frustumStep(60, 40, 20, 5, { schema: 'ap242', unit: 'inch' }), 25.4],
      [frustumStep(0.06, 0.04, 0.02, 5, { unit: 'm' }), 1],
    ] as const;
    for (const [bytes, mm] of files) {
      const { unit, boundsMm } = await inspectFile(bytes, 'ft');
      expect(unit).toBe('mm');
      expect(boundsMm.max[0]).toBeCloseTo(30 * mm, 3);
      expect(boundsMm.max[2]).toBeCloseTo(20 * mm, 3);
    }
  });

  it('is cut as finely as it says: cylinders keep their volume and every place lies within the deflection', async () => {
    const cylinders = [
      [0, 0, 20, 30],
      [60, 5, 10, 15],
    ] as const;
    const { bodies, deflectionMm, coords, triangles } = await loadMesh(cylindersStep(cylinders));
    expect(bodies).toBe(2);
    // Mean side of the box 90 × 40 × 30 mm, and 0.02 % of it.
    expect(deflectionMm).toBeCloseTo(2e-4 * (160 / 3), 4);
    for (let c = 0; c < 3 * triangles; c++) {
      const next = c % 3 === 2 ? c - 2 : c + 1;
      const middle = [0, 1, 2].map((k) => (coords[3 * c + k] + coords[3 * next + k]) / 2);
      const [x, y, radius] = middle[0] < 30 ? cylinders[0] : cylinders[1];
      const corner = Math.hypot(coords[3 * c] - x, coords[3 * c + 1] - y);
      expect(Math.abs(corner - radius)).toBeLessThan(1e-4);
      // A level edge of the wall, not of a flat end: its middle is where the facets lie deepest.
      const facet = c - (c % 3);
      const heights = new Set([0, 1, 2].map((k) => Math.round(coords[3 * (facet + k) + 2])));
      const level = Math.abs(coords[3 * c + 2] - coords[3 * next + 2]) < 1e-6;
      if (heights.size > 1 && level) {
        expect(radius - Math.hypot(middle[0] - x, middle[1] - y)).toBeLessThan(
          (deflectionMm as number) * 1.05,
        );
      }
    }
    const { mesh } = (await analyseFile(cylindersStep(cylinders))).report;
    const exact = Math.PI * (20 * 20 * 30 + 10 * 10 * 15);
    expect(mesh.watertight).toBe(true);
    expect(mesh.volumeMm3 / exact).toBeGreaterThan(0.999);
    expect(mesh.volumeMm3 / exact).toBeLessThan(1);
  });

  it('gives the same bits twice', async () => {
    const [one, two] = await Promise.all([loadMesh(cylindersStep([[0, 0, 5, 5]])), loadMesh(cylindersStep([[0, 0, 5, 5]]))]); // prettier-ignore
    expect(Buffer.compare(Buffer.from(one.coords.buffer), Buffer.from(two.coords.buffer))).toBe(0);
  });

  it.each([
    ['cube-units/cube-in.step', 1, 1000 ** 3],
    ['cube-units/cube-m.step', 1, 1000 ** 3],
    ['cube-10x10mm/Cube 10x10.stp', 1, 1000],
  ])('of another maker: %s is a cube', async (name, bodies, exact) => {
    const { input, mesh } = (await analyseFile(sample(name))).report;
    expect(input.bodies).toBe(bodies);
    expect(mesh.watertight).toBe(true);
    expect(mesh.volumeMm3 / exact).toBeCloseTo(1, 5);
  });

  it.each([
    ['cax-if/as1-oc-214.stp', 18],
    ['cax-if/dm1-oc-214.stp', 7],
  ])('of another maker: the assembly %s has %d closed bodies', async (name, bodies) => {
    const { input, mesh } = (await analyseFile(sample(name), { grid: { cellMm: 2 } })).report;
    expect(input.bodies).toBe(bodies);
    expect(mesh.edges.boundary).toBe(0);
    expect(mesh.volumeMm3).toBeGreaterThan(0);
  });

  it('tells its conversion as a stage, and its time where a clock is lent', async () => {
    const stages: string[] = [];
    const { report } = await analyseFile(block, {}, { onProgress: (stage) => stages.push(stage), now: () => performance.now() }); // prettier-ignore
    expect(stages.slice(0, 2)).toEqual(['convert', 'parse']);
    expect(report.timings.convertMs).toBeGreaterThan(0);
  });
});

describe('STEP files that cannot be used', { timeout: 120_000 }, () => {
  const inner = (bytes: Uint8Array, from: number, to: number) => {
    const whole = new TextDecoder().decode(bytes);
    return text(whole.slice(0, from) + whole.slice(to));
  };
  it.each<[string, Uint8Array, string, RegExp]>([
    ['cut', block.slice(0, block.length / 2), 'truncated', /without END-ISO-10303-21/],
    ['without entities', edited(block, /DATA;[\s\S]*ENDSEC;\nEND/, 'DATA;\nENDSEC;\nEND'), 'not_a_mesh', /do not make up a shape/], // prettier-ignore
    [
      'without a solid',
      edited(block, /(SHAPE_REPRESENTATION\('',\(#\d+),#\d+\)/, '$1)'),
      'no_triangles',
      /holds no surface/,
    ],
    [
      'an assembly of parts in other files',
      sample('cax-if/s1_pe_214/s1_pe_214.stp'),
      'no_triangles',
      /other files/,
    ],
    ['a building', edited(block, /AUTOMOTIVE_DESIGN[^']*/, 'IFC4'), 'unsupported', /building model \(IFC4\)/],
    ['without its product', inner(block, 200, 900), 'not_a_mesh', /do not make up a shape/],
  ])('%s', async (_, bytes, code, words) => {
    expect(isStep(bytes)).toBe(true);
    const found = await refusal(loadMesh(bytes));
    expect(found.code).toBe(code);
    expect(found.message).toMatch(words);
  });

  const made = (data: string) => edited(block, /DATA;[\s\S]*?ENDSEC;/, `DATA;\n${data}\nENDSEC;`);
  it.each<[string, Uint8Array, string]>([
    ['an entity that is part of itself', made("#1=SHAPE_REPRESENTATION('',(#1),#1);\n#2=SHAPE_DEFINITION_REPRESENTATION(#1,#1);"), 'not_a_mesh'], // prettier-ignore
    ['200,000 brackets', made(`#1=A(${'('.repeat(200_000)}${')'.repeat(200_000)});`), 'unsupported'],
    ['a tessellated shell of nothing', edited(block, /MANIFOLD_SOLID_BREP\('',#\d+\)/, "TESSELLATED_SHELL('',(),$)"), 'no_triangles'], // prettier-ignore
    ['a string without its end', made("#1=CARTESIAN_POINT('abc,(0.,0.,0.));"), 'not_a_mesh'],
    ['sets of sets, each twice the one before', made(`#1=CARTESIAN_POINT('',(0.,0.,0.));${Array.from({ length: 40 }, (_, k) => `#${k + 2}=GEOMETRIC_CURVE_SET('',(#${k + 1},#${k + 1}));`).join('\n')}`), 'not_a_mesh'], // prettier-ignore
    ['a place that is not finite', edited(block, '30.,-20.,0.', '1.E400,-20.,0.'), 'no_triangles'],
  ])('%s', async (_, bytes, code) => expect((await refusal(loadMesh(bytes))).code).toBe(code));

  it('larger than the cap, before anything is started', async () => {
    const bytes = new Uint8Array(MAX_STEP_BYTES + 1);
    bytes.set(text('ISO-10303-21;'));
    expect(await refusal(loadMesh(bytes))).toMatchObject({ code: 'too_large_file' });
  });

  it('an assembly of more bodies than are taken', async () => {
    const three = cylindersStep([0, 4, 8].map((x) => [x, 0, 1, 1] as const));
    expect((await loadMesh(three, { stepBodies: 3 })).bodies).toBe(3);
    const found = await refusal(loadMesh(three, { stepBodies: 2 }));
    expect(found).toMatchObject({ code: 'unsupported' });
    expect(found.message).toContain('an assembly of 3 bodies, more than the 2');
  });

  it('more than the time that is given', async () => {
    const found = await refusal(loadMesh(sample('cax-if/as1-tu-203.stp'), { stepWallMs: 30 }));
    expect(found).toMatchObject({ code: 'too_large_file' });
    expect(found.message).toMatch(/more than 0.03 s/);
  });

  it('more than the memory that is given', async () => {
    const found = await refusal(loadMesh(sample('cax-if/as1-tu-203.stp'), { stepMemoryMb: 40 }));
    expect(found).toMatchObject({ code: 'too_large_file' });
    expect(found.message).toMatch(/more than 40 MB/);
  });
});

/** Converting processes that this test's own process, or `pid`, has now. */
const children = (pid: number) =>
  readdirSync('/proc')
    .filter((name) => /^\d+$/.test(name))
    .filter((name) => {
      try {
        const status = readFileSync(`/proc/${name}/status`, 'utf8');
        return (
          new RegExp(`^PPid:\\s*${pid}$`, 'm').test(status) &&
          readFileSync(`/proc/${name}/cmdline`, 'utf8').includes('step-process.mjs')
        );
      } catch {
        return false;
      }
    })
    .map(Number);
const alive = (pid: number) => {
  try {
    return !readFileSync(`/proc/${pid}/status`, 'utf8').includes('State:\tZ');
  } catch {
    return false;
  }
};

describe('the converting process', { timeout: 120_000 }, () => {
  const long = () => cylindersStep(Array.from({ length: 450 }, (_, k) => [4 * (k % 25), 4 * Math.floor(k / 25), 1, 1] as const)); // prettier-ignore

  it('ends at once when the run is stopped, with its own word', async () => {
    const stop = new AbortController();
    const run = refusal(loadMesh(long(), { signal: stop.signal }));
    await expect.poll(() => children(process.pid)).toHaveLength(1);
    const [pid] = children(process.pid);
    stop.abort();
    expect(await run).toMatchObject({ code: 'stopped' });
    expect(alive(pid)).toBe(false);
    expect(await refusal(loadMesh(block, { signal: AbortSignal.abort() }))).toMatchObject({
      code: 'stopped',
    });
  });

  it('ends by itself when the thread that asked is ended', async () => {
    const thread = new Worker(
      `import { workerData } from 'node:worker_threads';
       const { tsImport } = await import(workerData.tsx);
       const { loadMesh } = await tsImport('./lib/formability/parse/load-mesh.ts', workerData.root);
       await loadMesh(workerData.bytes);`,
      {
        eval: true,
        workerData: {
          tsx: import.meta.resolve('tsx/esm/api'),
          root: new URL('../../../../../package.json', import.meta.url).href,
          bytes: long(),
        },
        execArgv: ['--input-type=module'],
      },
    );
    await expect.poll(() => children(process.pid), { timeout: 30_000 }).toHaveLength(1);
    const [pid] = children(process.pid);
    await thread.terminate();
    await expect.poll(() => alive(pid), { timeout: 10_000 }).toBe(false);
  });

  it('ends by itself when the process that asked is killed', async () => {
    const root = fileURLToPath(new URL('../../../../../', import.meta.url));
    const script = `import { loadMesh } from './lib/formability/parse/load-mesh'; import { readFileSync } from 'node:fs'; void loadMesh(readFileSync(0));`; // prettier-ignore
    const parent = spawn(process.execPath, ['--import', 'tsx', '--input-type=module', '-e', script], { cwd: root, stdio: ['pipe', 'ignore', 'inherit'] }); // prettier-ignore
    parent.stdin.end(long());
    await expect.poll(() => children(parent.pid as number), { timeout: 30_000 }).toHaveLength(1);
    const [pid] = children(parent.pid as number);
    parent.kill('SIGKILL');
    await expect.poll(() => alive(pid), { timeout: 10_000 }).toBe(false);
  });
});

describe('mutated STEP files (xorshift seed 43)', { timeout: 240_000 }, () => {
  it('end in a report or in a refusal, and the next file is read as ever', async () => {
    const roll = dice(43);
    const source = new TextDecoder().decode(cylindersStep([[0, 0, 5, 5]]));
    const ends = { report: 0, refusal: 0 };
    const mutants = Array.from({ length: 16 }, () => {
      let mutated = source;
      for (let k = 1 + roll(3); k > 0; k--) {
        const at = 300 + roll(mutated.length - 330);
        const kinds = [
          () => mutated.slice(0, at) + mutated.slice(at + roll(40)),
          () => mutated.replace(/#\d+(?=[,)])/g, (found) => (roll(40) === 0 ? `#${1 + roll(60)}` : found)),
          () => mutated.slice(0, at) + String.fromCharCode(32 + roll(90)) + mutated.slice(at + 1),
          () =>
            mutated.replace(/\d+\./g, (found) => (roll(10) === 0 ? `${roll(3) - 1}.E${roll(20)}` : found)),
          () => mutated.replace(/\((#\d+)\)/, '($$)'),
        ];
        mutated = kinds[roll(kinds.length)]();
      }
      return text(mutated);
    });
    const run = async (lane: number) => {
      for (let n = lane; n < mutants.length; n += 2) {
        try {
          const { report } = await analyseFile(mutants[n], {}, { stepWallMs: 20_000 });
          expect(Number.isFinite(report.mesh.areaMm2)).toBe(true);
          ends.report++;
        } catch (error) {
          if (!(error instanceof UnusableInput)) throw error;
          ends.refusal++;
        }
      }
    };
    await Promise.all([run(0), run(1)]);
    expect(ends.report).toBeGreaterThan(0);
    expect(ends.refusal).toBeGreaterThan(2);
    expect((await loadMesh(block)).triangles).toBe(12);
    expect(children(process.pid)).toEqual([]);
  });
});
