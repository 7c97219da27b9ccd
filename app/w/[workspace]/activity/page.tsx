import type { Metadata } from 'next';
import NextLink from 'next/link';
import { buttonClass } from '@/app/_components/button-class';
import { EmptyState } from '@/app/_components/empty-state';
import { RefreshOnLive } from '@/app/_components/live/refresh-on-live';
import { PageHeader } from '@/app/_components/page-header';
import { Paging } from '@/app/_components/paging';
import { Time } from '@/app/_components/time';
import { enterWorkspacePage, orNotFound } from '@/app/_frames/enter-page';
import { WorkspaceFrame } from '@/app/_frames/workspace-frame';
import { listActivity } from '@/lib/review/list-activity';
import { activityAddress, type ActivityState } from './_components/activity-address';
import { ActivityFilters } from './_components/activity-filters';

type Props = {
  params: Promise<{ workspace: string }>;
  searchParams: Promise<Record<string, string | string[] | undefined>>;
};

export const metadata: Metadata = { title: 'Activity' };

/** The audit chain of the workspace in plain words, newest first. */
export default async function ActivityPage({ params, searchParams }: Props) {
  const ctx = await enterWorkspacePage((await params).workspace);
  const { cursor, about, by } = await searchParams;
  const page = await orNotFound(listActivity(ctx, { cursor, about, by }));
  const home = `/w/${ctx.workspace.slug}/activity`;
  const state = { about, by } as ActivityState;
  const files = `/api/v1/workspaces/${ctx.workspace.slug}/activity/export`;
  return (
    <WorkspaceFrame ctx={ctx} page="activity">
      <RefreshOnLive
        events={[
          'revision.changed',
          'docket.changed',
          'template.changed',
          'people.changed',
          'gate-plan.changed',
        ]}
      />
      <PageHeader
        title="Activity"
        kicker={ctx.workspace.name}
        lead="Everything that was done here, each entry chained to the one before it, so that none can be changed or taken out unseen."
        actions={
          <>
            <a href={`${files}?format=csv`} download className={buttonClass()}>
              Save all as CSV
            </a>
            <a href={`${files}?format=json`} download className={buttonClass()}>
              Save all as JSON
            </a>
          </>
        }
      />
      <ActivityFilters
        home={home}
        state={state}
        byName={page.items.find(({ actorId }) => actorId === by)?.actorName ?? null}
      />
      {page.items.length === 0 ? (
        <EmptyState title="Nothing of this kind stands in the record">
          Show everything to read the whole of it.
        </EmptyState>
      ) : (
        <ol className="border-t border-ink">
          {page.items.map((entry) => (
            <li
              key={entry.seq}
              className="grid grid-cols-[4rem_1fr_auto] gap-x-4 border-b border-rule py-2.5 max-sm:grid-cols-[3rem_1fr]"
            >
              <span className="font-mono text-sm text-slate">{entry.seq}</span>
              <span className="min-w-0">
                {entry.actorId ? (
                  <NextLink
                    href={activityAddress(home, { about: state.about, by: entry.actorId })}
                    prefetch={false}
                    aria-label={`Only what ${entry.actorName} did`}
                    className="font-semibold text-ink no-underline hover:underline"
                  >
                    {entry.actorName}
                  </NextLink>
                ) : (
                  <span className="font-semibold">{entry.actorName}</span>
                )}{' '}
                {entry.path ? (
                  <NextLink href={entry.path} className="text-ink underline-offset-2 hover:underline">
                    {entry.text}
                  </NextLink>
                ) : (
                  entry.text
                )}
                <span
                  className="block font-mono text-xs text-slate"
                  title={`Hash of this entry: ${entry.hash}`}
                >
                  {entry.hash.slice(0, 16)}
                </span>
              </span>
              <span className="text-sm text-slate max-sm:col-start-2">
                <Time at={entry.at} show="moment" />
              </span>
            </li>
          ))}
        </ol>
      )}
      <Paging
        label="activity"
        text={page.items.length ? `Entries ${page.items.at(-1)!.seq} to ${page.items[0].seq}` : ''}
        previousHref={cursor ? activityAddress(home, state) : null}
        nextHref={page.nextCursor ? activityAddress(home, state, page.nextCursor) : null}
      />
    </WorkspaceFrame>
  );
}
