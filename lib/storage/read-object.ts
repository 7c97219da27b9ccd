import { createHash } from 'node:crypto';
import { AppError } from '@/lib/errors/app-error';
import type { Store } from './store';

/** The object has another length than its row says. */
export class LengthMismatch extends Error {
  override readonly name = 'LengthMismatch';
  constructor(
    readonly expected: number,
    readonly found: number,
  ) {
    super(`The object has ${found} bytes, not ${expected}.`);
  }
}

/**
 * Streams an object of known length into memory of its own and takes its SHA-256 on the way.
 * @throws {LengthMismatch} when it is shorter or longer than `expectedBytes`
 * @throws {MissingObject} when there is none
 */
export async function readObject(
  store: Store,
  key: string,
  expectedBytes: number,
  signal?: AbortSignal,
): Promise<{ bytes: Uint8Array<ArrayBuffer>; sha256: string }> {
  const stream = await store.getStream(key, signal);
  const bytes = new Uint8Array(expectedBytes);
  const hash = createHash('sha256');
  let at = 0;
  try {
    for await (const chunk of stream as AsyncIterable<Buffer>) {
      signal?.throwIfAborted();
      hash.update(chunk);
      if (at + chunk.length <= expectedBytes) bytes.set(chunk, at);
      at += chunk.length;
    }
  } catch (error) {
    if (signal?.aborted) throw signal.reason;
    throw new AppError('unavailable', 'The file store broke off in the middle of a file. It is read again.', {
      reason: 'store-unavailable',
      retryAfterS: 10,
      cause: error,
    });
  } finally {
    stream.destroy();
  }
  if (at !== expectedBytes) throw new LengthMismatch(expectedBytes, at);
  return { bytes, sha256: hash.digest('hex') };
}
