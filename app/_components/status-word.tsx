import clsx from 'clsx';
import { StateShape, type Shape } from './state-shape';

type Tone = 'madder' | 'ochre' | 'verdigris' | 'ink' | 'slate';

/** Every state the product names: the shape, the word and the colour that go together. */
export const states = {
  'must-settle': { shape: 'triangle', word: 'must settle', tone: 'madder' },
  'look-at': { shape: 'triangle-open', word: 'look at this', tone: 'ochre' },
  overdue: { shape: 'triangle-open', word: 'overdue', tone: 'ochre' },
  settled: { shape: 'checked', word: 'settled', tone: 'ink' },
  waived: { shape: 'struck', word: 'waived', tone: 'ochre' },
  passed: { shape: 'checked', word: 'passed', tone: 'ink' },
  note: { shape: 'pilcrow', word: 'note', tone: 'ink' },
  draft: { shape: 'ahead', word: 'draft', tone: 'slate' },
  'in-review': { shape: 'current', word: 'in review', tone: 'verdigris' },
  approved: { shape: 'locked', word: 'approved, locked', tone: 'ink' },
  released: { shape: 'released', word: 'released', tone: 'ink' },
  returned: { shape: 'returned', word: 'returned', tone: 'madder' },
  withdrawn: { shape: 'struck', word: 'withdrawn', tone: 'slate' },
  superseded: { shape: 'struck', word: 'superseded', tone: 'slate' },
  recalled: { shape: 'crossed', word: 'recalled', tone: 'madder' },
  retired: { shape: 'crossed', word: 'retired', tone: 'slate' },
  queued: { shape: 'ahead', word: 'waits for the checker', tone: 'slate' },
  running: { shape: 'current', word: 'being checked', tone: 'verdigris' },
  done: { shape: 'checked', word: 'done', tone: 'ink' },
  failed: { shape: 'triangle', word: 'did not finish', tone: 'madder' },
  signed: { shape: 'checked', word: 'signed', tone: 'ink' },
  open: { shape: 'current', word: 'open', tone: 'verdigris' },
  ahead: { shape: 'ahead', word: 'not yet open', tone: 'slate' },
  live: { shape: 'dot', word: 'live', tone: 'verdigris' },
  polling: { shape: 'ring', word: 'asks every few seconds', tone: 'ochre' },
  offline: { shape: 'crossed', word: 'no connection', tone: 'madder' },
} as const satisfies Record<string, { shape: Shape; word: string; tone: Tone }>;

export type State = keyof typeof states;

const wordTone: Record<Tone, string> = {
  madder: 'text-madder',
  ochre: 'text-ochre-ink',
  verdigris: 'text-verdigris',
  ink: 'text-ink',
  slate: 'text-slate',
};

export interface StatusWordProps {
  state: State;
  /** Replaces the usual word, never the shape. */
  word?: React.ReactNode;
  className?: string;
}

/** A state as shape, word and colour together. */
export function StatusWord({ state, word, className }: StatusWordProps) {
  const { shape, tone, word: usual } = states[state];
  return (
    <span
      className={clsx(
        'inline-flex items-center gap-1.5 font-medium',
        word === undefined && 'whitespace-nowrap',
        wordTone[tone],
        className,
      )}
    >
      <StateShape shape={shape} className={clsx('size-[0.95em]', tone === 'ochre' && 'text-ochre')} />
      <span>{word ?? usual}</span>
    </span>
  );
}
