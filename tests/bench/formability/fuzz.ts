import { fork, spawnSync, type ChildProcess } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { mutatedFile } from '../../fixtures/meshes/mutate';

const HERE = path.dirname(fileURLToPath(import.meta.url));
const ROOT = path.resolve(HERE, '../../..');
/** A case that takes longer hangs (a STEP conversion has its own, longer limit). */
const HANG_MS = 10_000;
const STEP_HANG_MS = 60_000;
const MEMORY_CAP_MB = 1_200;

interface Told {
  index: number;
  outcome: string;
  why?: string;
  format: string;
  rssMB: number;
}

/**
 * `tsx tests/bench/formability/fuzz.ts [cases] [first] [every n-th through the command line]`: mutated files of every
 * format, each the same at every run. In a child process, which is watched: a crash, a hang, a figure that is not
 * finite, memory over the cap or an exit code other than 0 and 2 is a fault; faults are listed and end in exit 1.
 */
async function run(cases: number, first: number, everyNth: number): Promise<number> {
  const counts = new Map<string, number>();
  const faults: string[] = [];
  const blame = (...found: string[]) => {
    faults.push(...found);
    for (const fault of found) console.error(fault);
  };
  let peakMB = 0;
  let slowestMs = 0;
  let child = start();
  for (let index = first; index < first + cases; index++) {
    const began = performance.now();
    const told = await judge(child, index);
    slowestMs = Math.max(slowestMs, performance.now() - began);
    if (told.outcome === 'crash' || told.outcome === 'hang') {
      blame(`case ${index}: ${told.outcome} ${told.why ?? ''}`);
      child.kill('SIGKILL');
      child = start();
      continue;
    }
    peakMB = Math.max(peakMB, told.rssMB);
    if (told.rssMB > MEMORY_CAP_MB) blame(`case ${index}: ${told.rssMB.toFixed(0)} MB`);
    if (told.outcome === 'fault') blame(`case ${index} (${told.format}): ${told.why}`);
    if ((index + 1) % 500 === 0) console.error(`${index + 1 - first} cases, ${faults.length} faults`);
    const key = `${told.format.replace(/-text|-round/, '').padEnd(11)} ${told.outcome}`;
    counts.set(key, (counts.get(key) ?? 0) + 1);
    if (everyNth > 0 && index % everyNth === 0) blame(...throughCommandLine(index));
  }
  child.kill('SIGKILL');
  for (const [key, count] of [...counts].sort()) console.log(`${key.padEnd(34)}${String(count).padStart(6)}`);
  console.log(`cases ${first} to ${first + cases - 1}: ${faults.length} faults, slowest ${slowestMs.toFixed(0)} ms, peak ${peakMB.toFixed(0)} MB`); // prettier-ignore
  return faults.length;
}

function start(): ChildProcess {
  return fork(path.join(HERE, 'fuzz-worker.ts'), { execArgv: ['--import', 'tsx'], cwd: ROOT });
}

function judge(child: ChildProcess, index: number): Promise<Told> {
  return new Promise((resolve) => {
    const limit = mutatedFile(index).format.startsWith('step') ? STEP_HANG_MS : HANG_MS;
    const timer = setTimeout(() => settle({ index, outcome: 'hang', format: '', rssMB: 0 }), limit);
    const onMessage = (told: Told) => settle(told);
    const onExit = (code: number | null, signal: string | null) =>
      settle({ index, outcome: 'crash', why: `${code} ${signal}`, format: '', rssMB: 0 });
    function settle(told: Told): void {
      clearTimeout(timer);
      child.off('message', onMessage);
      child.off('exit', onExit);
      resolve(told);
    }
    child.on('message', onMessage);
    child.on('exit', onExit);
    child.send(index);
  });
}

/** The same case through the command line, which may only end with 0 and a report, or 2 and one line. */
function throughCommandLine(index: number): string[] {
  const folder = mkdtempSync(path.join(tmpdir(), 'fuzz-'));
  try {
    const file = path.join(folder, `case-${index}`);
    writeFileSync(file, mutatedFile(index).bytes);
    const done = spawnSync(process.execPath, ['--import', 'tsx', 'lib/formability/cli.ts', file, '--json'], { cwd: ROOT, encoding: 'utf8', timeout: STEP_HANG_MS, maxBuffer: 1 << 28 }); // prettier-ignore
    if (done.status === 0) return isJson(done.stdout) ? [] : [`case ${index}: no report on standard output`];
    const oneLine = /^error: [a-z_]+: [^\n]+\n$/.test(done.stderr) && isJson(done.stdout);
    return done.status === 2 && oneLine
      ? []
      : [`case ${index}: exit ${done.status} ${done.stderr.slice(0, 300)}`];
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}

function isJson(text: string): boolean {
  try {
    JSON.parse(text);
    return true;
  } catch {
    return false;
  }
}

const [cases = '10000', first = '0', everyNth = '100'] = process.argv.slice(2);
process.exitCode = (await run(Number(cases), Number(first), Number(everyNth))) > 0 ? 1 : 0;
