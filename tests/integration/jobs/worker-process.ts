import { spawn, type ChildProcess } from 'node:child_process';
import path from 'node:path';
import { afterAll } from 'vitest';
import { typescriptCommand } from '@/docker/local/node-command';

const root = path.resolve(import.meta.dirname, '../../..');
const running = new Set<ChildProcess>();

export type LogLine = { level: string; msg: string; [field: string]: unknown };

export interface WorkerProcess {
  pid: number;
  lines: LogLine[];
  /** Resolves with the first log line that matches, written already or yet to come. */
  says(match: (line: LogLine) => boolean): Promise<LogLine>;
  /** Sends a signal and resolves with how the process ended. */
  end(signal: NodeJS.Signals): Promise<{ code: number | null; signal: NodeJS.Signals | null }>;
  signal(signal: NodeJS.Signals): void;
}

/** A real worker process on this test file's database and services, ready for work; it ends with the file. */
export async function startWorkerProcess(env: Record<string, string> = {}): Promise<WorkerProcess> {
  const [program, ...args] = typescriptCommand(path.join(root, 'lib/jobs/worker.ts'));
  const child = spawn(program, args, {
    cwd: root,
    env: { ...process.env, WORKER_THREADS: '1', ...env, LOG_LEVEL: 'info' } as NodeJS.ProcessEnv,
    stdio: ['ignore', 'pipe', 'pipe'],
  });
  running.add(child);
  const lines: LogLine[] = [];
  const waiting = new Set<() => void>();
  let errors = '';
  child.stderr.on('data', (chunk: Buffer) => (errors += chunk));
  let rest = '';
  child.stdout.on('data', (chunk: Buffer) => {
    const parts = (rest + chunk).split('\n');
    rest = parts.pop()!;
    for (const part of parts) if (part.startsWith('{')) lines.push(JSON.parse(part));
    waiting.forEach((look) => look());
  });
  const ended = new Promise<{ code: number | null; signal: NodeJS.Signals | null }>((resolve) =>
    child.once('exit', (code, signal) => {
      running.delete(child);
      resolve({ code, signal });
      waiting.forEach((look) => look());
    }),
  );
  const says: WorkerProcess['says'] = (match) =>
    new Promise((resolve, reject) => {
      const look = () => {
        const found = lines.find(match);
        if (found) resolve(found);
        else if (child.exitCode !== null || child.signalCode !== null)
          reject(new Error(`the worker ended: ${errors || JSON.stringify(lines.slice(-3))}`));
        else return;
        waiting.delete(look);
      };
      waiting.add(look);
      look();
    });
  await says((line) => line.msg === 'worker is ready');
  return {
    pid: child.pid!,
    lines,
    says,
    signal: (signal) => void child.kill(signal),
    end(signal) {
      child.kill(signal);
      return ended;
    },
  };
}

/** Ends every worker that this file started. */
export function killWorkers(): void {
  for (const child of running) child.kill('SIGKILL');
}
afterAll(killWorkers);
// Should the run be broken off before that, none stays behind.
process.once('exit', killWorkers);
