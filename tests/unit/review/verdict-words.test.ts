import { describe, expect, it } from 'vitest';
import { CHECK_IDS } from '@/lib/formability/report';
import { checkComputed, checkName } from '@/lib/review/check-words';
import { verdictTag, verdictWords } from '@/lib/review/verdict-words';

const found = (counts: {
  pass?: number;
  caution?: number;
  fail?: number;
  waived?: number;
  unrun?: number;
}) => [
  ...Array.from({ length: counts.pass ?? 0 }, () => ({ status: 'pass', waived: false })),
  ...Array.from({ length: counts.caution ?? 0 }, () => ({ status: 'caution', waived: false })),
  ...Array.from({ length: counts.fail ?? 0 }, () => ({ status: 'fail', waived: false })),
  ...Array.from({ length: counts.waived ?? 0 }, () => ({ status: 'fail', waived: true })),
  ...Array.from({ length: counts.unrun ?? 0 }, () => ({ status: 'not-run', waived: false })),
];

describe('what a check run says altogether', () => {
  it.each([
    [{ pass: 19 }, 'Everything that was checked is within its limits.'],
    [{ pass: 14, unrun: 5 }, 'Everything that was checked is within its limits; 5 checks were not run.'],
    [
      { pass: 11, caution: 3, unrun: 5 },
      'Nothing that was checked forbids it; 3 findings want a look, 5 checks were not run.',
    ],
    [
      { pass: 10, caution: 1, fail: 1, waived: 2, unrun: 1 },
      '1 finding fails; 2 findings fail and are waived, 1 finding wants a look, 1 check was not run.',
    ],
    [{ pass: 4, waived: 1 }, '1 finding fails and is waived.'],
    [{ pass: 4, fail: 2 }, '2 findings fail.'],
    [{ unrun: 2 }, 'Nothing was checked; 2 checks were not run.'],
    [{}, 'Nothing was checked.'],
  ])('%j', (counts, sentence) => {
    expect(verdictWords(found(counts))).toBe(sentence);
  });

  it('never promises that the template forms', () => {
    const sentences = [0, 1, 2].flatMap((unrun) =>
      [0, 1].flatMap((caution) =>
        [0, 1].map((waived) => verdictWords(found({ pass: 3, caution, waived, unrun }))),
      ),
    );
    for (const words of [...sentences, ...Object.values(verdictTag)])
      expect(words).not.toMatch(/it forms|will form|should form|ready/i);
  });
});

describe('the words of each check', () => {
  it('has a name and a sentence for every check of the engine', () => {
    for (const id of CHECK_IDS) {
      expect(checkName(id)).not.toBe(id);
      expect(checkComputed(id)).toMatch(/^[A-Z].{20,}\.$/s);
    }
    expect(checkName('later')).toBe('later');
    expect(checkComputed('later')).toBeNull();
  });
});
