import type { ReactNode } from 'react';

export interface EmptyStateProps {
  title: ReactNode;
  /** Why it is empty and what the next step is. */
  children?: ReactNode;
  actions?: ReactNode;
  level?: 2 | 3;
}

/** A list or page without anything in it yet: what belongs here and how to begin. */
export function EmptyState({ title, children, actions, level = 2 }: EmptyStateProps) {
  const Heading = `h${level}` as const;
  return (
    <div className="flex flex-col items-start gap-3 border border-dashed border-edge px-6 py-8">
      <svg aria-hidden viewBox="0 0 96 34" className="h-9 fill-none stroke-edge" strokeDasharray="3 2.4">
        <path d="M2 32h20l7-24a6 6 0 0 1 6-4h26a6 6 0 0 1 6 4l7 24h20" strokeWidth="1.4" />
      </svg>
      <Heading className="text-md font-semibold">{title}</Heading>
      {children ? <div className="max-w-prose text-base text-slate">{children}</div> : null}
      {actions ? <div className="flex flex-wrap gap-2.5 pt-1">{actions}</div> : null}
    </div>
  );
}
