// What `npm test` and `npm run verify` run: sets up what is missing, runs every step, counts, and says how it went.
import { spawn } from 'node:child_process';
import { createWriteStream, mkdirSync, readFileSync, rmSync } from 'node:fs';
import path from 'node:path';
import { ensureDebianPackage } from '../docker/local/setup/debian-packages.mjs';
import { ensurePackages } from '../docker/local/setup/npm-packages.mjs';
import { countVitest } from './support/count-results.mjs';

const root = path.resolve(import.meta.dirname, '..');
const out = path.join(root, 'tests/.out');
const verifyOnly = process.argv.includes('--verify');
const limitMs = 20 * 60_000;
const running = new Set();

const bin = (name, ...args) => [process.execPath, path.join(root, 'node_modules', name), ...args];
// Between two commits only what has changed is linted and formatted anew; `npm test` looks at everything.
const cached = (name) =>
  verifyOnly
    ? ['--cache', '--cache-strategy', 'content', '--cache-location', `node_modules/.cache/${name}`]
    : [];
const eslint = bin('eslint/bin/eslint.js', ...cached('eslint'), '.');
const prettier = bin('prettier/bin/prettier.cjs', ...cached('prettier'), '--check', '.');
const types = [bin('next/dist/bin/next', 'typegen'), bin('typescript/bin/tsc', '--noEmit')];
const imports = bin(
  'dependency-cruiser/bin/dependency-cruise.mjs',
  '--config',
  '.dependency-cruiser.cjs',
).concat(['app', 'lib', 'db', 'realtime']);
const build = [process.execPath, '--import', 'tsx', path.join(root, 'tests/support/build-release.ts')];

/** A step that passes or fails as a whole. */
const check = (name, ...commands) => ({ name, run: (log) => runCheck(commands, log) });
/** A step that counts its tests. */
const vitest = (name, project, ...filters) => ({
  name,
  run: (log) => runVitest(name, project, filters, log),
});

const checks = [
  check('lint', eslint),
  check('format', prettier),
  check('types', ...types),
  check('import rules', imports),
];
// What `npm run verify` runs of the engine: formulas, tables, limits, checks and readers, in seconds. Closed-form parts,
// measures, meshes, sheets, STEP and damaged files take minutes and are for `npm test`.
const quick = [
  'physics',
  'materials',
  'checks',
  'parse',
  'limits',
  'recipe',
  'fill-recipe',
  'candidate-changes',
]
  .map((name) => `tests/unit/formability/${name}`)
  .concat('--exclude', '**/parse/step/**', '--exclude', '**/fuzz.test.ts');
// Checks and unit tests do not touch one another and run side by side; services and the browser get the machine alone.
const phases = verifyOnly
  ? [[...checks, vitest('quick engine tests', 'engine', ...quick)]]
  : [
      [vitest('engine tests', 'engine'), ...checks, vitest('unit tests', 'unit')],
      [vitest('integration tests', 'integration')],
      [check('production build', build)],
      [vitest('browser tests', 'e2e')],
    ];

for (const signal of ['SIGINT', 'SIGTERM']) {
  process.once(signal, () => {
    for (const child of running) signalGroup(child, signal);
    process.exitCode = 1;
    setTimeout(() => process.exit(1), 5000).unref();
  });
}

const from = Date.now();
process.chdir(root);
rmSync(out, { recursive: true, force: true });
mkdirSync(out, { recursive: true });
await setUp();
const results = [];
for (const steps of phases) results.push(...(await inPairs(steps)));
report(results);

async function setUp() {
  try {
    if (await ensurePackages(root)) console.log('Installed the npm packages.');
    if (verifyOnly) return;
    if (await ensurePackages(path.join(root, 'realtime/server')))
      console.log('Installed the realtime server’s packages.');
    for (const name of ['postgresql', 'chromium']) {
      if (await ensureDebianPackage(name)) console.log(`Installed Debian’s ${name}.`);
    }
  } catch (error) {
    console.error(`${error.message}\n\nThe tests could not be set up.\n0 passed, 1 failed`);
    process.exit(1);
  }
}

/** Runs steps two at a time, in order. */
async function inPairs(steps) {
  const results = [];
  const left = steps.map((step, index) => ({ step, index }));
  const lane = async () => {
    for (let next = left.shift(); next; next = left.shift()) results[next.index] = await runStep(next.step);
  };
  await Promise.all([lane(), lane()]);
  return results;
}

async function runStep({ name, run }) {
  const start = Date.now();
  const log = path.join(out, `${name.replaceAll(' ', '-')}.log`);
  console.log(`${name} …`);
  const { passed, failed, problems } = await run(log);
  const seconds = ((Date.now() - start) / 1000).toFixed(1);
  console.log(`${name}: ${passed} passed, ${failed} failed (${seconds} s)`);
  if (failed > 0) {
    console.log(tail(log, 150));
    for (const problem of problems) console.log(`  ${problem}`);
  }
  return { name, passed, failed, seconds };
}

async function runCheck(commands, log) {
  rmSync(log, { force: true });
  for (const command of commands) {
    const code = await execute(command, log);
    if (code !== 0) return { passed: 0, failed: 1, problems: [`ended with code ${code}; the log is ${log}`] };
  }
  return { passed: 1, failed: 0, problems: [] };
}

async function runVitest(name, project, filters, log) {
  rmSync(log, { force: true });
  const reportFile = log.replace(/\.log$/, '.json');
  const reporters = ['--reporter=default', '--reporter=json', `--outputFile.json=${reportFile}`];
  const code = await execute(
    bin('vitest/vitest.mjs', 'run', '--project', project, ...reporters, ...filters),
    log,
  );
  return countVitest(reportFile, code);
}

/** Runs a command with its output in a log; one that hangs is ended. */
function execute([program, ...args], log) {
  const environment = { ...process.env, NEXT_TELEMETRY_DISABLED: '1', NO_COLOR: '1' };
  // The tests must not depend on what the caller's shell was set up for.
  for (const name of ['NODE_ENV', 'PORT', 'FIRSTPULL_DATA_DIR', 'FORCE_COLOR']) delete environment[name];
  return new Promise((resolve) => {
    const child = spawn(program, args, {
      cwd: root,
      env: environment,
      detached: true,
      stdio: ['ignore', 'pipe', 'pipe'],
    });
    const file = createWriteStream(log, { flags: 'a' });
    child.stdout.pipe(file, { end: false });
    child.stderr.pipe(file, { end: false });
    running.add(child);
    const timer = setTimeout(() => {
      file.write(`\nStill running after ${limitMs / 60_000} minutes; ended.\n`);
      signalGroup(child, 'SIGTERM');
      setTimeout(() => signalGroup(child, 'SIGKILL'), 10_000).unref();
    }, limitMs);
    child.once('error', (error) => {
      file.write(`${error.message}\n`);
    });
    child.once('close', (code) => {
      clearTimeout(timer);
      running.delete(child);
      file.end(() => resolve(code ?? 1));
    });
  });
}

function signalGroup(child, signal) {
  try {
    process.kill(-child.pid, signal);
  } catch {
    // It has ended meanwhile.
  }
}

function tail(file, lines) {
  return readFileSync(file, 'utf8').trimEnd().split('\n').slice(-lines).join('\n');
}

function report(results) {
  const sum = (key) => results.reduce((total, result) => total + result[key], 0);
  const width = Math.max(...results.map(({ name }) => name.length));
  console.log(`\nAll steps, ${((Date.now() - from) / 60_000).toFixed(1)} minutes; logs are in tests/.out`);
  for (const { name, passed, failed, seconds } of results) {
    const mark = failed > 0 ? 'FAILED' : 'ok    ';
    console.log(
      `  ${mark} ${name.padEnd(width)}  ${String(passed).padStart(5)} passed ${String(failed).padStart(3)} failed  ${seconds} s`,
    );
  }
  console.log(`${sum('passed')} passed, ${sum('failed')} failed`);
  process.exitCode = sum('failed') > 0 ? 1 : process.exitCode;
}
