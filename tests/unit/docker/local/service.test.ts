import { existsSync, readFileSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { afterEach, describe, expect, it } from 'vitest';
import { identify, isRunning } from '@/docker/local/process-identity';
import { defineService, plainEnvironment, type Service, type ServiceOptions } from '@/docker/local/service';
import { tempFolder } from '../../../support/temp-folder';

const folder = tempFolder();
let made: Service[] = [];
afterEach(async () => {
  await Promise.all(made.map((service) => service.crash('down')));
  made = [];
});

let count = 0;
function define(script: string, more: Partial<ServiceOptions> = {}) {
  const file = path.join(folder, `service-${(count += 1)}.mjs`);
  writeFileSync(file, script);
  const service = defineService({
    name: 'thing',
    url: '',
    command: [process.execPath, file],
    cwd: folder,
    env: plainEnvironment(),
    logFile: `${file}.log`,
    readyLine: 'ready',
    ...more,
  });
  made.push(service);
  return { service, log: () => readFileSync(`${file}.log`, 'utf8') };
}
const forever = `console.log('ready'); setInterval(() => undefined, 1000);`;

describe('a service', () => {
  it('is up when it says so, and gone when it was stopped', async () => {
    const { service } = define(forever);
    await service.start();
    const identity = identify(service.pid()!)!;
    expect(isRunning(identity)).toBe(true);
    await service.stop();
    expect(isRunning(identity)).toBe(false);
    expect(service.pid()).toBeUndefined();
  });

  it('tells the last words of one that ends at once, and does not try again', async () => {
    const said: string[] = [];
    const { service } = define(`console.error('no licence to start'); process.exit(3);`, {
      events: { say: (line) => said.push(line) },
    });
    await expect(service.start()).rejects.toThrow(/The thing ended at once[^]*no licence to start/);
    expect(said).toEqual([]);
  });

  it('tells one that never gets ready, and ends it', async () => {
    const { service, log } = define(`console.log(process.pid); setInterval(() => undefined, 1000);`, {
      answersWithin: 500,
    });
    await expect(service.start()).rejects.toThrow('did not answer within 0.5 s');
    expect(identify(Number(log()))).toBeNull();
  });

  it('is started again after a crash, with a line that says so', async () => {
    const said: string[] = [];
    const { service } = define(forever, { events: { say: (line) => said.push(line) } });
    await service.start();
    const first = service.pid();
    await service.crash();
    await expect.poll(() => service.pid(), { timeout: 10_000 }).toEqual(expect.any(Number));
    expect(service.pid()).not.toBe(first);
    expect(said).toEqual([
      expect.stringContaining('The thing ended unexpectedly (SIGKILL); starting it again.'),
    ]);
  });

  it('is given up when it keeps crashing', async () => {
    const flag = path.join(folder, 'fail-from-now');
    const giveUp = new Promise<string>((resolve) => {
      const script = `import { existsSync } from 'node:fs';
        if (existsSync(${JSON.stringify(flag)})) { console.log('broken for good'); process.exit(1); }
        ${forever}`;
      const { service } = define(script, { events: { onGiveUp: (_, words) => resolve(words) } });
      void service.start().then(() => {
        writeFileSync(flag, '');
        return service.crash();
      });
    });
    expect(await giveUp).toContain('broken for good');
  });

  it('takes with it what it started itself', async () => {
    const { service, log } = define(
      `import { spawn } from 'node:child_process';
       const child = spawn('sleep', ['600']);
       console.log(child.pid + ' ready'); setInterval(() => undefined, 1000);`,
    );
    await service.start();
    const child = identify(Number.parseInt(log(), 10))!;
    expect(isRunning(child)).toBe(true);
    await service.stop();
    await expect.poll(() => isRunning(child)).toBe(false);
  });

  it('is ended hard when it does not listen', async () => {
    const { service } = define(`process.on('SIGTERM', () => undefined); ${forever}`, { stopWithin: 200 });
    await service.start();
    const identity = identify(service.pid()!)!;
    await service.stop();
    expect(isRunning(identity)).toBe(false);
  });

  it('hears its own signal first, so that it can tidy up', async () => {
    const tidied = path.join(folder, 'tidied');
    const { service } = define(
      `import { writeFileSync } from 'node:fs';
       process.on('SIGTERM', () => { writeFileSync(${JSON.stringify(tidied)}, ''); process.exit(0); }); ${forever}`,
    );
    await service.start();
    await service.stop();
    expect(existsSync(tidied)).toBe(true);
  });
});
