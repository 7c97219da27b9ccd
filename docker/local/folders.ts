import { spawnSync } from 'node:child_process';
import { createHash } from 'node:crypto';
import {
  accessSync,
  chmodSync,
  constants,
  existsSync,
  mkdirSync,
  readdirSync,
  readFileSync,
  statSync,
} from 'node:fs';
import path from 'node:path';

/** The checkout. */
export const root = path.resolve(import.meta.dirname, '../..');

export interface Account {
  uid: number;
  gid: number;
}

/** A failure that the person who typed the command can mend; shown without a stack. */
export class LocalError extends Error {}

export const isRoot = () => process.getuid?.() === 0;

/** What a local run keeps in its data folder; nothing else in there is ever touched. */
export const ownEntries = [
  'secrets.json',
  'demo-begun.json',
  'demo.json',
  'running.json',
  'logs',
  'store',
  'mail',
  'postgres',
];

/**
 * The folder that holds everything of a local run: `.data` in the checkout unless FIRSTPULL_DATA_DIR says otherwise.
 * Only its owner may list it; as root others may pass through, since the database runs as another account.
 * @throws {LocalError} when it belongs to another account or holds other things
 */
export function openDataFolder(folder?: string): string {
  const dataFolder = dataFolderPath(folder);
  try {
    mkdirSync(dataFolder, { recursive: true, mode: 0o700 });
    accessSync(dataFolder, constants.R_OK | constants.W_OK | constants.X_OK);
    if (process.getuid && statSync(dataFolder).uid !== process.getuid()) throw new Error('another owner');
  } catch {
    throw new LocalError(
      `The data folder ${dataFolder} belongs to another account or cannot be written. Start as its owner, ` +
        'or set FIRSTPULL_DATA_DIR to a folder of your own.',
    );
  }
  const foreign = readdirSync(dataFolder).filter((name) => !ownEntries.some((own) => name.startsWith(own)));
  if (foreign.length > 0) {
    throw new LocalError(
      `The data folder ${dataFolder} holds other things (${foreign.slice(0, 3).join(', ')}). ` +
        'Set FIRSTPULL_DATA_DIR to an empty or a new folder.',
    );
  }
  chmodSync(dataFolder, isRoot() ? 0o711 : 0o700);
  for (const name of ['logs', 'store', 'mail'])
    mkdirSync(path.join(dataFolder, name), { recursive: true, mode: 0o700 });
  return dataFolder;
}

export function dataFolderPath(folder = process.env.FIRSTPULL_DATA_DIR): string {
  return path.resolve(root, folder || '.data');
}

/**
 * The account that runs PostgreSQL: its server refuses root, so root lends it Debian's postgres account.
 * @returns null when the server runs as ourselves
 */
export function databaseAccount(): Account | null {
  if (!isRoot()) return null;
  const line = readFileSync('/etc/passwd', 'utf8').match(/^postgres:[^:]*:(\d+):(\d+):/m);
  if (!line)
    throw new LocalError('There is no account named postgres; install Debian’s package "postgresql".');
  return { uid: Number(line[1]), gid: Number(line[2]) };
}

/**
 * Where the database's files are: inside the data folder, or, when a folder above it is closed to the
 * database's account (a checkout below /root), in a folder of its own under /var/lib.
 */
export function clusterFolder(dataFolder: string, account: Account | null): string {
  const inside = path.join(dataFolder, 'postgres');
  if (!account || existsSync(path.join(inside, 'PG_VERSION'))) return inside;
  const passes =
    spawnSync('/bin/sh', ['-c', 'test -x "$1"', 'sh', dataFolder], { ...account, cwd: '/' }).status === 0;
  return passes ? inside : outsideClusterFolder(dataFolder);
}

export function outsideClusterFolder(dataFolder: string): string {
  const mark = createHash('sha256').update(dataFolder).digest('hex').slice(0, 12);
  return `/var/lib/firstpull-${mark}`;
}
