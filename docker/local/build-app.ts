import { spawn } from 'node:child_process';
import { createHash } from 'node:crypto';
import {
  closeSync,
  existsSync,
  openSync,
  readdirSync,
  readFileSync,
  rmSync,
  statSync,
  writeFileSync,
} from 'node:fs';
import { cp, mkdir, rename } from 'node:fs/promises';
import path from 'node:path';
import { setTimeout as pause } from 'node:timers/promises';
import { LocalError, root } from './folders';
import { identify, isRunning, type ProcessIdentity } from './process-identity';
import { plainEnvironment } from './service';

const sourceFolders = ['app', 'lib', 'db', 'drizzle', 'realtime', 'public'];
const sourceFiles = [
  'next.config.mjs',
  'postcss.config.mjs',
  'tailwind.config.ts',
  'proxy.ts',
  'instrumentation.ts',
  'tsconfig.json',
  'package-lock.json',
];
const releases = path.join(root, '.next-release');
/** Older releases that stay on disk, since a product that still runs may be one of them. */
const keep = 3;

/**
 * Builds the application, unless a release of exactly these sources is already there.
 * A release is a folder of its own, so a new build never disturbs a product that runs.
 * @returns the release's folder, with server.js in it, and whether it was built now
 */
export async function buildApp(
  logFile: string,
  signal?: AbortSignal,
): Promise<{ folder: string; built: boolean }> {
  const digest = sourceDigest();
  const folder = path.join(releases, digest.slice(0, 16));
  const isThere = () => existsSync(path.join(folder, 'server.js'));
  if (isThere()) return { folder, built: false };
  await mkdir(releases, { recursive: true });
  const free = await waitForBuilder();
  try {
    if (isThere()) return { folder, built: false };
    await runBuild(logFile, signal);
    await gather(folder);
    dropOldReleases(folder);
    return { folder, built: true };
  } finally {
    free();
  }
}

/** SHA-256 over the names and contents of everything that the build reads. */
export function sourceDigest(): string {
  // The number changes when a release is put together in another way.
  const hash = createHash('sha256').update(`release 2, node ${process.version}\n`);
  const files = [...sourceFolders.flatMap((folder) => filesBelow(folder)), ...sourceFiles].sort();
  for (const file of files) {
    const full = path.join(root, file);
    if (existsSync(full))
      hash.update(`${file}\n`).update(createHash('sha256').update(readFileSync(full)).digest());
  }
  return hash.digest('hex');
}

function filesBelow(folder: string): string[] {
  const full = path.join(root, folder);
  if (!existsSync(full)) return [];
  return readdirSync(full, { withFileTypes: true }).flatMap((entry) => {
    if (entry.name === 'node_modules' || entry.name.startsWith('.')) return [];
    const name = `${folder}/${entry.name}`;
    return entry.isDirectory() ? filesBelow(name) : [name];
  });
}

/** One build at a time in a checkout; a builder that died does not count. */
async function waitForBuilder(): Promise<() => void> {
  const file = path.join(releases, 'building.json');
  for (;;) {
    try {
      writeFileSync(file, JSON.stringify(identify(process.pid)), { flag: 'wx' });
      return () => rmSync(file, { force: true });
    } catch (error) {
      if ((error as NodeJS.ErrnoException).code !== 'EEXIST') throw error;
    }
    const other = readJson(file);
    if (!other || !isRunning(other)) rmSync(file, { force: true });
    else await pause(300);
  }
}

function readJson(file: string): ProcessIdentity | null {
  try {
    return JSON.parse(readFileSync(file, 'utf8')) as ProcessIdentity;
  } catch {
    return null;
  }
}

function runBuild(logFile: string, signal: AbortSignal | undefined): Promise<void> {
  const log = openSync(logFile, 'w', 0o600);
  const child = spawn(process.execPath, [path.join(root, 'node_modules/next/dist/bin/next'), 'build'], {
    cwd: root,
    env: { ...plainEnvironment(), NODE_ENV: 'production', NEXT_TELEMETRY_DISABLED: '1' },
    stdio: ['ignore', log, log],
    signal,
  });
  return new Promise((resolve, reject) => {
    child.once('error', reject);
    child.once('close', (code) => {
      closeSync(log);
      if (code === 0) return resolve();
      const words = readFileSync(logFile, 'utf8').trimEnd().split('\n').slice(-30).join('\n');
      reject(new LocalError(`The application could not be built. ${logFile} says:\n${words}`));
    });
  });
}

/** Puts together what Next's standalone output leaves apart: the server, its static files, public/. */
async function gather(folder: string): Promise<void> {
  const draft = `${folder}.new`;
  rmSync(draft, { recursive: true, force: true });
  const output = path.join(root, '.next');
  // Links between its packages are relative; kept as they are they lead inside the copy, not into this build.
  await cp(path.join(output, 'standalone'), draft, { recursive: true, verbatimSymlinks: true });
  if (!existsSync(path.join(draft, 'server.js'))) {
    throw new LocalError(
      `The build left no server.js in ${output}/standalone; is "output: 'standalone'" still set?`,
    );
  }
  await cp(path.join(output, 'static'), path.join(draft, '.next/static'), { recursive: true });
  if (existsSync(path.join(root, 'public'))) {
    await cp(path.join(root, 'public'), path.join(draft, 'public'), { recursive: true });
  }
  await rename(draft, folder);
}

function dropOldReleases(current: string): void {
  readdirSync(releases)
    .map((name) => path.join(releases, name))
    .filter((folder) => folder !== current && statSync(folder).isDirectory())
    .sort((a, b) => statSync(b).ctimeMs - statSync(a).ctimeMs)
    .slice(keep - 1)
    .forEach((folder) => rmSync(folder, { recursive: true, force: true }));
}
