import type { Standing } from '@/lib/review/schemas';
import { verdictTag } from '@/lib/review/verdict-words';
import { Link } from './link';
import { states, StatusWord, type State } from './status-word';

const stateOf: Record<Standing, State> = {
  draft: 'draft',
  in_review: 'in-review',
  approved: 'approved',
  returned: 'returned',
  withdrawn: 'withdrawn',
  released: 'released',
  recalled: 'recalled',
  superseded: 'superseded',
  retired: 'retired',
};

/** The state of a template or a revision, as shape and word. */
export function StandingWord({ standing }: { standing: Standing }) {
  return <StatusWord state={stateOf[standing]} />;
}

/** A newer revision on its way, in a word that leads to it: `B in review`. `here` is the template's address. */
export function RevisionAhead({
  here,
  ahead,
}: {
  here: string;
  ahead: { letter: string; standing: Standing };
}) {
  const state = stateOf[ahead.standing];
  return (
    <Link href={`${here}/${ahead.letter}`} className="text-sm whitespace-nowrap">
      {ahead.letter} {states[state].word}
    </Link>
  );
}

/** What the check run said of a revision, in a word. */
export function VerdictWord({ verdict }: { verdict: 'pass' | 'caution' | 'fail' | null }) {
  if (verdict === null) return <span className="text-slate">not checked yet</span>;
  const shown = {
    pass: { state: 'passed', word: verdictTag.pass },
    caution: { state: 'look-at', word: verdictTag.caution },
    fail: { state: 'must-settle', word: verdictTag.fail },
  } as const;
  return <StatusWord {...shown[verdict]} />;
}
