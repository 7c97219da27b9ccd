import { execFile, spawn } from 'node:child_process';
import { chmodSync, mkdtempSync, readdirSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { afterAll, describe, expect, it } from 'vitest';
import { isRoot, ownEntries, root } from '@/docker/local/folders';
import { readHolder } from '@/docker/local/lock';
import { typescriptCommand } from '@/docker/local/node-command';
import { anyFreePort } from '@/docker/local/ports';
import { isRunning } from '@/docker/local/process-identity';

const base = mkdtempSync(path.join(tmpdir(), 'firstpull-start-'));
if (isRoot()) chmodSync(base, 0o711);
const dataFolder = path.join(base, 'data');
const port = await anyFreePort();
const alive = new Set<() => void>();
afterAll(() => {
  alive.forEach((kill) => kill());
  rmSync(base, { recursive: true, force: true });
});

/** Runs the start command as a person would, and gathers what it prints. */
function start(...args: string[]) {
  const child = spawn(process.execPath, ['docker/local/start.mjs', ...args], {
    cwd: root,
    env: { ...process.env, NODE_ENV: undefined, PORT: String(port), FIRSTPULL_DATA_DIR: dataFolder } as never,
    stdio: ['ignore', 'pipe', 'pipe'],
  });
  const kill = () => child.kill('SIGTERM');
  alive.add(kill);
  let output = '';
  const ended = new Promise<number | null>((resolve) => child.once('close', resolve)).finally(() =>
    alive.delete(kill),
  );
  const says = (words: string) =>
    new Promise<void>((resolve, reject) => {
      const look = () => output.includes(words) && resolve();
      child.stdout.on('data', look);
      void ended.then((code) =>
        reject(new Error(`ended with code ${code} before it said "${words}":\n${output}`)),
      );
      look();
    });
  for (const stream of [child.stdout, child.stderr]) stream.on('data', (chunk: Buffer) => (output += chunk));
  return { child, ended, says, output: () => output };
}

/** `npm run audit:verify` in a second terminal, which knows the data folder and nothing else. */
function auditBeside(): Promise<{ code: number; output: string }> {
  const [program, ...args] = typescriptCommand(path.join(root, 'docker/local/audit-verify.ts'));
  const env = { PATH: process.env.PATH, FIRSTPULL_DATA_DIR: dataFolder } as never;
  return new Promise((resolve) =>
    execFile(program, args, { cwd: root, env }, (error, out, err) =>
      resolve({ code: error ? Number(error.code) : 0, output: out + err }),
    ),
  );
}

const secrets = () => readFileSync(path.join(dataFolder, 'secrets.json'), 'utf8');
const children = () => Object.values(readHolder(dataFolder)!.children);

describe('npm start', () => {
  it('starts, says where and who, refuses a second start, and stops all that it started', async () => {
    const first = start();
    await first.says(`Open http://127.0.0.1:${port} | mail http://127.0.0.1:`);
    expect(first.output()).toMatch(/sign in as \S+@\S+\.example/);
    expect((await fetch(`http://127.0.0.1:${port}/api/live`)).status).toBe(200);
    const started = children();
    expect(started.map(isRunning)).toEqual([true, true, true, true, true, true]);

    const audit = await auditBeside();
    expect(audit.output).toContain('Everything is as it was written.');
    expect(audit.code).toBe(0);

    const second = start();
    expect(await second.ended).toBe(1);
    expect(second.output()).toContain(`already runs on ${dataFolder}`);
    expect(started.every(isRunning)).toBe(true);

    first.child.kill('SIGTERM');
    expect(await first.ended).toBe(0);
    expect(started.filter(isRunning)).toEqual([]);
    expect(readHolder(dataFolder)).toBeNull();
  });

  it('starts again on the same data after it was killed without a chance to tidy up', async () => {
    const before = secrets();
    const first = start();
    await first.says('Up after');
    const left = children();
    first.child.kill('SIGKILL');
    await first.ended;

    const second = start();
    await second.says('Up after');
    expect(second.output()).toContain(
      'An earlier start was killed and left the database running; ending it.',
    );
    expect(second.output()).toContain('nothing changed');
    expect(left.filter(isRunning)).toEqual([]);
    expect(secrets()).toBe(before);
    // A start knows all that earlier ones left in the folder; it would refuse anything else.
    const known = (name: string) => ownEntries.some((own) => name.startsWith(own));
    expect(readdirSync(dataFolder).filter((name) => !known(name))).toEqual([]);
    second.child.kill('SIGINT');
    expect(await second.ended).toBe(130);
  });

  it('starts afresh after a reset, and can be stopped while it is still starting', async () => {
    const before = secrets();
    const run = start('--reset', '--yes');
    await run.says('schema ');
    expect(secrets()).not.toBe(before);
    const started = children();
    expect(started.some(isRunning)).toBe(true);
    run.child.kill('SIGTERM');
    expect(await run.ended).toBe(0);
    expect(run.output()).not.toContain('Up after');
    expect(started.filter(isRunning)).toEqual([]);
  });
});
