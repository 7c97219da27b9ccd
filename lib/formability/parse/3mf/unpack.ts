import { crc32 } from 'node:zlib';
import { Inflate } from 'fflate';
import { UnusableInput } from '../../unusable-input';
import { MAX_PART_BYTES, MAX_TOTAL_BYTES } from './limits';
import { show, type ZipEntry } from './zip-directory';

/** Packed bytes taken at a time: deflate gives at most 1032 times as many, so 17 MB. */
const STEP = 16 * 1024;

/** What of `MAX_TOTAL_BYTES` is still to be unpacked. */
export interface Budget {
  left: number;
}

export const newBudget = (): Budget => ({ left: MAX_TOTAL_BYTES });

/**
 * Unpacks one entry, a few bytes at a time, into `sink`. Ends at the cap, at the budget, or at the declared size,
 * whichever comes first: no size field is trusted, and nothing is kept here.
 * @throws UnusableInput unsupported, too_large_file, count_mismatch, not_a_mesh (damaged)
 */
export function unpack(
  bytes: Uint8Array,
  entry: ZipEntry,
  budget: Budget,
  sink: (chunk: Uint8Array) => void,
  cap = MAX_PART_BYTES,
): void {
  const name = show(entry.name);
  let total = 0;
  let crc = 0;
  const take = (chunk: Uint8Array): void => {
    total += chunk.length;
    budget.left -= chunk.length;
    if (total > cap || budget.left < 0) {
      throw new UnusableInput('too_large_file', `"${name}" unpacks to more than the ${Math.min(cap, MAX_TOTAL_BYTES) / 1e6} MB that are read; export the mesh with a coarser tolerance`); // prettier-ignore
    }
    if (total > entry.unpackedBytes) throw lied(name, entry.unpackedBytes, 'more');
    crc = crc32(chunk, crc);
    sink(chunk);
  };
  const packed = bytes.subarray(entry.start, entry.end);
  if (entry.method === 0) {
    for (let at = 0; at < packed.length; at += 1 << 20) take(packed.subarray(at, at + (1 << 20)));
  } else if (entry.method === 8) inflate(packed, name, take);
  else {
    throw new UnusableInput('unsupported', `"${name}" is packed with ZIP method ${entry.method}; a 3MF is packed with deflate (8) or not at all: save it again`); // prettier-ignore
  }
  if (total < entry.unpackedBytes) throw lied(name, entry.unpackedBytes, String(total));
  if (crc !== entry.crc) {
    throw new UnusableInput('not_a_mesh', `"${name}" does not match its checksum: the archive is damaged; upload it again or export it again`); // prettier-ignore
  }
}

function inflate(packed: Uint8Array, name: string, take: (chunk: Uint8Array) => void): void {
  const stream = new Inflate((chunk) => {
    if (chunk.length > 0) take(chunk);
  });
  try {
    if (packed.length === 0) throw new Error('no bytes');
    for (let at = 0; at < packed.length; at += STEP) {
      stream.push(packed.subarray(at, at + STEP), at + STEP >= packed.length);
    }
  } catch (error) {
    if (error instanceof UnusableInput) throw error;
    throw new UnusableInput('not_a_mesh', `"${name}" cannot be unpacked (${error instanceof Error ? error.message : 'damaged'}): the archive is damaged; upload it again or export it again`); // prettier-ignore
  }
}

function lied(name: string, declared: number, found: string): UnusableInput {
  return new UnusableInput('count_mismatch', `the archive says that "${name}" has ${declared} bytes, it has ${found}; save the 3MF again`); // prettier-ignore
}
