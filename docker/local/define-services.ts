import path from 'node:path';
import { defineApp } from './app';
import { defineMail } from './mail';
import type { Ports } from './ports';
import { definePostgres } from './postgres';
import type { ProductEnvironment } from './product-environment';
import { defineRealtime } from './realtime';
import type { Secrets } from './secrets';
import type { ServiceEvents } from './service';
import { defineStore } from './store';
import { defineWorker } from './worker';

export interface ServiceSetting {
  dataFolder: string;
  ports: Ports;
  secrets: Secrets;
  env: ProductEnvironment;
  dev: boolean;
  /** A database that may be lost with the power: for tests. */
  throwaway?: boolean;
  events?: ServiceEvents;
  /** Where lines of application and worker go as well as into their logs, in development. */
  echo?: (name: string) => (line: string) => void;
}

/** How each part of the product is started, for one data folder and one set of ports. */
export function defineServices({
  dataFolder,
  ports,
  secrets,
  env,
  dev,
  throwaway,
  events,
  echo,
}: ServiceSetting) {
  const common = (name: string) => ({ logFile: path.join(dataFolder, 'logs', `${name}.log`), events });
  return {
    database: () =>
      definePostgres({
        ...common('database'),
        dataFolder,
        port: ports.database,
        adminPassword: secrets.databaseAdmin,
        throwaway,
      }),
    store: () =>
      defineStore({
        ...common('store'),
        folder: path.join(dataFolder, 'store'),
        port: ports.store,
        credentials: secrets.store,
        origins: [`http://127.0.0.1:${ports.app}`, `http://localhost:${ports.app}`],
      }),
    mail: () =>
      defineMail({
        ...common('mail'),
        folder: path.join(dataFolder, 'mail'),
        smtpPort: ports.smtp,
        pagePort: ports.mail,
      }),
    realtime: () => defineRealtime({ ...common('realtime'), ...secrets.realtime, port: ports.realtime }),
    worker: () => defineWorker({ ...common('worker'), env: env.worker, dev, echo: echo?.('worker') }),
    /** @param release the folder of a built release, or null to run from the sources */
    app: (release: string | null) =>
      defineApp({ ...common('app'), env: env.app, port: ports.app, release, echo: echo?.('app') }),
  };
}
