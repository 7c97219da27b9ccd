import { parseArgs } from 'node:util';
import { dataFolderPath, LocalError, openDataFolder } from './folders';
import { lockDataFolder, type DataLock } from './lock';
import { choosePorts } from './ports';
import { resetData } from './reset';
import { signInLine } from './sign-in-line';
import type { Service } from './service';
import type { StepPrinter } from './setup/step-line.mjs';
import { startProduct, stopAll, type Product } from './start-product';

/**
 * Runs the product until a signal comes or a part of it gives up.
 * @returns the exit code
 */
export async function runLocal(args: string[], printer: StepPrinter): Promise<number> {
  const { values } = parseArgs({
    args,
    options: { dev: { type: 'boolean' }, reset: { type: 'boolean' }, yes: { type: 'boolean' } },
  });
  const started: Service[] = [];
  let lock: DataLock | undefined;
  let starting: Promise<Product> | undefined;
  const ending = waitForEnd(started, printer);
  try {
    const folder = process.env.FIRSTPULL_DATA_DIR;
    if (values.reset && !(await resetData(dataFolderPath(folder), values.yes ?? false))) {
      printer.note('Nothing was deleted.');
      return 0;
    }
    const dataFolder = openDataFolder(folder);
    lock = await lockDataFolder(dataFolder, printer.note);
    const ports = await choosePorts(process.env.PORT, printer.note);
    const held = lock;
    starting = startProduct(
      {
        dataFolder,
        ports,
        printer,
        dev: values.dev,
        events: {
          onStart: (name, pid) => held.noteChild(name, pid),
          onEnd: (name) => held.noteChild(name, undefined),
          say: printer.note,
          onGiveUp: ending.giveUp,
        },
        signal: ending.signal,
      },
      started,
    );
    const asked = ending.requested.then((code) => Promise.reject(new Ended(code)));
    const product = await Promise.race([starting, asked]);
    lock.noteAddress(product.baseUrl);
    lock.notePorts(ports);
    const seconds = Math.round(process.uptime());
    printer.note(`Up after ${seconds} s; Ctrl-C stops everything. Logs are in ${dataFolder}/logs.`);
    printer.note(signInLine(product));
    return await ending.requested;
  } catch (error) {
    if (error instanceof Ended) return error.code;
    printer.note(error instanceof LocalError ? error.message : String((error as Error).stack ?? error));
    return 1;
  } finally {
    if (started.length > 0) printer.note('Stopping …');
    await stopAll(started).catch((error: unknown) => printer.note(String(error)));
    await starting?.catch(() => undefined);
    if (started.length > 0) printer.note('Stopped.');
    lock?.release();
  }
}

class Ended extends Error {
  constructor(readonly code: number) {
    super('asked to end');
  }
}

/** Turns signals and given-up services into one wish to end; a second Ctrl-C ends everything hard. */
function waitForEnd(started: Service[], printer: StepPrinter) {
  const stopping = new AbortController();
  let resolve: (code: number) => void = () => undefined;
  const requested = new Promise<number>((done) => (resolve = done));
  void requested.then(() => stopping.abort());
  let first = 0;
  const onSignal = (signal: NodeJS.Signals) => {
    if (first === 0) {
      first = Date.now();
      resolve(signal === 'SIGINT' ? 130 : 0);
      return;
    }
    // npm passes Ctrl-C on to us although the terminal has sent it already; that is not a second one.
    if (Date.now() - first < 1000) return;
    printer.note('Ending everything hard.');
    void Promise.all(started.map((service) => service.crash('down'))).finally(() => process.exit(1));
  };
  (['SIGINT', 'SIGTERM', 'SIGHUP'] as const).forEach((signal) => process.on(signal, onSignal));
  const giveUp = (name: string, lastLines: string) => {
    printer.note(`The ${name} keeps ending; giving up. Its last words:\n${lastLines}`);
    resolve(1);
  };
  return { requested, giveUp, signal: stopping.signal };
}
