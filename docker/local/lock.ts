import { existsSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { setTimeout as pause } from 'node:timers/promises';
import { LocalError } from './folders';
import type { Ports } from './ports';
import { identify, isRunning, signalGroup, type ProcessIdentity } from './process-identity';
import { writeOwnerOnly } from './secrets';

interface LockContent {
  holder: ProcessIdentity;
  address?: string;
  ports?: Ports;
  children: Record<string, ProcessIdentity>;
}

export interface DataLock {
  /** Notes a child, so that a later start can end it should we be killed without a chance to. */
  noteChild(name: string, pid: number | undefined): void;
  noteAddress(address: string): void;
  /** Where the services listen, for commands in a second terminal. */
  notePorts(ports: Ports): void;
  release(): void;
}

const lockPath = (dataFolder: string) => path.join(dataFolder, 'running.json');

/** Who runs on this data folder now, if anyone. */
export function readHolder(dataFolder: string): LockContent | null {
  const content = read(lockPath(dataFolder));
  return content && isRunning(content.holder) ? content : null;
}

/**
 * Takes the data folder for this process. A lock left by a killed start is cleared, and what it left running is ended.
 * @throws {LocalError} when another start runs on the same folder
 */
export async function lockDataFolder(dataFolder: string, say: (line: string) => void): Promise<DataLock> {
  const file = lockPath(dataFolder);
  const self = identify(process.pid) ?? { pid: process.pid, started: '' };
  const content: LockContent = { holder: self, children: {} };
  for (;;) {
    try {
      writeFileSync(file, JSON.stringify(content), { flag: 'wx', mode: 0o600 });
      break;
    } catch (error) {
      if ((error as NodeJS.ErrnoException).code !== 'EEXIST') throw error;
    }
    const other = read(file);
    if (other && isRunning(other.holder)) {
      throw new LocalError(
        `Firstpull already runs on ${dataFolder} (process ${other.holder.pid}` +
          `${other.address ? `, ${other.address}` : ''}). Stop it first, or set FIRSTPULL_DATA_DIR to another folder.`,
      );
    }
    await endLeftovers(other?.children ?? {}, say);
    rmSync(file, { force: true });
  }
  const save = () => writeOwnerOnly(file, content);
  return {
    noteChild(name, pid) {
      const identity = pid === undefined ? null : identify(pid);
      if (identity) content.children[name] = identity;
      else delete content.children[name];
      save();
    },
    noteAddress(address) {
      content.address = address;
      save();
    },
    notePorts(ports) {
      content.ports = ports;
      save();
    },
    release() {
      if (existsSync(file)) rmSync(file, { force: true });
    },
  };
}

async function endLeftovers(children: LockContent['children'], say: (line: string) => void): Promise<void> {
  for (const [name, identity] of Object.entries(children)) {
    if (!isRunning(identity)) continue;
    say(`An earlier start was killed and left the ${name} running; ending it.`);
    signalGroup(identity.pid, name === 'database' ? 'SIGINT' : 'SIGTERM');
    for (let tries = 0; tries < 100 && isRunning(identity); tries += 1) await pause(100);
    if (isRunning(identity)) signalGroup(identity.pid, 'SIGKILL');
  }
}

function read(file: string): LockContent | null {
  try {
    const content = JSON.parse(readFileSync(file, 'utf8')) as LockContent;
    return content.holder ? content : null;
  } catch {
    return null;
  }
}
