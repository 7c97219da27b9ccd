import { entryHash, genesis, type ChainedEntry } from './chain';

/** One entry as it is stored, with the hashes that were written beside it. */
export type StoredEntry = ChainedEntry & { previous: string; hash: string };
export type ChainHead = { seq: number; hash: string };
/** The first entry that is not as it was written. */
export type ChainFault = { seq: number; what: string };
export type ChainVerdict = { head: ChainHead; fault: ChainFault | null };

/**
 * Recomputes a chain from its first entry: numbers without a gap, each entry linked to the one before, each
 * hash the hash of exactly this entry. O(n) time, one page of entries in memory.
 * @param pages entries in order of their number
 */
export async function verifyChain(pages: AsyncIterable<StoredEntry[]>): Promise<ChainVerdict> {
  let head: ChainHead = { seq: 0, hash: genesis };
  for await (const page of pages)
    for (const stored of page) {
      const what = faultOf(stored, head);
      if (what) return { head, fault: { seq: head.seq + 1, what } };
      head = { seq: stored.seq, hash: stored.hash };
    }
  return { head, fault: null };
}

function faultOf({ previous, hash, ...entry }: StoredEntry, head: ChainHead): string | null {
  if (entry.seq !== head.seq + 1) return `the entry is missing (the next one there is number ${entry.seq})`;
  if (previous !== head.hash) return 'the entry does not follow the one before it';
  let computed: string;
  try {
    computed = entryHash(head.hash, entry);
  } catch {
    return 'the entry cannot be read as JSON';
  }
  return computed === hash ? null : 'the entry is not the one that was hashed when it was written';
}

/**
 * Whether the stored head and a remembered one belong to this chain. A chain that was cut at its end or
 * rewritten from some entry on hashes right in itself; only a head kept elsewhere tells.
 */
export function verifyHead(end: ChainHead, stored: ChainHead | null): string | null {
  const expected = stored ?? { seq: 0, hash: genesis };
  if (expected.seq > end.seq)
    return `the chain ends at number ${end.seq}, but its head says ${expected.seq}: entries were removed`;
  if (expected.seq < end.seq)
    return `there are entries after number ${expected.seq}, where the head says it ends`;
  return expected.hash === end.hash ? null : `the head does not carry the hash of entry number ${end.seq}`;
}
