import { spawnSync } from 'node:child_process';
import { existsSync, readdirSync } from 'node:fs';
import { runCommand } from './run-command.mjs';

// Debian's package makes and starts a cluster on port 5432 unless told not to; we run one of our own.
const noMainCluster =
  'test -e /etc/postgresql-common/createcluster.conf || ' +
  '{ mkdir -p /etc/postgresql-common && echo "create_main_cluster = false" > /etc/postgresql-common/createcluster.conf; }';

const known = {
  postgresql: { isThere: () => postgresFolders().length > 0, before: noMainCluster, purpose: 'the database' },
  chromium: { isThere: () => existsSync('/usr/bin/chromium'), before: 'true', purpose: 'the browser tests' },
};

/** Folders with PostgreSQL's server programs as Debian lays them out, newest first. */
export function postgresFolders() {
  const base = '/usr/lib/postgresql';
  if (!existsSync(base)) return [];
  return readdirSync(base)
    .filter((version) => existsSync(`${base}/${version}/bin/initdb`) && Number(version) >= 15)
    .sort((a, b) => Number(b) - Number(a))
    .map((version) => `${base}/${version}/bin`);
}

export function debianPackageIsThere(name) {
  return known[name].isThere();
}

/** Thrown when a package is missing and may not be installed from here; the message is the whole advice. */
export class MissingPackageError extends Error {}

/**
 * Installs a Debian package when it is missing: as root, or with sudo that asks for no password.
 * @param {'postgresql' | 'chromium'} name
 * @returns whether anything was installed
 * @throws {MissingPackageError} with the exact command, when neither is possible
 */
export async function ensureDebianPackage(name) {
  const { isThere, before, purpose } = known[name];
  if (isThere()) return false;
  const script =
    `${before} && apt-get update -q && ` +
    `DEBIAN_FRONTEND=noninteractive UCF_FORCE_CONFFOLD=1 apt-get install -y -q --no-install-recommends ${name}`;
  const isRoot = process.getuid?.() === 0;
  const maySudo = !isRoot && spawnSync('sudo', ['-n', 'true'], { stdio: 'ignore' }).status === 0;
  if (!existsSync('/usr/bin/apt-get') || !(isRoot || maySudo)) {
    throw new MissingPackageError(
      `Debian's package "${name}" is missing (it is needed for ${purpose}) and installing it needs root.\n` +
        `Run this once, then start again:\n\n  sudo sh -c '${script}'\n`,
    );
  }
  const command = isRoot ? ['sh', '-c', script] : ['sudo', '-n', 'sh', '-c', script];
  await runCommand(command, { what: `Installing Debian's package "${name}"` });
  if (!isThere()) throw new Error(`"${name}" was installed but its programs are not where Debian puts them.`);
  return true;
}
