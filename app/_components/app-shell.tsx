import clsx from 'clsx';
import NextLink from 'next/link';
import type { ReactNode } from 'react';
import { Wordmark } from './mark';
import { PersonMenu } from './person-menu';
import { SpaceSwitcher } from './space-switcher';

export interface Crumb {
  label: string;
  /** Left out on the last crumb, which is the page itself. */
  href?: string;
}

/** A place that the person may enter: a studio, or one client organisation's workspace. */
export interface Space {
  id: string;
  name: string;
  href: string;
  kind: 'studio' | 'workspace';
  /** The studio a workspace belongs to, shown when the person knows more than one. */
  studioName?: string;
  /** The person's role there, in words. */
  role?: string;
  current?: boolean;
}

export interface NavItem {
  label: string;
  href: string;
  current?: boolean;
  /** How many things wait there. */
  count?: number;
}

export interface AppShellProps {
  person: { name: string; email: string };
  /** The path to this page without the space itself, which the switcher shows first. */
  crumbs?: readonly Crumb[];
  spaces?: readonly Space[];
  /** Pages of the current studio or workspace. */
  nav?: readonly NavItem[];
  /** `<LiveState>` and `<Presence>`. */
  live?: ReactNode;
  /** Uses the whole window; otherwise the page keeps to 90 rem. */
  wide?: boolean;
  children: ReactNode;
}

/** The frame of every page for a signed-in person: skip link, top bar, pages of the space, main. */
export function AppShell({
  person,
  crumbs = [],
  spaces = [],
  nav = [],
  live,
  wide,
  children,
}: AppShellProps) {
  const frame = clsx('mx-auto w-full px-4 sm:px-6 lg:px-7', !wide && 'max-w-page');
  return (
    <>
      <SkipLink />
      <header className="print:hidden">
        <div className={clsx(frame, 'flex flex-wrap items-center gap-x-5 gap-y-1 py-2.5')}>
          <Wordmark />
          <nav
            aria-label="Where you are"
            className="order-last min-w-0 basis-full lg:order-none lg:basis-auto"
          >
            <ol className="flex flex-wrap items-center gap-x-2 gap-y-0.5 text-base text-slate">
              {spaces.length > 0 ? (
                <li className="min-w-0">
                  <SpaceSwitcher spaces={spaces} />
                </li>
              ) : null}
              {crumbs.map((crumb, index) => (
                <li key={`${index}-${crumb.label}`} className="flex min-w-0 items-center gap-x-2">
                  {index > 0 || spaces.length > 0 ? <span aria-hidden>/</span> : null}
                  {crumb.href ? (
                    <NextLink
                      href={crumb.href}
                      className="py-1 text-slate no-underline hover:text-ink hover:underline"
                    >
                      {crumb.label}
                    </NextLink>
                  ) : (
                    <span aria-current="page" className="font-medium text-ink">
                      {crumb.label}
                    </span>
                  )}
                </li>
              ))}
            </ol>
          </nav>
          <div className="ml-auto flex items-center gap-4">
            {live}
            <NextLink
              href="/today"
              className="py-1 text-base font-medium text-ink no-underline hover:underline"
            >
              Today
            </NextLink>
            <PersonMenu person={person} />
          </div>
        </div>
        {nav.length > 0 ? <SpaceNav items={nav} frame={frame} /> : null}
      </header>
      <main id="main" tabIndex={-1} className={clsx(frame, 'pt-3 pb-16')}>
        {children}
      </main>
    </>
  );
}

/** First stop of the Tab key on every page. */
export function SkipLink() {
  return (
    <a
      href="#main"
      className="sr-only z-50 border border-ink bg-sheet px-4 py-2 font-semibold text-ink focus:not-sr-only focus:fixed focus:top-2 focus:left-2"
    >
      Skip to the page
    </a>
  );
}

function SpaceNav({ items, frame }: { items: readonly NavItem[]; frame: string }) {
  return (
    <nav aria-label="Pages" className={frame}>
      <ul className="flex flex-wrap gap-x-5 border-b border-rule text-base">
        {items.map((item) => (
          <li key={item.href}>
            <NextLink
              href={item.href}
              aria-current={item.current ? 'page' : undefined}
              className={clsx(
                '-mb-px inline-flex items-center gap-1.5 border-b-2 py-1.5 no-underline pointer-coarse:py-2.5',
                item.current
                  ? 'border-ink font-semibold text-ink'
                  : 'border-transparent text-slate hover:text-ink forced-colors:border-[Canvas]',
              )}
            >
              {item.label}
              {item.count ? <span className="font-mono text-xs">{item.count}</span> : null}
            </NextLink>
          </li>
        ))}
      </ul>
    </nav>
  );
}
