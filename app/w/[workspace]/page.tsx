import type { Metadata } from 'next';
import NextLink from 'next/link';
import { ButtonLink } from '@/app/_components/link';
import { DataTable, type Column } from '@/app/_components/data-table';
import { DueDay } from '@/app/_components/due-day';
import { EmptyState } from '@/app/_components/empty-state';
import { PageHeader } from '@/app/_components/page-header';
import { Paging } from '@/app/_components/paging';
import { RevisionAhead, StandingWord, VerdictWord } from '@/app/_components/standing-word';
import { StatusWord } from '@/app/_components/status-word';
import { RefreshOnLive } from '@/app/_components/live/refresh-on-live';
import { Time } from '@/app/_components/time';
import { enterWorkspacePage } from '@/app/_frames/enter-page';
import { WorkspaceFrame } from '@/app/_frames/workspace-frame';
import { listTemplates } from '@/lib/review/list-templates';
import { ListTemplatesInput, type TemplateSummary } from '@/lib/review/schemas';
import { permits } from '@/lib/workspaces/roles';
import { listAddress, type ListState } from './_components/list-address';
import { ListFilters } from './_components/list-filters';
import { NewTemplate } from './_components/new-template';

type Props = {
  params: Promise<{ workspace: string }>;
  searchParams: Promise<Record<string, string | string[] | undefined>>;
};

export const metadata: Metadata = { title: 'Templates' };

/** The address is typed by people: a part that is not understood falls back to its default. */
function readState(search: Record<string, string | string[] | undefined>): ListTemplatesInput {
  const known = Object.fromEntries(Object.entries(search).filter(([, value]) => typeof value === 'string'));
  if (known.sort && known.sort !== 'changed' && !known.direction) known.direction = 'asc';
  const parsed = ListTemplatesInput.safeParse(known);
  return parsed.success ? parsed.data : ListTemplatesInput.parse({});
}

export default async function TemplatesPage({ params, searchParams }: Props) {
  const ctx = await enterWorkspacePage((await params).workspace);
  const state = readState(await searchParams);
  const page = await listTemplates(ctx, state);
  const home = `/w/${ctx.workspace.slug}`;
  const canCreate = permits(ctx.role, 'template.create');
  const filtered = Boolean(state.search || state.standing);
  const shown = page.items.length;
  return (
    <WorkspaceFrame ctx={ctx} page="templates">
      <RefreshOnLive events={['template.changed', 'revision.changed', 'docket.changed']} />
      <PageHeader
        title="Templates"
        kicker={ctx.workspace.name}
        lead={`Settled with ${ctx.studio.name}, revision by revision.`}
        actions={
          canCreate ? (
            <NewTemplate
              apiPath={`/api/v1/workspaces/${ctx.workspace.slug}`}
              homePath={home}
              code={ctx.workspace.code}
            />
          ) : null
        }
      />
      <ListFilters home={home} state={state} />
      <div className="mt-4">
        <DataTable
          caption={`Templates of ${ctx.workspace.name}`}
          columns={columns(home, state)}
          rows={page.items}
          rowKey={(row) => row.id}
          sort={{ key: state.sort, direction: state.direction }}
          empty={<NoTemplates filtered={filtered} home={home} canCreate={canCreate} />}
        />
      </div>
      {shown > 0 ? (
        <Paging
          label="templates"
          text={state.cursor ? `${shown} more of ${page.total}` : `${shown} of ${page.total}`}
          previousHref={state.cursor ? listAddress(home, state, {}) : null}
          nextHref={page.nextCursor ? listAddress(home, state, { cursor: page.nextCursor }) : null}
        />
      ) : null}
    </WorkspaceFrame>
  );
}

function columns(home: string, state: ListState): Column<TemplateSummary>[] {
  const sortHref = (sort: ListState['sort']) => (direction: 'asc' | 'desc') =>
    listAddress(home, state, { sort, direction });
  return [
    {
      key: 'picture',
      label: 'Picture',
      wideOnly: true,
      className: 'w-24 max-lg:hidden',
      cell: (row) =>
        row.thumbnailUrl ? (
          // eslint-disable-next-line @next/next/no-img-element -- a signed address of the store, not for the optimiser
          <img
            src={row.thumbnailUrl}
            alt=""
            width={80}
            height={54}
            loading="lazy"
            className="border border-rule"
          />
        ) : (
          <span className="block h-[54px] w-20 border border-dashed border-rule" />
        ),
    },
    {
      key: 'number',
      label: 'Number',
      sortHref: sortHref('number'),
      cell: (row) => <span className="font-mono whitespace-nowrap">{row.number}</span>,
    },
    {
      key: 'title',
      label: 'Title',
      isHead: true,
      sortHref: sortHref('title'),
      cell: (row) => (
        <NextLink
          href={addressOf(home, row)}
          className="font-semibold text-ink underline-offset-2 hover:underline"
        >
          {row.title}
        </NextLink>
      ),
    },
    {
      key: 'letter',
      label: 'Revision',
      cell: (row) => <span className="font-mono">{row.standingLetter ?? '–'}</span>,
    },
    {
      key: 'standing',
      label: 'State',
      cell: (row) => (
        <span className="flex flex-col gap-0.5">
          <StandingWord standing={row.standing} />
          {row.ahead ? <RevisionAhead here={`${home}/templates/${row.id}`} ahead={row.ahead} /> : null}
        </span>
      ),
    },
    {
      key: 'verdict',
      label: 'Check',
      cell: (row) =>
        row.standingLetter ? <VerdictWord verdict={row.verdict} /> : <span className="text-slate">–</span>,
    },
    {
      key: 'open',
      label: 'To settle',
      cell: (row) =>
        row.openMustSettle > 0 ? (
          <StatusWord state="must-settle" word={String(row.openMustSettle)} />
        ) : (
          <span className="text-slate">none</span>
        ),
    },
    {
      key: 'due',
      label: 'Due',
      sortHref: sortHref('due'),
      cell: (row) =>
        row.dueOn ? <DueDay on={row.dueOn} standing={row.standing} /> : <span className="text-slate">–</span>,
    },
    {
      key: 'changed',
      label: 'Changed',
      sortHref: sortHref('changed'),
      cell: (row) => <Time at={row.changedAt} show="relative" />,
    },
  ];
}

const addressOf = (home: string, row: TemplateSummary) =>
  row.standingLetter ? `${home}/templates/${row.id}/${row.standingLetter}` : `${home}/templates/${row.id}`;

function NoTemplates({ filtered, home, canCreate }: { filtered: boolean; home: string; canCreate: boolean }) {
  if (filtered)
    return (
      <EmptyState title="No template fits" actions={<ButtonLink href={home}>Show all</ButtonLink>}>
        Nothing here matches the search and state that are set.
      </EmptyState>
    );
  return (
    <EmptyState title="No templates yet">
      {canCreate
        ? 'Open the first one: give it a title, then post its mesh and recipe as revision A.'
        : 'The studio has not opened a template here yet. You will get a mail as soon as there is a revision to look at.'}
    </EmptyState>
  );
}
