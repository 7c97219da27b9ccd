import { readdirSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { describe, expect, it } from 'vitest';
import { knownActions, tell } from '@/lib/review/activity-words';

const root = path.resolve(import.meta.dirname, '../../..');

/** Every action that any verb writes to a workspace's chain, read from the source. */
function actionsInSource(): string[] {
  const files = readdirSync(path.join(root, 'lib'), { recursive: true, encoding: 'utf8' })
    .filter((file) => file.endsWith('.ts'))
    .map((file) => readFileSync(path.join(root, 'lib', file), 'utf8'))
    .filter((source) => source.includes('appendEntry('));
  const plain = files.flatMap((source) =>
    [...source.matchAll(/action: '([a-z-]+\.[a-z-]+)'/g)].map((m) => m[1]),
  );
  const chosen = files.flatMap((source) =>
    [...source.matchAll(/action: \w+ \? '([a-z.-]+)' : '([a-z.-]+)'/g)].flatMap((m) => [m[1], m[2]]),
  );
  return [...new Set([...plain, ...chosen])];
}

describe('activity words', () => {
  it('has words for every action of the source', () => {
    const actions = actionsInSource();
    expect(actions.length).toBeGreaterThan(20);
    expect(actions).toEqual(expect.arrayContaining(['revision.posted', 'thread.settled', 'gate.signed']));
    expect(actions.filter((action) => !knownActions.includes(action))).toEqual([]);
  });

  it('says who did what, and where it leads', () => {
    const entry = {
      action: 'gate.returned',
      subjectKind: 'revision',
      subjectId: 'r',
      detail: { templateId: 't1', letter: 'B', gate: 'Client', reason: 'The logo is mirrored.' },
    };
    expect(tell(entry, { slug: 'quillon', number: 'QLN-003' })).toEqual({
      text: 'returned QLN-003 revision B at Client: The logo is mirrored.',
      path: '/w/quillon/templates/t1/B',
    });
  });

  it('says something readable of an action that it does not know', () => {
    const entry = { action: 'coupon.read-off', subjectKind: 'coupon', subjectId: 'x', detail: {} };
    expect(tell(entry, { slug: 'q', number: '' })).toEqual({ text: 'coupon read off', path: null });
  });
});
