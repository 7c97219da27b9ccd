import { readdirSync } from 'node:fs';
import path from 'node:path';
import { fileURLToPath, pathToFileURL } from 'node:url';

const HERE = path.dirname(fileURLToPath(import.meta.url));

/**
 * Runs every benchmark: each file tests/bench/<area>/<name>.ts that exports `run` and is named on the command line,
 * or all of the list below. A benchmark prints its own table of ratios.
 */
const BENCHES = ['formability/geometry', 'formability/formats', 'formability/sheet', 'stage/derivative'];

const wanted = process.argv.slice(2);
const known = BENCHES.filter((name) => wanted.length === 0 || wanted.some((part) => name.includes(part)));
if (known.length === 0) {
  const areas = readdirSync(HERE).filter((entry) => !entry.includes('.'));
  console.error(
    `no benchmark is named like ${wanted.join(', ')}; there are ${BENCHES.join(', ')} in ${areas.join(', ')}`,
  );
  process.exitCode = 2;
}
for (const name of known) {
  const bench = (await import(pathToFileURL(path.join(HERE, `${name}.ts`)).href)) as {
    run(): void | Promise<void>;
  };
  await bench.run();
}
