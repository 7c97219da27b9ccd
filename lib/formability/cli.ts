import { readFileSync, statSync } from 'node:fs';
import { analyseFile } from './analyse-file';
import { MAX_FILE_BYTES } from './parse/size-caps';
import type { RecipeInput } from './recipe';
import { summarise } from './summarise';
import { UnusableInput } from './unusable-input';

const USAGE =
  'npm run --silent formability -- <mesh.stl|.3mf|.step> [--recipe recipe.json] [--pull-log log.json] [--sheet] [--json] [--geometry-only]';
const FLAGS = ['--json', '--sheet', '--geometry-only'];

interface Arguments {
  mesh: string;
  recipe: string | null;
  pullLog: string | null;
  json: boolean;
  sheet: boolean;
  geometryOnly: boolean;
}

/** A wrong command line: told like unusable input, with the right one. */
class WrongUse extends Error {}

function readArguments(argv: string[]): Arguments {
  const files: string[] = [];
  const flags = new Set<string>();
  let recipe: string | null = null;
  let pullLog: string | null = null;
  for (let i = 0; i < argv.length; i++) {
    if (argv[i] === '--recipe' || argv[i] === '--pull-log') {
      const option = argv[i];
      const file = argv[++i] ?? null;
      if (file === null) throw new WrongUse(`${option} needs a file`);
      if (option === '--recipe') recipe = file;
      else pullLog = file;
    } else if (FLAGS.includes(argv[i])) flags.add(argv[i]);
    else if (argv[i].startsWith('--')) throw new WrongUse(`there is no option ${argv[i]}`);
    else files.push(argv[i]);
  }
  if (files.length !== 1)
    throw new WrongUse(files.length === 0 ? 'no mesh was named' : 'more than one mesh was named');
  return {
    mesh: files[0],
    recipe,
    pullLog,
    json: flags.has('--json'),
    sheet: flags.has('--sheet'),
    geometryOnly: flags.has('--geometry-only'),
  };
}

function readBytes(path: string): Uint8Array {
  const size = statSync(path).size;
  if (size > MAX_FILE_BYTES) {
    throw new UnusableInput('too_large_file', `${path} has ${size} bytes, more than the ${MAX_FILE_BYTES} that are read; export it with a coarser tolerance`); // prettier-ignore
  }
  return readFileSync(path);
}

/** What a JSON file says; undefined where none was named. */
function readJson(path: string | null): unknown {
  if (path === null) return undefined;
  try {
    return JSON.parse(readFileSync(path, 'utf8'));
  } catch (error) {
    const why = error instanceof Error ? error.message : String(error);
    throw new UnusableInput('invalid_recipe', `${path} cannot be read as JSON (${why}); correct the file`);
  }
}

function showProgress(stage: string, fraction: number): void {
  const percent = String(Math.round(fraction * 100)).padStart(3);
  process.stderr.write(`\r\u001b[K${stage === 'done' ? '' : `${percent} % ${stage}`}`);
}

function fail(code: string, message: string, reasons: string[], json: boolean): void {
  const line = message.replace(/\s+/g, ' ');
  if (process.stderr.isTTY) process.stderr.write('\r\u001b[K');
  process.stderr.write(`error: ${code}: ${line}\n`);
  if (json) process.stdout.write(`${JSON.stringify({ error: { code, message: line, reasons } })}\n`);
  process.exitCode = 2;
}

/** The command line: exit 0 when a report was made, whatever it says; 2 when the input cannot be used. */
export async function main(argv: string[]): Promise<void> {
  const json = argv.includes('--json');
  try {
    const args = readArguments(argv);
    const bytes = readBytes(args.mesh);
    const { report } = await analyseFile(bytes, (readJson(args.recipe) ?? {}) as RecipeInput, {
      pullLog: readJson(args.pullLog),
      geometryOnly: args.geometryOnly,
      sheet: args.sheet,
      now: () => performance.now(),
      onProgress: process.stderr.isTTY ? showProgress : undefined,
    });
    process.stdout.write(args.json ? `${JSON.stringify(report)}\n` : summarise(report, args.mesh));
  } catch (error) {
    if (error instanceof UnusableInput) fail(error.code, error.message, error.reasons, json);
    else if (error instanceof WrongUse) fail('usage', `${error.message}; use: ${USAGE}`, [], json);
    else if (error instanceof Error && 'code' in error)
      fail('unreadable', `${error.message}; check the path`, [], json); // prettier-ignore
    else if (error instanceof RangeError)
      fail('too_large_file', `the mesh needs more memory than there is (${error.message}); export it with a coarser tolerance`, [], json); // prettier-ignore
    else fail('internal', `${String(error)}; this is a fault of the engine: please report it with the file`, [], json); // prettier-ignore
  }
}

await main(process.argv.slice(2));
