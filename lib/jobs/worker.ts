import { closeDatabases } from '@/db/client';
import { workerEnv } from '@/lib/env/env';
import { log } from '@/lib/log/log';
import { startWorker } from './start-worker';

// The worker process: `npm run worker`. SIGTERM and SIGINT hand jobs back and end it; SIGKILL loses nothing,
// because every job is held by a lease only.

const env = workerEnv();
const worker = await startWorker({ threads: env.WORKER_THREADS });

let stopping = false;
async function stop(signal: string): Promise<void> {
  if (stopping) return;
  stopping = true;
  log().info({ signal }, 'worker stops');
  // Whatever hangs does not keep the process alive; leases bring its jobs back.
  setTimeout(() => process.exit(1), 12_000).unref();
  await worker.stop();
  await closeDatabases();
  process.exit(0);
}
process.on('SIGTERM', () => void stop('SIGTERM'));
process.on('SIGINT', () => void stop('SIGINT'));
process.on('unhandledRejection', (error) => log().error({ err: error }, 'unhandled rejection'));
