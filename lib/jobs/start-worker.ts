import { randomUUID } from 'node:crypto';
import { hostname } from 'node:os';
import { buildPackHandler } from './handlers/build-pack';
import { checkRevisionHandler } from './handlers/check-revision';
import { readUploadHandler } from './handlers/read-upload';
import { log } from '@/lib/log/log';
import { boss, stopBoss } from './boss';
import { openEnginePool } from './engine-pool';
import type { JobMessage } from './enqueue-job';
import type { JobKind } from './jobs-data';
import { listenForWork } from './listen';
import { startRelay } from './relay/start-relay';
import { runJob, type JobRunner } from './run-job';
import { sweepGates } from './sweep-gates';
import { sweepJobs } from './sweep-jobs';

const sweepMs = 10_000;
/** Due days count in days, and people leave rarely. */
const gatesMs = 60_000;

export type RunningWorker = {
  name: string;
  /** Takes no new job, hands back those in hand, lets mails under way end; then everything is closed. */
  stop(): Promise<void>;
};

/**
 * Everything that works in the background, in this process: the three queues, the engine's threads, the
 * sweeps for jobs of killed workers and for open gates, and the outbox relay. Any number of processes may do so side by side.
 */
export async function startWorker({ threads }: { threads: number }): Promise<RunningWorker> {
  const queue = await boss({ supervise: true });
  const stopping = new AbortController();
  const runner: JobRunner = {
    worker: `${hostname()}:${process.pid}:${randomUUID().slice(0, 8)}`,
    engine: openEnginePool(threads),
    stopping: stopping.signal,
    handlers: {
      'read-upload': readUploadHandler,
      'check-revision': checkRevisionHandler,
      'build-pack': buildPackHandler,
    },
  };
  // Reading and packing mostly wait for the store; checks fill the threads.
  const lanes: Record<JobKind, number> = { 'read-upload': 2, 'check-revision': threads, 'build-pack': 1 };
  const inHand = new Set<Promise<void>>();
  const fetchers: string[] = [];
  const wakeQueues = () => fetchers.forEach((id) => queue.notifyWorker(id));

  for (const name of Object.keys(lanes) as JobKind[])
    for (let lane = 0; lane < lanes[name]; lane++) {
      const fetcher = await queue.work<JobMessage>(
        name,
        { batchSize: 1, pollingIntervalSeconds: 1 },
        async ([message]) => {
          const run = runJob(message.data, runner).catch((error) =>
            // The lease runs out and the sweep brings the job back.
            log().error({ err: error, ...message.data }, 'job left unsettled'),
          );
          inHand.add(run);
          await run;
          inHand.delete(run);
          // Look for the next one at once.
          queue.notifyWorker(fetcher);
        },
      );
      fetchers.push(fetcher);
    }

  const relay = startRelay();
  const listener = listenForWork((table) => (table === 'jobs' ? wakeQueues() : relay.wake()));
  const sweep = () => void sweepJobs().catch((error) => log().warn({ err: error }, 'sweep failed'));
  const sweeper = setInterval(sweep, sweepMs);
  sweep();
  let gates: Promise<void> | null = null;
  const lookAfterGates = () => {
    gates ??= sweepGates(stopping.signal)
      .catch((error) => log().warn({ err: error }, 'gates not swept'))
      .finally(() => (gates = null));
  };
  const gateSweeper = setInterval(lookAfterGates, gatesMs);
  lookAfterGates();
  log().info({ worker: runner.worker, threads }, 'worker is ready');

  return {
    name: runner.worker,
    async stop() {
      clearInterval(sweeper);
      clearInterval(gateSweeper);
      stopping.abort();
      await listener.stop();
      await Promise.all([...inHand, gates]);
      await Promise.all([relay.stop(), runner.engine.close(), stopBoss()]);
      log().info({ worker: runner.worker }, 'worker has stopped');
    },
  };
}
