import { AppError } from '@/lib/errors/app-error';

/** The caller changes a version that is no longer the newest. */
export const changedMeanwhile = (what: string, version: number) =>
  new AppError(
    'precondition_failed',
    `Somebody changed this ${what} meanwhile (it is now at version ${version}). Reload it, look at what changed, and save again.`,
    { reason: 'changed-meanwhile' },
  );
