import type { ReactNode } from 'react';

/** What went wrong with a whole form; stands above its buttons and is read out when it appears. */
export function FormProblem({ children }: { children: ReactNode }) {
  return (
    <div role="alert" className="empty:hidden">
      {children ? (
        <p className="flex gap-2 border border-l-4 border-madder bg-madder-wash px-3 py-2 text-base text-ink">
          <span aria-hidden className="text-madder">
            ▲
          </span>
          <span>{children}</span>
        </p>
      ) : null}
    </div>
  );
}
