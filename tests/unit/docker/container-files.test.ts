import { spawnSync } from 'node:child_process';
import { existsSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { validate } from 'dockerfile-utils';
import { describe, expect, it } from 'vitest';
import { parse } from 'yaml';

const root = path.resolve(import.meta.dirname, '../../..');
const read = (file: string) => readFileSync(path.join(root, file), 'utf8');
const dockerfile = read('docker/Dockerfile');

interface Stage {
  name: string;
  from: string;
  lines: string[];
}
const stages: Stage[] = [];
for (const line of dockerfile.replaceAll('\\\n', ' ').split('\n')) {
  const from = line.match(/^FROM (\S+) AS (\S+)$/);
  if (from) stages.push({ from: from[1], name: from[2], lines: [] });
  else if (line && !line.startsWith('#')) stages.at(-1)!.lines.push(line);
}
const stage = (name: string) => stages.find((one) => one.name === name)!;

describe('docker/Dockerfile', () => {
  it('satisfies the linter', () => {
    expect(
      validate(dockerfile, {}).map(({ message, range }) => `${range.start.line + 1}: ${message}`),
    ).toEqual([]);
  });

  it.each(['web', 'worker', 'realtime'])('%s runs as an ordinary user, with a health check', (name) => {
    const { lines } = stage(name);
    expect(lines.filter((line) => line.startsWith('USER '))).toEqual(['USER node']);
    expect(lines.filter((line) => line.startsWith('HEALTHCHECK '))).toHaveLength(1);
    // Nothing is written into the image after the last root step.
    const after = lines.slice(lines.indexOf('USER node'));
    expect(after.filter((line) => /^(COPY|RUN|ADD)/.test(line))).toEqual([]);
  });

  it('copies only what is in the checkout', () => {
    const copied = stages.flatMap(({ lines }) =>
      lines.filter((line) => /^COPY (?!--from)/.test(line)).flatMap((line) => line.split(' ').slice(1, -1)),
    );
    expect(copied.length).toBeGreaterThan(8);
    const missing = copied.filter((source) => !existsSync(path.join(root, source.replace(/\/?\*.*$/, ''))));
    expect(missing).toEqual([]);
  });

  it('uses the Node that package.json asks for, pinned', () => {
    expect(stage('base').from).toMatch(/^node:20\.(19|[2-9]\d)-[a-z-]+$/);
  });
});

describe('docker/compose.yaml', () => {
  type Service = {
    image?: string;
    build?: { dockerfile: string; target: string };
    environment?: Record<string, string>;
    ports?: string[];
    read_only?: boolean;
  };
  const compose = parse(read('docker/compose.yaml'), { merge: true }) as {
    services: Record<string, Service>;
  };
  const services = Object.entries(compose.services);

  it('satisfies the linter, which knows the Compose schema', () => {
    const linter = path.join(root, 'node_modules/dclint/bin/dclint.cjs');
    const run = spawnSync(process.execPath, [linter, '--max-warnings', '0', 'docker/compose.yaml'], {
      cwd: root,
      encoding: 'utf8',
    });
    expect([run.status, run.stdout.trim()]).toEqual([0, '']);
  });

  it('builds only targets that the Dockerfile has', () => {
    const targets = services.flatMap(([, { build }]) => (build ? [build.target] : []));
    expect(new Set(targets)).toEqual(new Set(['web', 'worker', 'realtime']));
    expect(targets.filter((target) => !stage(target))).toEqual([]);
  });

  it('pins every image and opens every port on loopback only', () => {
    const images = services.flatMap(([, { image }]) => (image ? [image] : []));
    expect(images.filter((image) => !/:[\w.-]*\d[\w.-]*$/.test(image))).toEqual([]);
    const ports = services.flatMap(([, service]) => service.ports ?? []);
    expect(ports.filter((port) => !port.startsWith('127.0.0.1:'))).toEqual([]);
  });

  it('gives web and worker every variable that lib/env demands, and never the demo studio', async () => {
    const { EnvironmentError, env, workerEnv } = await import('@/lib/env/env');
    const problemsOf = (read: () => unknown, service: Service) => {
      for (const name of Object.keys(process.env))
        if (/^(S3|PUSHER|SMTP|MAIL|APP|.*DATABASE)_/.test(name)) delete process.env[name];
      const filled = Object.entries(service.environment!).map(([name, value]) => [name, fill(name, value)]);
      Object.assign(process.env, Object.fromEntries(filled));
      try {
        read();
        return [];
      } catch (error) {
        if (error instanceof EnvironmentError) return error.problems;
        throw error;
      }
    };
    expect(problemsOf(env, compose.services.web)).toEqual([]);
    expect(problemsOf(workerEnv, compose.services.worker)).toEqual([]);
    expect(read('docker/compose.yaml')).not.toContain('DEMO_STUDIO');
  });

  it('names every variable in the example, and no secret in either file', () => {
    const needed = [...read('docker/compose.yaml').matchAll(/\$\{(\w+):\?/g)].map(([, name]) => name);
    const example = Object.fromEntries(
      read('docker/compose.env.example')
        .split('\n')
        .filter((line) => /^\w+=/.test(line))
        .map((line) => line.split('=')),
    );
    expect(new Set(needed)).toEqual(new Set(Object.keys(example)));
    const secrets = Object.entries(example).filter(([name]) => /PASSWORD|SECRET|KEY/.test(name));
    expect(secrets.filter(([, value]) => value !== '')).toEqual([]);
  });
});

/** Stands in for what a person fills in: 64 letters for a secret, an address where one is asked for. */
function fill(name: string, value: string): string {
  const inserted = /ENDPOINT|APP_URL/.test(name) ? 'http://127.0.0.1:9000' : 'x'.repeat(64);
  return value.replace(/\$\{(\w+):-([^}]*)\}/g, '$2').replace(/\$\{[^}]*\}/g, inserted);
}
