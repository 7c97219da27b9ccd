import { createHash } from 'node:crypto';
import { existsSync, readFileSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { runCommand } from './run-command.mjs';

/**
 * Whether the installed packages of `folder` are those of its lock file: because we installed them from exactly this
 * file, or because npm's own record, which it writes last, names them all.
 */
export function packagesAreCurrent(folder) {
  const stamp = stampPath(folder);
  if (existsSync(stamp) && readFileSync(stamp, 'utf8') === lockDigest(folder)) return true;
  const installedFile = path.join(folder, 'node_modules', '.package-lock.json');
  if (!existsSync(installedFile)) return false;
  const wanted = JSON.parse(readFileSync(path.join(folder, 'package-lock.json'), 'utf8')).packages;
  const installed = JSON.parse(readFileSync(installedFile, 'utf8')).packages;
  return Object.entries(wanted).every(([name, one]) => {
    if (name === '' || one.link) return true;
    const there = installed[name];
    if (!there) return Boolean(one.optional || one.os || one.cpu || (one.peer && one.devOptional));
    return there.version === one.version;
  });
}

/**
 * Installs what the lock file names, when it is not there yet.
 * @returns whether anything was installed; rejects with npm's own last lines
 */
export async function ensurePackages(folder) {
  if (packagesAreCurrent(folder)) return false;
  const npm = process.env.npm_execpath?.endsWith('.js')
    ? [process.execPath, process.env.npm_execpath]
    : ['npm'];
  const environment = { ...process.env, NODE_ENV: 'development' };
  // Settings of the npm that started us (such as a workspace or a prefix) are not for this install.
  for (const name of Object.keys(environment))
    if (/^npm_config_local_prefix$/i.test(name)) delete environment[name];
  const command = [...npm, 'ci', '--include=dev', '--no-audit', '--no-fund', '--loglevel=error'];
  await runCommand(command, { cwd: folder, env: environment, what: `"npm ci" in ${folder}` });
  // npm leaves some packages of the lock file out for reasons of its own; what it did from this file is right.
  writeFileSync(stampPath(folder), lockDigest(folder));
  return true;
}

const stampPath = (folder) => path.join(folder, 'node_modules', '.installed-from');
const lockDigest = (folder) =>
  createHash('sha256')
    .update(readFileSync(path.join(folder, 'package-lock.json')))
    .digest('hex');
