import type { ReactNode } from 'react';
import { StateShape } from './state-shape';

export interface ErrorStateProps {
  /** What happened, to what. */
  title: ReactNode;
  /** What to do. */
  children?: ReactNode;
  /** Reference for the log. */
  reference?: string | null;
  actions?: ReactNode;
  level?: 1 | 2 | 3;
}

/** Something failed: what happened, to what, and what to do. */
export function ErrorState({ title, children, reference, actions, level = 2 }: ErrorStateProps) {
  const Heading = `h${level}` as const;
  return (
    <div role="alert" className="flex gap-3 border border-l-4 border-madder bg-sheet px-5 py-4">
      <StateShape shape="triangle" className="mt-1 size-4 text-madder" />
      <div className="flex min-w-0 flex-col gap-2">
        <Heading className="text-md font-semibold">{title}</Heading>
        {children ? <div className="max-w-prose text-base">{children}</div> : null}
        {reference ? (
          <p className="text-sm text-slate">
            Reference <code className="font-mono break-all">{reference}</code>
          </p>
        ) : null}
        {actions ? <div className="flex flex-wrap gap-2.5 pt-1">{actions}</div> : null}
      </div>
    </div>
  );
}
