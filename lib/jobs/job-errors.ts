import { AppError } from '@/lib/errors/app-error';

/** Trying again would end the same way: the job is given up at once, with this reason for people to read. */
export class PermanentFailure extends Error {
  override readonly name = 'PermanentFailure';
}

/** Why a running handler must stop; the signal's reason. */
export class JobStopped extends Error {
  override readonly name = 'JobStopped';
  constructor(readonly why: 'lease-lost' | 'worker-stops' | 'time-limit') {
    super(`the job was stopped: ${why}`);
  }
}

/** What a person is told about a failed try; details of our own faults stay in the log. */
export function reasonOf(error: unknown): string {
  if (error instanceof PermanentFailure || error instanceof AppError) return error.message;
  if (error instanceof JobStopped && error.why === 'time-limit')
    return 'The work took longer than its time limit. Make the model smaller (fewer triangles) and post it again.';
  if ((error as { code?: string })?.code === 'ERR_WORKER_OUT_OF_MEMORY')
    return 'The model needs more memory than this machine gives one check. Make it smaller (fewer triangles) and post it again.';
  return 'The work failed on our side. The log has the details.';
}
