import path from 'node:path';
import { bootstrapDatabase, dropDatabase } from '@/db/bootstrap';
import { migrate } from '@/db/migrate';
import { buildApp } from './build-app';
import { defineServices } from './define-services';
import type { Ports } from './ports';
import type { Postgres } from './postgres';
import { databaseName, productEnvironment, type ProductEnvironment } from './product-environment';
import { openSecrets } from './secrets';
import { seedBrokeOff, seedDemoOnce, type DemoSignIn } from './seed-demo';
import type { Service, ServiceEvents } from './service';
import type { StepPrinter } from './setup/step-line.mjs';

export interface ProductOptions {
  dataFolder: string;
  ports: Ports;
  printer: StepPrinter;
  dev?: boolean;
  demo?: boolean;
  /** A database that may be lost with the power: for tests. */
  throwaway?: boolean;
  events?: ServiceEvents;
  /** Once aborted, no further part is started, and a build or seed in hand ends. */
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
 * Brings up the whole product, each part as soon as the parts it needs answer.
 * @param started receives every service before it starts, so that the caller can stop what is up if a later one fails
 */
export async function startProduct(options: ProductOptions, started: Service[]): Promise<Product> {
  const { dataFolder, ports, printer, dev = false, demo = true, throwaway, events } = options;
  const secrets = openSecrets(dataFolder);
  const env = productEnvironment(ports, secrets, { dev, demo });
  const echo = dev ? (name: string) => (line: string) => printer.note(`[${name}] ${line}`) : undefined;
  const define = defineServices({ dataFolder, ports, secrets, env, dev, throwaway, events, echo });
  const logOf = (name: string) => path.join(dataFolder, 'logs', `${name}.log`);
  const failed = new AbortController();
  const signal = options.signal ? AbortSignal.any([options.signal, failed.signal]) : failed.signal;

  const up = <S extends Service>(label: string, make: () => S, describe: (service: S) => string) =>
    printer.step(
      label,
      async () => {
        signal.throwIfAborted();
        const service = make();
        started.push(service);
        await service.start();
        return service;
      },
      describe,
    );

  async function openDatabase(): Promise<Postgres> {
    const database = await up(
      'database',
      define.database,
      (service) => `PostgreSQL ${service.version} on port ${ports.database}, files in ${service.folder}`,
    );
    const prepare = async () => {
      if (demo && seedBrokeOff(dataFolder)) await dropDatabase(database.adminUrl, databaseName);
      const passwords = secrets.databaseRoles;
      await bootstrapDatabase({ adminUrl: database.adminUrl, database: databaseName, passwords });
      await migrate(env.ownerUrl);
    };
    await printer.step('schema', prepare, () => 'up to date');
    return database;
  }

  /** The seed posts real files, which the running worker reads and checks. */
  function seed(): Promise<DemoSignIn[]> {
    const work = () => seedDemoOnce(dataFolder, env.seed, logOf('seed'), signal);
    return printer.longStep(
      'demo studio',
      'posting its templates, checking them',
      work,
      (all) => `${all.length} people`,
    );
  }

  async function build(): Promise<string | null> {
    if (dev) return null;
    const work = () => buildApp(logOf('build'), signal);
    const describe = ({ built }: { built: boolean }) => (built ? 'built' : 'nothing changed');
    const { folder } = await printer.longStep('application build', 'building', work, describe);
    return folder;
  }

  // The first failure keeps further parts from starting; what is under way comes to its end before it is told.
  let cause: { error: unknown } | undefined;
  const part = <T>(work: Promise<T>): Promise<T> => {
    work.catch((error: unknown) => {
      cause ??= { error };
      failed.abort(error);
    });
    return work;
  };
  const database = part(openDatabase());
  const store = part(up('object store', define.store, () => `on port ${ports.store}`));
  const mail = part(up('mail catcher', define.mail, ({ url }) => `on port ${ports.smtp}, page ${url}`));
  const realtime = part(up('realtime server', define.realtime, () => `on port ${ports.realtime}`));
  const release = part(build());
  const worker = part(database.then(() => up('worker', define.worker, () => 'running')));
  const people = part(Promise.all([worker, store, mail, realtime]).then(() => (demo ? seed() : [])));
  const app = part(
    Promise.all([release, database]).then(([folder]) =>
      up(
        'application',
        () => define.app(folder),
        ({ url }) => `listens on ${url}`,
      ),
    ),
  );
  await Promise.allSettled([database, store, mail, realtime, release, worker, people, app]);
  if (cause) throw (cause as { error: unknown }).error;
  const services = {
    database: await database,
    store: await store,
    mail: await mail,
    realtime: await realtime,
    worker: await worker,
    app: await app,
  };
  return {
    baseUrl: services.app.url,
    mailUrl: services.mail.url,
    adminUrl: services.database.adminUrl,
    env,
    people: await people,
    services,
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
