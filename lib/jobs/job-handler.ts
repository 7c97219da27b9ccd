import type { JobContext } from '@/lib/auth/context';
import type { EnginePool, OnProgress } from './engine-pool';
import type { Fence } from './fence';
import type { JobRow } from './jobs-data';

/** What a handler is given: the claimed job, its fence, and a signal that says when to stop. */
export type JobAtWork = {
  ctx: JobContext;
  job: JobRow;
  fence: Fence;
  signal: AbortSignal;
  engine: EnginePool;
  /** Best effort and throttled; `fraction` from 0 to 1. */
  onProgress: OnProgress;
};

export type JobHandler = {
  /** Does the work and writes its result under the fence. Doing it twice ends as doing it once. */
  run(work: JobAtWork): Promise<void>;
  /** Tells the people concerned that the job was given up, under the fence. */
  giveUp(work: Pick<JobAtWork, 'ctx' | 'job' | 'fence'>, reason: string): Promise<void>;
  timeLimitS: number;
};
