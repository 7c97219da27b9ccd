import path from 'node:path';
import { root } from './folders';
import { typescriptCommand } from './node-command';
import { defineService, type Service, type ServiceEvents } from './service';

export interface WorkerOptions {
  env: Record<string, string>;
  dev: boolean;
  logFile: string;
  echo?: (line: string) => void;
  events?: ServiceEvents;
}

/** The process that runs checks, builds packs and sends what the outbox holds; in development it follows the sources. */
export function defineWorker({ env, dev, logFile, echo, events }: WorkerOptions): Service {
  const file = path.join(root, 'lib/jobs/worker.ts');
  const watch = path.join(root, 'node_modules/tsx/dist/cli.mjs');
  return defineService({
    name: 'worker',
    url: '',
    command: dev ? [process.execPath, watch, 'watch', '--clear-screen=false', file] : typescriptCommand(file),
    cwd: root,
    env,
    logFile,
    // It serves no port; it says so in its log.
    readyLine: 'worker is ready',
    // A job in hand may finish a step before it lets go.
    stopWithin: 15_000,
    echo,
    events,
  });
}
