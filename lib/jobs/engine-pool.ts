import path from 'node:path';
import { MessageChannel } from 'node:worker_threads';
import { Piscina } from 'piscina';
import { log } from '@/lib/log/log';
import type { Analysed, AnalyseTask, Inspected, InspectTask } from './engine-thread';

export type OnProgress = (stage: string, fraction: number) => void;

/** Threads that run the engine, so that a long check never holds up leases, mails or other jobs. */
export interface EnginePool {
  /** `bytes` are handed over to the thread and are gone here afterwards. An aborted run ends its thread at once. */
  inspect(task: InspectTask, signal: AbortSignal): Promise<Inspected>;
  analyse(
    task: Omit<AnalyseTask, 'progress'>,
    signal: AbortSignal,
    onProgress: OnProgress,
  ): Promise<Analysed>;
  close(): Promise<void>;
}

export function openEnginePool(threads: number): EnginePool {
  const pool = new Piscina({
    filename: path.join(import.meta.dirname, 'engine-thread-entry.mjs'),
    execArgv: [],
    minThreads: 1,
    maxThreads: threads,
    idleTimeout: 60_000,
    concurrentTasksPerWorker: 1,
    resourceLimits: { maxOldGenerationSizeMb: 3_072 },
  });
  // A thread that dies takes its own run with it, and the run's promise says so; the process lives on.
  pool.on('error', (error) => log().error({ err: error }, 'engine thread died'));
  return {
    inspect: (task, signal) =>
      pool.run(task, { name: 'inspectMesh', signal, transferList: [task.bytes.buffer as ArrayBuffer] }),

    async analyse(task, signal, onProgress) {
      const { port1, port2 } = new MessageChannel();
      port1.on('message', ({ stage, fraction }) => onProgress(stage, fraction));
      try {
        return await pool.run(
          { ...task, progress: port2 },
          { name: 'analyseMesh', signal, transferList: [task.bytes.buffer as ArrayBuffer, port2] },
        );
      } finally {
        port1.close();
      }
    },

    // Running threads are ended, not awaited: their jobs were handed back or are fenced out.
    close: () => pool.destroy(),
  };
}
