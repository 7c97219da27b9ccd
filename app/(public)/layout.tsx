import type { ReactNode } from 'react';
import { SkipLink } from '../_components/app-shell';
import { Wordmark } from '../_components/mark';
import { Link } from '../_components/link';

export default function PublicLayout({ children }: { children: ReactNode }) {
  return (
    <div className="mx-auto flex min-h-dvh max-w-5xl flex-col px-4 sm:px-6">
      <SkipLink />
      <header className="flex items-center justify-between py-3">
        <Wordmark href="/" />
        <nav aria-label="Account">
          <Link href="/sign-in" className="py-1 font-medium">
            Sign in
          </Link>
        </nav>
      </header>
      <main id="main" tabIndex={-1} className="grow pt-6 pb-14 sm:pt-12">
        {children}
      </main>
      <footer className="border-t border-rule py-4 text-sm text-slate">
        <p className="max-w-prose">
          Figures are estimates, to be proven by a test pull. Hot sheet, hot tools, compressed air and fumes
          can hurt: the documents of your machine and materials, local codes and licensed practice come first.
        </p>
      </footer>
    </div>
  );
}
