import { chmodSync, cpSync, mkdirSync, mkdtempSync, rmSync } from 'node:fs';
import { createServer } from 'node:http';
import type { AddressInfo } from 'node:net';
import { tmpdir } from 'node:os';
import path from 'node:path';
import type { TestProject } from 'vitest/node';
import { isRoot, openDataFolder } from '@/docker/local/folders';
import { anyFreePort, type Ports } from '@/docker/local/ports';
import { databaseName } from '@/docker/local/product-environment';
import type { DemoSignIn } from '@/docker/local/seed-demo';
import type { Service } from '@/docker/local/service';
import { stepPrinter } from '@/docker/local/setup/step-line.mjs';
import { startProduct, stopAll, type Product } from '@/docker/local/start-product';
import { endWithProcess } from './end-with-process';
import { outFolder } from './out-folder';

export interface ProductUnderTest {
  baseUrl: string;
  /** The mail catcher's page; its list is at /api/email. */
  mailUrl: string;
  storeUrl: string;
  /** A superuser in the product's database: for looking past row policies, never for the code under test. */
  adminUrl: string;
  /** The variables that a worker or a script of the product would run with. */
  workerEnv: Record<string, string>;
  ownerUrl: string;
  people: DemoSignIn[];
  /** See tests/support/product.ts. */
  controlUrl: string;
}

declare module 'vitest' {
  export interface ProvidedContext {
    product: ProductUnderTest;
  }
}

/** Starts the whole product as `npm start` does, built for production, on free ports and a data folder of its own. */
export default async function setup(project: TestProject): Promise<() => Promise<void>> {
  const base = mkdtempSync(path.join(tmpdir(), 'firstpull-e2e-'));
  if (isRoot()) chmodSync(base, 0o711);
  const dataFolder = openDataFolder(path.join(base, 'data'));
  const started: Service[] = [];
  endWithProcess(started, base);
  const printer = stepPrinter(process.stderr);
  const teardown = async () => {
    await stopAll(started);
    const kept = path.join(outFolder, 'product-logs');
    mkdirSync(kept, { recursive: true });
    cpSync(path.join(dataFolder, 'logs'), kept, { recursive: true });
    rmSync(base, { recursive: true, force: true });
  };
  try {
    const ports = await freePorts();
    const options = { dataFolder, ports, printer, throwaway: true, events: { say: printer.note } };
    const product = await startProduct(options, started);
    const control = await serveControl(product);
    const inside = new URL(product.adminUrl);
    inside.pathname = `/${databaseName}`;
    project.provide('product', {
      baseUrl: product.baseUrl,
      mailUrl: product.mailUrl,
      storeUrl: product.services.store.url,
      adminUrl: inside.href,
      workerEnv: product.env.worker,
      ownerUrl: product.env.ownerUrl,
      people: product.people,
      controlUrl: control.url,
    });
    return async () => {
      control.close();
      await teardown();
    };
  } catch (error) {
    await teardown();
    throw error;
  }
}

async function freePorts(): Promise<Ports> {
  const names = ['app', 'database', 'store', 'smtp', 'mail', 'realtime'] as const;
  const ports = new Set<number>();
  while (ports.size < names.length) ports.add(await anyFreePort());
  return Object.fromEntries([...ports].map((port, index) => [names[index], port])) as Ports;
}

/** Test files run in processes of their own and reach the services over this address. */
async function serveControl({ services }: Product): Promise<{ url: string; close(): void }> {
  const actions: Record<string, (service: Service) => Promise<void>> = {
    crash: (service) => service.crash(),
    stop: (service) => service.stop(),
    start: (service) => service.start(),
  };
  const server = createServer((request, response) => {
    const [, name, action] = (request.url ?? '').split('/');
    const service = services[name as keyof typeof services];
    if (request.method !== 'POST' || !service || !actions[action]) return void response.writeHead(404).end();
    actions[action](service).then(
      () => response.writeHead(204).end(),
      (error: Error) => response.writeHead(500).end(error.message),
    );
  });
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
  return { url: `http://127.0.0.1:${(server.address() as AddressInfo).port}`, close: () => server.close() };
}
