import type { Standing } from '@/lib/review/schemas';
import { verdictTag } from '@/lib/review/verdict-words';
import { StatusWord, type State } from './status-word';

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
