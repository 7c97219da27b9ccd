import path from 'node:path';
import { bootstrapDatabase, dropDatabase } from '@/db/bootstrap';
import { migrate } from '@/db/migrate';
import { defineApp } from './app';
import { buildApp } from './build-app';
import { defineMail } from './mail';
import type { Ports } from './ports';
import { definePostgres, type Postgres } from './postgres';
import { databaseName, productEnvironment, type ProductEnvironment } from './product-environment';
import { defineRealtime } from './realtime';
import { openSecrets } from './secrets';
import { seedBrokeOff, seedDemoOnce, type DemoSignIn } from './seed-demo';
import type { Service, ServiceEvents } from './service';
import type { StepPrinter } from './setup/step-line.mjs';
import { defineStore } from './store';
import { defineWorker } from './worker';

export interface ProductOptions {
  dataFolder: string;
  ports: Ports;
  printer: StepPrinter;
  dev?: boolean;
  demo?: boolean;
  /** A database that may be lost with the power: for tests. */
  throwaway?: boolean;
  events?: ServiceEvents;
  /** Once aborted, no further part is started. */
  signal?: AbortSignal;
}

export interface Product {
  baseUrl: string;
  mailUrl: string;
  adminUrl: string;
  env: ProductEnvironment;
  people: DemoSignIn[];
  services: {
    database: Postgres;
    store: Service;
    mail: Service;
    realtime: Service;
    worker: Service;
    app: Service;
  };
}

/**
 * Brings up the whole product, each part when the parts it needs answer.
 * @param started receives every service before it starts, so that the caller can stop what is up if a later one fails
 */
export async function startProduct(options: ProductOptions, started: Service[]): Promise<Product> {
  const { dataFolder, ports, printer, dev = false, demo = true, throwaway, events, signal } = options;
  const secrets = openSecrets(dataFolder);
  const logOf = (name: string) => path.join(dataFolder, 'logs', `${name}.log`);
  const up = <S extends Service>(label: string, define: () => S, describe: (service: S) => string) =>
    printer.step(
      label,
      async () => {
        signal?.throwIfAborted();
        const service = define();
        started.push(service);
        await service.start();
        return service;
      },
      describe,
    );
  const env = productEnvironment(ports, secrets, { dev, demo });
  const echo = (name: string) => (dev ? (line: string) => printer.note(`[${name}] ${line}`) : undefined);

  const release = dev
    ? null
    : await printer.longStep(
        'application build',
        () => buildApp(logOf('build')),
        ({ built }) => (built ? 'built' : 'nothing changed'),
      );
  const openDatabase = async () => {
    const database = await up(
      'database',
      () =>
        definePostgres({
          dataFolder,
          port: ports.database,
          adminPassword: secrets.databaseAdmin,
          logFile: logOf('database'),
          throwaway,
          events,
        }),
      (service) => `PostgreSQL ${service.version} on port ${ports.database}, files in ${service.folder}`,
    );
    await printer.step(
      'schema',
      async () => {
        const passwords = secrets.databaseRoles;
        if (demo && seedBrokeOff(dataFolder)) await dropDatabase(database.adminUrl, databaseName);
        await bootstrapDatabase({ adminUrl: database.adminUrl, database: databaseName, passwords });
        await migrate(env.ownerUrl);
      },
      () => 'up to date',
    );
    return database;
  };
  const openStore = () =>
    up(
      'object store',
      () =>
        defineStore({
          folder: path.join(dataFolder, 'store'),
          port: ports.store,
          credentials: secrets.store,
          origins: [`http://127.0.0.1:${ports.app}`, `http://localhost:${ports.app}`],
          logFile: logOf('store'),
          events,
        }),
      () => `on port ${ports.store}`,
    );
  const openMail = () =>
    up(
      'mail catcher',
      () =>
        defineMail({
          folder: path.join(dataFolder, 'mail'),
          smtpPort: ports.smtp,
          pagePort: ports.mail,
          logFile: logOf('mail'),
          events,
        }),
      (service) => `on port ${ports.smtp}, page ${service.url}`,
    );
  const openRealtime = () =>
    up(
      'realtime server',
      () => defineRealtime({ port: ports.realtime, ...secrets.realtime, logFile: logOf('realtime'), events }),
      () => `on port ${ports.realtime}`,
    );
  // None of these needs another one.
  const [database, store, mail, realtime] = await Promise.all([
    openDatabase(),
    openStore(),
    openMail(),
    openRealtime(),
  ]);
  const worker = await up(
    'worker',
    () => defineWorker({ env: env.worker, dev, logFile: logOf('worker'), echo: echo('worker'), events }),
    () => 'running',
  );
  // The seed posts real files, which the running worker reads and checks.
  const people = demo
    ? await printer.longStep(
        'demo studio',
        () => seedDemoOnce(dataFolder, env.seed, logOf('seed')),
        (all) => `${all.length} people`,
      )
    : [];
  const app = await up(
    'application',
    () =>
      defineApp({
        port: ports.app,
        env: env.app,
        release: release?.folder ?? null,
        logFile: logOf('app'),
        echo: echo('app'),
        events,
      }),
    (service) => service.url,
  );
  return {
    baseUrl: app.url,
    mailUrl: mail.url,
    adminUrl: database.adminUrl,
    env,
    people,
    services: { database, store, mail, realtime, worker, app },
  };
}

/** Stops in the opposite order of starting; goes on when one fails to stop, and tells at the end. */
export async function stopAll(started: Service[]): Promise<void> {
  const failures: unknown[] = [];
  for (const service of [...started].reverse()) {
    await service.stop().catch((error: unknown) => failures.push(error));
  }
  if (failures.length > 0) throw new AggregateError(failures, 'not every service could be stopped');
}
