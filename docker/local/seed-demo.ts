import { spawn } from 'node:child_process';
import { closeSync, existsSync, openSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { LocalError, root } from './folders';
import { typescriptCommand } from './node-command';
import { writeOwnerOnly } from './secrets';

export interface DemoSignIn {
  name: string;
  email: string;
  password: string;
  role: string;
}

const begunFile = (dataFolder: string) => path.join(dataFolder, 'demo-begun.json');

/** True when a seed was begun and never came to its end: nobody has worked in that database yet. */
export function seedBrokeOff(dataFolder: string): boolean {
  return existsSync(begunFile(dataFolder)) && !existsSync(path.join(dataFolder, 'demo.json'));
}

/**
 * Seeds the demo studio, once per data folder, in a process of its own.
 * @returns the people who can sign in
 */
export async function seedDemoOnce(
  dataFolder: string,
  env: Record<string, string>,
  logFile: string,
  signal?: AbortSignal,
): Promise<DemoSignIn[]> {
  const file = path.join(dataFolder, 'demo.json');
  if (!existsSync(file)) {
    writeOwnerOnly(begunFile(dataFolder), new Date().toISOString());
    writeOwnerOnly(file, await runSeed(env, logFile, signal));
  }
  return JSON.parse(readFileSync(file, 'utf8')) as DemoSignIn[];
}

function runSeed(env: Record<string, string>, logFile: string, signal?: AbortSignal): Promise<DemoSignIn[]> {
  const [program, ...args] = typescriptCommand(path.join(root, 'docker/local/run-seed.ts'));
  const log = openSync(logFile, 'w', 0o600);
  return new Promise((resolve, reject) => {
    const child = spawn(program, args, {
      cwd: root,
      env: env as NodeJS.ProcessEnv,
      stdio: ['ignore', log, log, 'ipc'],
      signal,
    });
    let people: DemoSignIn[] | undefined;
    child.once('message', (message) => (people = message as DemoSignIn[]));
    child.once('error', reject);
    child.once('close', (code) => {
      closeSync(log);
      if (code === 0 && people) return resolve(people);
      const words = readFileSync(logFile, 'utf8').trimEnd().split('\n').slice(-30).join('\n');
      reject(new LocalError(`The demo studio could not be made. ${logFile} says:\n${words}`));
    });
  });
}
