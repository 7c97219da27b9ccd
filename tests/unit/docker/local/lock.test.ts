import { spawn } from 'node:child_process';
import { existsSync, mkdirSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { describe, expect, it } from 'vitest';
import { lockDataFolder, readHolder } from '@/docker/local/lock';
import { identify, isRunning } from '@/docker/local/process-identity';
import { tempFolder } from '../../../support/temp-folder';

const base = tempFolder();
function folder(name: string): string {
  const made = path.join(base, name);
  mkdirSync(made);
  return made;
}
const silent = () => undefined;

describe('the lock on a data folder', () => {
  it('lets one start run, and tells the second who and where', async () => {
    const data = folder('two');
    const lock = await lockDataFolder(data, silent);
    lock.noteAddress('http://127.0.0.1:3000');
    await expect(lockDataFolder(data, silent)).rejects.toThrow(
      `already runs on ${data} (process ${process.pid}, http://127.0.0.1:3000)`,
    );
    lock.release();
    expect(readHolder(data)).toBeNull();
    (await lockDataFolder(data, silent)).release();
  });

  it('is not fooled by a later process with the number of a killed one', async () => {
    const data = folder('recycled');
    const stale = { holder: { pid: process.pid, started: '1' }, children: {} };
    writeFileSync(path.join(data, 'running.json'), JSON.stringify(stale));
    expect(readHolder(data)).toBeNull();
    const lock = await lockDataFolder(data, silent);
    expect(readHolder(data)?.holder.pid).toBe(process.pid);
    lock.release();
  });

  it('ends what a killed start left running, and nothing else', async () => {
    const data = folder('leftovers');
    const left = spawn('sleep', ['600'], { detached: true, stdio: 'ignore' });
    const other = spawn('sleep', ['600'], { detached: true, stdio: 'ignore' });
    const [leftIdentity, otherIdentity] = [identify(left.pid!)!, identify(other.pid!)!];
    const children = { worker: leftIdentity, database: { ...otherIdentity, started: '1' } };
    const stale = { holder: { pid: 2 ** 22 + 1, started: '1' }, children };
    writeFileSync(path.join(data, 'running.json'), JSON.stringify(stale));
    const said: string[] = [];
    const lock = await lockDataFolder(data, (line) => said.push(line));
    expect(said).toEqual(['An earlier start was killed and left the worker running; ending it.']);
    expect([isRunning(leftIdentity), isRunning(otherIdentity)]).toEqual([false, true]);
    other.kill();
    lock.release();
    expect(existsSync(path.join(data, 'running.json'))).toBe(false);
  });

  it('survives a lock file that is cut off', async () => {
    const data = folder('torn');
    writeFileSync(path.join(data, 'running.json'), '{"holder":{"pi');
    (await lockDataFolder(data, silent)).release();
  });
});
