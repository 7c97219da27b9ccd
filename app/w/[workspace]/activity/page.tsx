import type { Metadata } from 'next';
import NextLink from 'next/link';
import { EmptyState } from '@/app/_components/empty-state';
import { RefreshOnLive } from '@/app/_components/live/refresh-on-live';
import { PageHeader } from '@/app/_components/page-header';
import { Paging } from '@/app/_components/paging';
import { Time } from '@/app/_components/time';
import { enterWorkspacePage } from '@/app/_frames/enter-page';
import { WorkspaceFrame } from '@/app/_frames/workspace-frame';
import { listActivity } from '@/lib/review/list-activity';

type Props = { params: Promise<{ workspace: string }>; searchParams: Promise<{ cursor?: string }> };

export const metadata: Metadata = { title: 'Activity' };

/** The audit chain of the workspace in plain words, newest first. */
export default async function ActivityPage({ params, searchParams }: Props) {
  const ctx = await enterWorkspacePage((await params).workspace);
  const { cursor } = await searchParams;
  const page = await listActivity(ctx, { cursor });
  const here = `/w/${ctx.workspace.slug}/activity`;
  return (
    <WorkspaceFrame ctx={ctx} page="activity">
      <RefreshOnLive events={['revision.changed', 'docket.changed', 'template.changed', 'people.changed']} />
      <PageHeader
        title="Activity"
        kicker={ctx.workspace.name}
        lead="Everything that was done here, each entry chained to the one before it, so that none can be changed or taken out unseen."
      />
      {page.items.length === 0 ? (
        <EmptyState title="Nothing has happened yet">The first template opens the record.</EmptyState>
      ) : (
        <ol className="border-t border-ink">
          {page.items.map((entry) => (
            <li
              key={entry.seq}
              className="grid grid-cols-[4rem_1fr_auto] gap-x-4 border-b border-rule py-2.5 max-sm:grid-cols-[3rem_1fr]"
            >
              <span className="font-mono text-sm text-slate">{entry.seq}</span>
              <span className="min-w-0">
                <span className="font-semibold">{entry.actorName}</span>{' '}
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
        previousHref={cursor ? here : null}
        nextHref={page.nextCursor ? `${here}?cursor=${encodeURIComponent(page.nextCursor)}` : null}
      />
    </WorkspaceFrame>
  );
}
