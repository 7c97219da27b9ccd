import path from 'node:path';
import { webAnswers } from './answers';
import { root } from './folders';
import { defineService, type Service, type ServiceEvents } from './service';

export interface AppOptions {
  port: number;
  env: Record<string, string>;
  /** A built release, or null to run from the sources with hot reload. */
  release: string | null;
  logFile: string;
  echo?: (line: string) => void;
  events?: ServiceEvents;
}

/** The web process: the built application, or `next dev`. */
export function defineApp({ port, env, release, logFile, echo, events }: AppOptions): Service {
  const url = `http://127.0.0.1:${port}`;
  const next = path.join(root, 'node_modules/next/dist/bin/next');
  return defineService({
    name: 'application',
    url,
    command: release
      ? [process.execPath, path.join(release, 'server.js')]
      : [process.execPath, next, 'dev', '--hostname', '127.0.0.1', '--port', String(port)],
    cwd: release ?? root,
    env: { ...env, PORT: String(port), HOSTNAME: '127.0.0.1' },
    logFile,
    answers: () => webAnswers(`${url}/api/ready`, (status) => status === 200),
    answersWithin: release ? 30_000 : 120_000,
    echo,
    events,
  });
}
