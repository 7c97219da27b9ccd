import type { ReactNode } from 'react';

export function AccountSection({
  title,
  lead,
  children,
}: {
  title: string;
  lead: string;
  children: ReactNode;
}) {
  return (
    <section className="grid gap-x-10 gap-y-4 border-t border-ink pt-3 md:grid-cols-[17rem_minmax(0,1fr)]">
      <div>
        <h2 className="text-md font-semibold">{title}</h2>
        <p className="mt-1 text-sm text-slate">{lead}</p>
      </div>
      <div className="min-w-0 max-w-2xl">{children}</div>
    </section>
  );
}
