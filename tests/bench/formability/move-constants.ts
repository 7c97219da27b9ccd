import { mkdirSync, readFileSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { copyProject } from './constants/copy-project';
import { exemptionOf } from './constants/exempt';
import { findConstants, type Constant } from './constants/find-constants';
import { openTestBench } from './constants/test-bench';
import { listTests, orderTests, type Known } from './constants/order-tests';

const ROOT = path.resolve(import.meta.dirname, '../../..');
const ENGINE = 'lib/formability';
/** Processor time of each test file at the last run: what is too long for `--within` need not be run to be known. */
const TIMES = path.join(ROOT, 'tests/.out/test-seconds.json');

/**
 * Moves every constant of the engine by 1 %, one at a time, in a copy of the project, and looks for a test that fails.
 * What no test notices is printed with its place; exit code 1 then. `--only=<text>` takes files or names with that
 * text in them, `--tests=<text>` and `--within=<seconds>` leave out other and longer test files, `--list` only lists,
 * `--verbose` tells each test that noticed.
 */
export async function run(): Promise<void> {
  const option = (name: string) =>
    process.argv.find((arg) => arg.startsWith(`--${name}=`))?.slice(name.length + 3);
  const only = option('only')?.split(',');
  const within = Number(option('within') ?? Infinity);
  const among = option('tests')?.split(',');
  const all = findConstants(path.join(ROOT, ENGINE));
  const wanted = all.filter(
    ({ file, name }) => !only || only.some((text) => `${file} ${name}`.includes(text)),
  );
  const exempt = wanted.filter((constant) => exemptionOf(constant) !== null);
  const moved = wanted.filter((constant) => exemptionOf(constant) === null);
  if (process.argv.includes('--list')) {
    for (const constant of wanted) console.log(`${describe(constant)}  ${exemptionOf(constant) ?? ''}`);
    return;
  }

  const start = Date.now();
  const { copy, remove } = copyProject(ROOT);
  for (const signal of ['SIGINT', 'SIGTERM'] as const)
    process.once(signal, () => {
      remove();
      process.exit(1);
    });
  const bench = await openTestBench(copy);
  try {
    const known = await timeTests(copy, bench, within, among);
    console.log(`${known.size} test files, ${seconds(start)} s; ${moved.length} constants to move`);
    const survivors: Constant[] = [];
    for (const [index, constant] of moved.entries()) {
      const killer = await moveOne(copy, bench, constant, known);
      if (!killer) survivors.push(constant);
      if (!killer || process.argv.includes('--verbose'))
        console.log(
          `${killer ? 'held   ' : 'NOT HELD'} ${describe(constant)}  ${killer ?? ''} [${index + 1}/${moved.length}, ${seconds(start)} s]`,
        );
    }
    console.log(
      `\n${wanted.length} constants: ${moved.length - survivors.length} held by a test, ${exempt.length} exempt, ${survivors.length} held by none (${seconds(start)} s)`,
    );
    for (const constant of survivors) console.log(`  ${describe(constant)}`);
    process.exitCode = survivors.length > 0 ? 1 : 0;
  } finally {
    await bench.close();
    remove();
  }
}

type Bench = Awaited<ReturnType<typeof openTestBench>>;

/** Every engine test file that passes unmoved, with its processor time in seconds. */
async function timeTests(copy: string, bench: Bench, within: number, among?: string[]): Promise<Known> {
  const known: Known = new Map();
  const times = lastTimes();
  for (const file of listTests(path.join(copy, 'tests/unit/formability'))) {
    const name = path.relative(copy, file);
    if ((times[name] ?? 0) > within || (among && !among.some((text) => name.includes(text)))) continue;
    const from = process.cpuUsage();
    const failure = await bench.run(file);
    const { user, system } = process.cpuUsage(from);
    times[name] = (user + system) / 1e6;
    if (failure !== null) console.log(`fails unmoved and is left out: ${name}: ${failure}`);
    else known.set(file, { seconds: times[name], runs: new Map(), kills: new Map() });
    writeTimes(times);
    if (process.argv.includes('--verbose')) console.log(`${times[name].toFixed(2)} s  ${name}`);
  }
  return known;
}

function writeTimes(times: Record<string, number>): void {
  mkdirSync(path.dirname(TIMES), { recursive: true });
  writeFileSync(TIMES, JSON.stringify(times, null, 1));
}

function lastTimes(): Record<string, number> {
  try {
    return JSON.parse(readFileSync(TIMES, 'utf8')) as Record<string, number>;
  } catch {
    return {};
  }
}

/** The test that notices that a constant has moved, or null. */
async function moveOne(copy: string, bench: Bench, constant: Constant, known: Known): Promise<string | null> {
  const file = path.join(copy, ENGINE, constant.file);
  const text = readFileSync(file, 'utf8');
  let killer: string | null = null;
  for (const value of valuesOf(constant)) {
    killer = null;
    writeFileSync(file, text.slice(0, constant.from) + value + text.slice(constant.to));
    bench.changed(file);
    for (const test of orderTests(constant.file, bench.testsOf(file), known)) {
      const { runs, kills } = known.get(test)!;
      runs.set(constant.file, (runs.get(constant.file) ?? 0) + 1);
      const failure = await bench.run(test);
      if (failure === null) continue;
      kills.set(constant.file, (kills.get(constant.file) ?? 0) + 1);
      killer = `${path.relative(path.join(copy, 'tests/unit/formability'), test)}: ${failure}`;
      break;
    }
    writeFileSync(file, text);
    bench.changed(file);
    if (killer === null) break;
  }
  return killer;
}

/** 1 % up, for a threshold 1 % down as well; a count, which 1 % does not change, by one. */
function valuesOf({ value, threshold, name }: Constant): string[] {
  const counts =
    Number.isInteger(value) &&
    value < 100 &&
    /(MOST|LEAST|MAX|SAID|TRIES|NODES|STEPS|DEPTH|FLAG|CONNECTED|ENCLOSED)/.test(name);
  const by = counts ? 1 : value / 100;
  const up = Number((value + by).toPrecision(12));
  const down = Number((value - by).toPrecision(12));
  return threshold ? [String(up), String(down)] : [String(up)];
}

function describe({ file, line, name, value }: Constant): string {
  return `${ENGINE}/${file}:${line}  ${name} = ${value}`;
}

function seconds(from: number): string {
  return ((Date.now() - from) / 1000).toFixed(0);
}
