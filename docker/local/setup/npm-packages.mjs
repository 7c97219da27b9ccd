import { existsSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { runCommand } from './run-command.mjs';

/**
 * Whether the installed packages of `folder` are those of its lock file. npm writes
 * node_modules/.package-lock.json last, so a broken-off install never counts as done.
 */
export function packagesAreCurrent(folder) {
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
  return true;
}
