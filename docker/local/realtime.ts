import path from 'node:path';
import { webAnswers } from './answers';
import { root } from './folders';
import { defineService, plainEnvironment, type Service, type ServiceEvents } from './service';

export const realtimeAppId = 'firstpull';

export interface RealtimeOptions {
  port: number;
  key: string;
  secret: string;
  logFile: string;
  events?: ServiceEvents;
}

/** The Pusher-protocol server. Its port must be free: two of them share one silently. */
export function defineRealtime({ port, key, secret, logFile, events }: RealtimeOptions): Service {
  const folder = path.join(root, 'realtime/server');
  const url = `http://127.0.0.1:${port}`;
  return defineService({
    name: 'realtime server',
    url,
    command: [
      process.execPath,
      path.join(folder, 'node_modules/@soketi/soketi/bin/server.js'),
      'start',
      '--config',
      path.join(folder, 'soketi.json'),
    ],
    cwd: folder,
    env: {
      ...plainEnvironment(),
      SOKETI_HOST: '127.0.0.1',
      SOKETI_PORT: String(port),
      SOKETI_DEFAULT_APP_ID: realtimeAppId,
      SOKETI_DEFAULT_APP_KEY: key,
      SOKETI_DEFAULT_APP_SECRET: secret,
      // Its discovery of other instances stays on loopback, and its usage page on a port that the kernel picks.
      SOKETI_CLUSTER_PORT: String(port),
      SOKETI_METRICS_HOST: '127.0.0.1',
      SOKETI_METRICS_SERVER_PORT: '0',
    },
    logFile,
    answers: () => webAnswers(`${url}/ready`, (status) => status === 200),
    events,
  });
}
