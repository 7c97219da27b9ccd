import type { ReactNode } from 'react';

export interface PageHeaderProps {
  title: ReactNode;
  /** A short mono line above the title, such as a number. */
  kicker?: ReactNode;
  /** One sentence below the title. */
  lead?: ReactNode;
  /** Buttons on the right; the main one last. */
  actions?: ReactNode;
}

/** The one `h1` of a page. */
export function PageHeader({ title, kicker, lead, actions }: PageHeaderProps) {
  return (
    <div className="flex flex-wrap items-end justify-between gap-x-6 gap-y-3 pt-3 pb-5">
      <div className="min-w-0">
        {kicker ? <p className="font-mono text-label text-slate uppercase">{kicker}</p> : null}
        <h1 className="text-xl font-semibold sm:text-2xl">{title}</h1>
        {lead ? <p className="mt-1 max-w-prose text-base text-slate">{lead}</p> : null}
      </div>
      {actions ? <div className="flex flex-wrap items-center gap-2.5">{actions}</div> : null}
    </div>
  );
}
