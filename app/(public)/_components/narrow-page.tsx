import type { ReactNode } from 'react';

/** One form on a sheet of its own. */
export function NarrowPage({
  title,
  lead,
  children,
}: {
  title: string;
  lead?: ReactNode;
  children: ReactNode;
}) {
  return (
    <div className="mx-auto w-full max-w-md">
      <h1 className="text-xl font-semibold sm:text-2xl">{title}</h1>
      {lead ? <div className="mt-1.5 text-base text-slate">{lead}</div> : null}
      <div className="mt-5 border border-rule bg-sheet px-4 py-5 sm:px-6">{children}</div>
    </div>
  );
}
