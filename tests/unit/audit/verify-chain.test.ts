import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { entryHash, genesis } from '@/lib/audit/chain';
import { verifyChain, verifyHead, type StoredEntry } from '@/lib/audit/verify-chain';

const workspaceId = '01890000-0000-7000-8000-000000000001';

/** A chain as the product writes it. */
function chainOf(length: number): StoredEntry[] {
  const entries: StoredEntry[] = [];
  for (let seq = 1; seq <= length; seq++) {
    const previous = entries.at(-1)?.hash ?? genesis;
    const entry = {
      workspaceId,
      seq,
      at: new Date(Date.UTC(2026, 0, 1) + seq * 1000).toISOString(),
      actorId: null,
      actorName: 'Firstpull worker',
      action: 'note.posted',
      subjectKind: 'note',
      subjectId: `01890000-0000-7000-8000-${String(seq).padStart(12, '0')}`,
      detail: { letter: 'A', text: `entry ${seq}`, nested: { b: 1, a: [seq] } },
    };
    entries.push({ ...entry, previous, hash: entryHash(previous, entry) });
  }
  return entries;
}

async function* inPages(entries: StoredEntry[], size = 7) {
  for (let at = 0; at < entries.length; at += size) yield entries.slice(at, at + size);
}
const verify = (entries: StoredEntry[]) => verifyChain(inPages(entries));

/** Hashes an entry and everything after it anew, as someone who knows the scheme would. */
function rehash(entries: StoredEntry[], from: number): StoredEntry[] {
  const out = entries.slice(0, from);
  for (const { hash: _, previous: __, ...entry } of entries.slice(from)) {
    const previous = out.at(-1)?.hash ?? genesis;
    out.push({ ...entry, previous, hash: entryHash(previous, entry) });
  }
  return out;
}

const length = 40;
const chain = chainOf(length);
const at = fc.integer({ min: 0, max: length - 2 });

type Damage = { name: string; apply: (entries: StoredEntry[], i: number) => StoredEntry[] };
const damages: Damage[] = [
  {
    name: 'changes the detail',
    apply: (e, i) => e.with(i, { ...e[i], detail: { ...e[i].detail, letter: 'B' } }),
  },
  { name: 'changes the actor', apply: (e, i) => e.with(i, { ...e[i], actorName: 'Somebody else' }) },
  { name: 'changes the time', apply: (e, i) => e.with(i, { ...e[i], at: '2026-06-01T00:00:00.000Z' }) },
  { name: 'removes an entry', apply: (e, i) => e.filter((_, k) => k !== i) },
  { name: 'swaps two entries', apply: (e, i) => e.with(i, e[i + 1]).with(i + 1, e[i]) },
  { name: 'repeats an entry', apply: (e, i) => [...e.slice(0, i + 1), e[i], ...e.slice(i + 1)] },
  { name: 'changes a stored hash', apply: (e, i) => e.with(i, { ...e[i], hash: 'f'.repeat(64) }) },
  {
    name: 'changes an entry and its own hash',
    apply: (e, i) => {
      const { hash: _, previous, ...entry } = { ...e[i], actorName: 'Somebody else' };
      return e.with(i, { ...entry, previous, hash: entryHash(previous, entry) });
    },
  },
];

describe('a chain', () => {
  it('as written is good, whatever the size of the pages', async () => {
    for (const size of [1, 7, 100]) {
      const { head, fault } = await verifyChain(inPages(chain, size));
      expect(fault).toBeNull();
      expect(head).toEqual({ seq: length, hash: chain[length - 1].hash });
    }
    expect(await verify([])).toEqual({ head: { seq: 0, hash: genesis }, fault: null });
  });

  it.each(damages)('where someone $name is bad from there (seed 20261201)', async ({ name, apply }) => {
    await fc.assert(
      fc.asyncProperty(at, async (i) => {
        const { fault } = await verify(apply(chain, i));
        // A repeat shows at the second copy; an entry with its own hash made right shows at the next one.
        const later = name === 'repeats an entry' || name === 'changes an entry and its own hash' ? 1 : 0;
        expect(fault?.seq).toBe(i + 1 + later);
      }),
      { seed: 20261201, numRuns: 40 },
    );
  });
});

describe('the head', () => {
  const head = { seq: length, hash: chain[length - 1].hash };

  it('tells that entries were cut off at the end', async () => {
    const cut = await verify(chain.slice(0, length - 3));
    expect(cut.fault).toBeNull();
    expect(verifyHead(cut.head, head)).toMatch(/entries were removed/);
  });

  it('tells that the chain was rewritten from some entry on', async () => {
    const changed = chain.with(9, { ...chain[9], actorName: 'Somebody else' });
    const rewritten = await verify(rehash(changed, 9));
    expect(rewritten.fault).toBeNull();
    expect(verifyHead(rewritten.head, head)).toMatch(/does not carry the hash/);
  });

  it('must be there and not be behind', async () => {
    const { head: end } = await verify(chain);
    expect(verifyHead(end, head)).toBeNull();
    expect(verifyHead(end, { seq: length - 1, hash: chain[length - 2].hash })).toMatch(
      /entries after number 39/,
    );
    expect(verifyHead(end, null)).toMatch(/entries after number 0/);
  });
});
