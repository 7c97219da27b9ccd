import NextLink from 'next/link';
import type { Space } from '@/app/_components/app-shell';
import { SectionHead } from '@/app/_components/section-head';

/** The workspaces that the reader belongs to, and after them the studios: where everything is found that does not wait. */
export function Places({ places }: { places: readonly Space[] }) {
  if (places.length === 0) return null;
  const workspaces = places.filter(({ kind }) => kind === 'workspace');
  const studios = places.filter(({ kind }) => kind === 'studio');
  return (
    <nav aria-labelledby="places">
      <SectionHead title="Places" id="places" />
      <ul className="mt-1">
        {[...workspaces, ...studios].map((place) => (
          <li key={place.id} className="border-b border-rule text-base">
            <NextLink
              href={place.href}
              className="flex min-h-11 flex-wrap items-center justify-between gap-x-3 py-1.5 text-ink no-underline hover:underline"
            >
              <span className="font-semibold">{place.name}</span>
              <span className="text-sm text-slate">
                {place.kind === 'studio' ? 'studio: workspaces, people, library' : 'templates'}
                {place.studioName ? `, at ${place.studioName}` : ''}
              </span>
            </NextLink>
          </li>
        ))}
      </ul>
    </nav>
  );
}
