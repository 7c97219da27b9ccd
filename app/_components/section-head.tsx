import clsx from 'clsx';
import type { ReactNode } from 'react';

export interface SectionHeadProps {
  title: ReactNode;
  /** Set by the docket and similar lists. */
  tone?: 'ink' | 'madder' | 'ochre' | 'verdigris';
  count?: number;
  level?: 2 | 3;
  id?: string;
  actions?: ReactNode;
}

const tones = {
  ink: 'text-ink',
  madder: 'text-madder',
  ochre: 'text-ochre-ink',
  verdigris: 'text-verdigris',
};

/** A ruled heading in the drawing's small capitals, with a count at its end. */
export function SectionHead({ title, tone = 'ink', count, level = 2, id, actions }: SectionHeadProps) {
  const Heading = `h${level}` as const;
  return (
    <div
      className={clsx('flex items-center justify-between gap-3 border-t border-ink pt-1.5 pb-1', tones[tone])}
    >
      <Heading id={id} className="font-mono text-label font-medium uppercase">
        {title}
      </Heading>
      {actions}
      {count !== undefined ? <span className="font-mono text-label">{count}</span> : null}
    </div>
  );
}
