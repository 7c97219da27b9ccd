import { createHash } from 'node:crypto';
import { MissingObject } from '@/lib/storage/guard-store';
import { store } from '@/lib/storage/store';
import type { StoredObject } from './verify-revision';

/** Reads an object whole and compares length and hash with its record; the fault in words, or null. */
export async function verifyObject({ what, key, bytes, sha256 }: StoredObject): Promise<string | null> {
  const hash = createHash('sha256');
  let seen = 0;
  try {
    for await (const chunk of await store().getStream(key)) {
      hash.update(chunk as Buffer);
      seen += (chunk as Buffer).length;
    }
  } catch (error) {
    if (error instanceof MissingObject) return `the ${what} is not in the store (${key})`;
    throw error;
  }
  if (seen !== bytes) return `the ${what} has ${seen} bytes in the store instead of ${bytes}`;
  return hash.digest('hex') === sha256 ? null : `the ${what} has other bytes in the store than were agreed`;
}
