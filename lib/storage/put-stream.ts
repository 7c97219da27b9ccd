import { createHash } from 'node:crypto';
import type { Store, StoredPart } from './store';

/** Parts of an upload must have at least 5 MiB, all but the last (Amazon S3 User Guide, "multipart upload limits"). */
const partBytes = 8 * 1024 * 1024;

/**
 * Writes a stream of unknown length as one new object, never holding more than one part in memory.
 * Nothing stays behind when the stream fails or `signal` fires.
 */
export async function putStream(
  store: Store,
  key: string,
  stream: AsyncIterable<Uint8Array>,
  contentType: string,
  signal?: AbortSignal,
): Promise<{ bytes: number; sha256: string }> {
  const hash = createHash('sha256');
  const parts: StoredPart[] = [];
  let uploadId: string | undefined;
  let waiting: Uint8Array[] = [];
  let waitingBytes = 0;
  let bytes = 0;

  const take = () => {
    const part = Buffer.concat(waiting);
    waiting = [];
    waitingBytes = 0;
    return part;
  };
  try {
    for await (const chunk of stream) {
      signal?.throwIfAborted();
      hash.update(chunk);
      bytes += chunk.byteLength;
      waiting.push(chunk);
      waitingBytes += chunk.byteLength;
      if (waitingBytes < partBytes) continue;
      uploadId ??= await store.startMultipart(key, contentType);
      parts.push(await store.putPart(key, uploadId, parts.length + 1, take()));
    }
    if (!uploadId) await store.put(key, take(), contentType);
    else {
      if (waitingBytes) parts.push(await store.putPart(key, uploadId, parts.length + 1, take()));
      await store.completeMultipart(key, uploadId, parts);
    }
  } catch (error) {
    if (uploadId) await store.abortMultipart(key, uploadId).catch(() => undefined);
    throw error;
  }
  return { bytes, sha256: hash.digest('hex') };
}
