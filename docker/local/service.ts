import { spawn, type ChildProcess } from 'node:child_process';
import { closeSync, createWriteStream, fstatSync, openSync, readFileSync } from 'node:fs';
import { setTimeout as pause } from 'node:timers/promises';
import { LocalError, type Account } from './folders';
import { signalGroup } from './process-identity';

/** A child process that is started, watched, started again after a crash, and stopped. */
export interface Service {
  readonly name: string;
  readonly url: string;
  pid(): number | undefined;
  /** Resolves when the service answers; rejects with the last lines of its log. */
  start(): Promise<void>;
  /** Asks it to end, and ends it hard when it does not in time. */
  stop(): Promise<void>;
  /** Ends it hard at once; it is started again as after any crash, unless `stay` is 'down'. */
  crash(stay?: 'down'): Promise<void>;
}

export interface ServiceOptions {
  name: string;
  url: string;
  command: [program: string, ...args: string[]];
  cwd: string;
  env: Record<string, string>;
  account?: Account | null;
  logFile: string;
  /** Whether it answers; asked again and again until it does. Without it, `readyLine` tells. */
  answers?: () => Promise<boolean>;
  /** Words in its output that say it is ready. */
  readyLine?: string;
  answersWithin?: number;
  stopSignal?: NodeJS.Signals;
  stopWithin?: number;
  /** Shows its output here as well, line by line. */
  echo?: (line: string) => void;
  events?: ServiceEvents;
}

export interface ServiceEvents {
  onStart?: (name: string, pid: number) => void;
  onEnd?: (name: string) => void;
  /** A line for the person who watches: a crash, a new start. */
  say?: (line: string) => void;
  /** It crashed too often to be started again. */
  onGiveUp?: (name: string, lastLines: string) => void;
}

/** Crashes within a minute after which a service is not started again. */
const crashLimit = 5;

/** Only what programs commonly need; no secrets of the caller's shell. */
export function plainEnvironment(): Record<string, string> {
  const names = [
    'PATH',
    'HOME',
    'USER',
    'LANG',
    'LC_ALL',
    'TZ',
    'TMPDIR',
    'TERM',
    'NODE_OPTIONS',
    'NODE_EXTRA_CA_CERTS',
  ];
  return Object.fromEntries(names.flatMap((name) => (process.env[name] ? [[name, process.env[name]]] : [])));
}

export function defineService(options: ServiceOptions): Service {
  const { name, events = {}, stopSignal = 'SIGTERM', stopWithin = 10_000, answersWithin = 30_000 } = options;
  let child: ChildProcess | undefined;
  let wanted = false;
  // The child that has answered once; only its end is a crash, an earlier end is a failed start.
  let up: ChildProcess | undefined;
  let recovery: Promise<void> | undefined;
  let outputFrom = 0;
  let crashes: number[] = [];

  const hasEnded = () => !child || child.exitCode !== null || child.signalCode !== null;
  const ended = (one: ChildProcess) =>
    new Promise<void>((resolve) => {
      if (one.exitCode !== null || one.signalCode !== null) resolve();
      else one.once('exit', () => resolve());
    });

  async function launch(): Promise<void> {
    const log = openSync(options.logFile, 'a', 0o600);
    outputFrom = fstatSync(log).size;
    const [program, ...args] = options.command;
    const started = spawn(program, args, {
      cwd: options.cwd,
      env: options.env as NodeJS.ProcessEnv,
      ...(options.account ?? {}),
      detached: true,
      stdio: ['ignore', options.echo ? 'pipe' : log, options.echo ? 'pipe' : log],
    });
    closeSync(log);
    child = started;
    const failure = new Promise<never>((_, reject) => started.once('error', reject));
    failure.catch(() => undefined);
    if (options.echo) {
      for (const stream of [started.stdout, started.stderr]) {
        echoLines(stream!, options.echo);
        stream!.pipe(createWriteStream(options.logFile, { flags: 'a', mode: 0o600 }));
      }
    }
    if (started.pid) events.onStart?.(name, started.pid);
    started.once('exit', (code, signal) => {
      events.onEnd?.(name);
      if (wanted && up === started) recovery = recover(signal ?? `code ${code}`);
    });
    await Promise.race([failure, untilItAnswers(started)]);
    up = started;
  }

  async function untilItAnswers(started: ChildProcess): Promise<void> {
    const deadline = Date.now() + answersWithin;
    for (;;) {
      if (started.exitCode !== null || started.signalCode !== null) {
        throw new LocalError(`The ${name} ended at once. Its log ${options.logFile} says:\n${lastLines()}`);
      }
      if (await isReady().catch(() => false)) return;
      if (Date.now() > deadline) {
        throw new LocalError(
          `The ${name} did not answer within ${answersWithin / 1000} s. Its log ${options.logFile} says:\n${lastLines()}`,
        );
      }
      await pause(100);
    }
  }

  async function recover(cause: string): Promise<void> {
    for (;;) {
      const now = Date.now();
      crashes = [...crashes.filter((time) => now - time < 60_000), now];
      if (crashes.length >= crashLimit) {
        wanted = false;
        events.onGiveUp?.(name, lastLines());
        return;
      }
      events.say?.(
        `The ${name} ended unexpectedly (${cause}); starting it again. Its log: ${options.logFile}`,
      );
      await pause(Math.min(250 * 2 ** (crashes.length - 1), 5000));
      if (!wanted) return;
      try {
        await launch();
        return;
      } catch {
        await end('SIGKILL');
        cause = 'it did not come up';
      }
    }
  }

  async function isReady(): Promise<boolean> {
    if (options.answers) return options.answers();
    return readFileSync(options.logFile)
      .subarray(outputFrom)
      .includes(options.readyLine ?? '');
  }

  function lastLines(): string {
    try {
      return readFileSync(options.logFile, 'utf8').trimEnd().split('\n').slice(-15).join('\n');
    } catch {
      return '(no output)';
    }
  }

  async function end(signal: NodeJS.Signals): Promise<void> {
    const one = child;
    if (!one?.pid || hasEnded()) return;
    const gone = ended(one);
    signalGroup(one.pid, signal);
    const timer = setTimeout(() => signalGroup(one.pid!, 'SIGKILL'), stopWithin);
    await gone;
    clearTimeout(timer);
    // Whatever it started itself goes with it.
    signalGroup(one.pid, 'SIGKILL');
  }

  return {
    name,
    url: options.url,
    pid: () => (hasEnded() ? undefined : child?.pid),
    async start() {
      wanted = true;
      crashes = [];
      try {
        await launch();
      } catch (error) {
        wanted = false;
        await end('SIGKILL');
        throw error;
      }
    },
    async stop() {
      wanted = false;
      await end(stopSignal);
      await recovery;
      await end(stopSignal);
    },
    async crash(stay) {
      if (stay === 'down') wanted = false;
      await end('SIGKILL');
    },
  };
}

function echoLines(stream: NodeJS.ReadableStream, echo: (line: string) => void): void {
  let rest = '';
  stream.on('data', (chunk: Buffer) => {
    const lines = (rest + chunk.toString()).split('\n');
    rest = lines.pop() ?? '';
    lines.forEach(echo);
  });
}
