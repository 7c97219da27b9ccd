import NextLink from 'next/link';
import { activityAddress, type ActivityState } from './activity-address';

type Props = { home: string; state: ActivityState; byName: string | null };

const topics: { about: ActivityState['about']; label: string }[] = [
  { about: undefined, label: 'Everything' },
  { about: 'agreement', label: 'Agreement and release' },
  { about: 'revisions', label: 'Templates and revisions' },
  { about: 'docket', label: 'Notes and findings' },
  { about: 'people', label: 'People and gate plan' },
];

/** What of the record is shown, as links: the address says it, so that a link shows the same. */
export function ActivityFilters({ home, state, byName }: Props) {
  return (
    <div className="flex flex-wrap items-baseline gap-x-6 gap-y-2 pb-4">
      <nav aria-label="What is shown" className="flex flex-wrap gap-x-5 gap-y-1">
        {topics.map(({ about, label }) => {
          const current = state.about === about;
          return (
            <NextLink
              key={label}
              href={activityAddress(home, { ...state, about })}
              prefetch={false}
              aria-current={current ? 'true' : undefined}
              className={
                current
                  ? 'border-b-2 border-verdigris py-1 font-semibold text-ink no-underline'
                  : 'border-b-2 border-transparent py-1 text-slate no-underline hover:text-ink'
              }
            >
              {label}
            </NextLink>
          );
        })}
      </nav>
      {state.by ? (
        <p className="text-sm">
          {byName ? `Only what ${byName} did.` : 'Only what one person did.'}{' '}
          <NextLink href={activityAddress(home, { about: state.about })}>Show everybody</NextLink>
        </p>
      ) : null}
    </div>
  );
}
