import path from 'node:path';
import { webAnswers } from './answers';
import { root } from './folders';
import { typescriptCommand } from './node-command';
import { defineService, plainEnvironment, type Service, type ServiceEvents } from './service';
import type { StoreCredentials } from './store/verify-signature';

export const bucket = 'firstpull';

export interface StoreOptions {
  folder: string;
  port: number;
  credentials: StoreCredentials;
  /** Pages that may upload from a browser. */
  origins: string[];
  logFile: string;
  events?: ServiceEvents;
}

/** The S3-compatible store of a local run; its bucket and CORS rules are made at every start. */
export function defineStore({ folder, port, credentials, origins, logFile, events }: StoreOptions): Service {
  const url = `http://127.0.0.1:${port}`;
  return defineService({
    name: 'object store',
    url,
    command: typescriptCommand(path.join(root, 'docker/local/store/serve-store.ts')),
    cwd: root,
    env: {
      ...plainEnvironment(),
      STORE_FOLDER: folder,
      STORE_PORT: String(port),
      STORE_ORIGINS: origins.join(','),
      S3_BUCKET: bucket,
      S3_ACCESS_KEY_ID: credentials.accessKeyId,
      S3_SECRET_ACCESS_KEY: credentials.secretAccessKey,
    },
    logFile,
    answers: () => webAnswers(url),
    events,
  });
}
