import type { ReactNode } from 'react';
import { SkipLink } from './app-shell';
import { Wordmark } from './mark';

/** A page without a person's places around it: not found, and the last resort of an error. */
export function PlainPage({ children }: { children: ReactNode }) {
  return (
    <div className="mx-auto flex min-h-dvh max-w-3xl flex-col px-4 sm:px-6">
      <SkipLink />
      <header className="py-3">
        <Wordmark href="/" />
      </header>
      <main id="main" tabIndex={-1} className="pt-8 pb-14 sm:pt-16">
        {children}
      </main>
    </div>
  );
}
