import { readFileSync } from 'node:fs';

/** A process that cannot be mistaken for a later one with the same number. */
export interface ProcessIdentity {
  pid: number;
  /** Start time in clock ticks since boot, from /proc; proc(5), field 22 of stat. */
  started: string;
}

export function identify(pid: number): ProcessIdentity | null {
  try {
    const stat = readFileSync(`/proc/${pid}/stat`, 'utf8');
    // The name in brackets may hold spaces; count the fields after its end.
    const fields = stat.slice(stat.lastIndexOf(')') + 2).split(' ');
    if (fields[0] === 'Z') return null;
    return { pid, started: fields[19] };
  } catch {
    return null;
  }
}

export function isRunning(identity: ProcessIdentity): boolean {
  return identify(identity.pid)?.started === identity.started;
}

/** Signals a whole process group; a group that is gone is no error. */
export function signalGroup(pid: number, signal: NodeJS.Signals): void {
  try {
    process.kill(-pid, signal);
  } catch (error) {
    if ((error as NodeJS.ErrnoException).code !== 'ESRCH') throw error;
  }
}
