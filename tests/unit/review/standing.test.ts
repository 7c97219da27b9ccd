import { describe, expect, it } from 'vitest';
import type { Standing } from '@/lib/review/schemas';
import { standingRevision } from '@/lib/review/standing';

const revisions = (...states: Standing[]) => states.map((state, index) => ({ ordinal: index + 1, state }));
const stands = (...states: Standing[]) => standingRevision(revisions(...states));

describe('the revision that a template stands on', () => {
  it.each<[string, Standing[], number]>([
    ['an approved one before a later withdrawn one', ['approved', 'withdrawn'], 1],
    ['an approved one before a later one in review', ['approved', 'in_review'], 1],
    ['a released one before a later returned one', ['released', 'returned'], 1],
    ['the newer approved one, the older being superseded', ['superseded', 'approved'], 2],
    ['one in review before an earlier returned one', ['returned', 'in_review'], 2],
    ['one in review before an earlier recalled one', ['recalled', 'in_review'], 2],
    ['a returned one before a later withdrawn one', ['returned', 'withdrawn'], 1],
    ['the newest of two returned ones', ['returned', 'returned'], 2],
    ['a recalled one, when what came later was taken back', ['superseded', 'recalled', 'withdrawn'], 2],
    ['the newest withdrawn one, when there is nothing else', ['withdrawn', 'withdrawn'], 2],
  ])('is %s', (_, states, ordinal) => {
    expect(stands(...states)).toEqual({ ordinal, state: states[ordinal - 1] });
  });

  it('does not depend on the order in which revisions are given', () => {
    const given = revisions('superseded', 'approved', 'withdrawn', 'in_review');
    expect(standingRevision([...given].reverse())).toEqual(standingRevision(given));
    expect(standingRevision([])).toBeNull();
  });
});
