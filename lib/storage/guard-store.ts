import { AppError } from '@/lib/errors/app-error';

/** The object is not in the store: a missing file behind a row is never taken for an empty one. */
export class MissingObject extends Error {
  override readonly name = 'MissingObject';
  constructor(readonly key: string) {
    super(`The store has no object ${key}`);
  }
}

type StoreFault = { name?: string; Code?: string; $metadata?: { httpStatusCode?: number } };

/** Whether the store answered "no such object" (or no such upload in parts). */
export function isMissing(error: unknown): boolean {
  const { name, $metadata } = error as StoreFault;
  return (
    name === 'NoSuchKey' ||
    name === 'NotFound' ||
    name === 'NoSuchUpload' ||
    $metadata?.httpStatusCode === 404
  );
}

/** Whether the store does not have a part as it was told: lost, replaced, or of another ETag. */
export function isPartAmiss(error: unknown): boolean {
  const { name } = error as StoreFault;
  return name === 'InvalidPart' || name === 'InvalidPartOrder';
}

/** Runs a call to the store; what fails for want of the store says so, and that nothing was lost. */
export async function guardStore<T>(key: string, call: () => Promise<T>): Promise<T> {
  try {
    return await call();
  } catch (error) {
    if (error instanceof AppError || error instanceof MissingObject) throw error;
    if (isMissing(error)) throw new MissingObject(key);
    const status = (error as StoreFault).$metadata?.httpStatusCode;
    // No status: no connection, a reset or a time-out. 4xx is our own mistake and stays what it is.
    if (status !== undefined && status < 500 && status !== 429) throw error;
    throw new AppError(
      'unavailable',
      'The file store does not answer. Nothing was lost; try again shortly.',
      {
        reason: 'store-unavailable',
        retryAfterS: 10,
        cause: error,
      },
    );
  }
}
