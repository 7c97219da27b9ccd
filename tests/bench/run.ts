import { readdirSync } from 'node:fs';
import path from 'node:path';
import { fileURLToPath, pathToFileURL } from 'node:url';

const HERE = path.dirname(fileURLToPath(import.meta.url));

/**
 * Runs every benchmark: each file tests/bench/<area>/<name>.ts that exports `run` and is named on the command line,
 * or all of the first list below. A benchmark prints its own table of ratios; words with dashes are its options.
 */
const BENCHES = ['formability/geometry', 'formability/formats', 'formability/sheet', 'stage/derivative'];
/** Long ones, run where they are named. */
const NAMED_ONLY = ['formability/move-constants'];

const wanted = process.argv.slice(2).filter((word) => !word.startsWith('--'));
const named = [...BENCHES, ...NAMED_ONLY].filter((name) => wanted.some((part) => name.includes(part)));
const known = wanted.length === 0 ? BENCHES : named;
if (known.length === 0) {
  const areas = readdirSync(HERE).filter((entry) => !entry.includes('.'));
  console.error(
    `no benchmark is named like ${wanted.join(', ')}; there are ${[...BENCHES, ...NAMED_ONLY].join(', ')} in ${areas.join(', ')}`,
  );
  process.exitCode = 2;
}
for (const name of known) {
  const bench = (await import(pathToFileURL(path.join(HERE, `${name}.ts`)).href)) as {
    run(): void | Promise<void>;
  };
  await bench.run();
}
