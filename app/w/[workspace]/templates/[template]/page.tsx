import type { Metadata } from 'next';
import NextLink from 'next/link';
import { DataTable, type Column } from '@/app/_components/data-table';
import { DueDay } from '@/app/_components/due-day';
import { EmptyState } from '@/app/_components/empty-state';
import { ButtonLink } from '@/app/_components/link';
import { RefreshOnLive } from '@/app/_components/live/refresh-on-live';
import { SectionHead } from '@/app/_components/section-head';
import { RevisionAhead, StandingWord, VerdictWord } from '@/app/_components/standing-word';
import { Time } from '@/app/_components/time';
import { TitleBlock } from '@/app/_components/title-block';
import { enterWorkspacePage, orNotFound } from '@/app/_frames/enter-page';
import { WorkspaceFrame } from '@/app/_frames/workspace-frame';
import { listRevisions } from '@/lib/review/list-revisions';
import type { RevisionSummary } from '@/lib/review/schemas';
import { viewTemplate } from '@/lib/review/view-template';
import { permits } from '@/lib/workspaces/roles';
import { ChangeTemplate } from './_components/change-template';

type Props = { params: Promise<{ workspace: string; template: string }> };

export const metadata: Metadata = { title: 'Template' };

/** A template and its revisions, newest first. */
export default async function TemplatePage({ params }: Props) {
  const { workspace, template: id } = await params;
  const ctx = await enterWorkspacePage(workspace);
  const [template, revisions] = await orNotFound(
    Promise.all([viewTemplate(ctx, id), listRevisions(ctx, id)]),
  );
  const home = `/w/${ctx.workspace.slug}`;
  const here = `${home}/templates/${template.id}`;
  const canPost = permits(ctx.role, 'revision.post');
  return (
    <WorkspaceFrame
      ctx={ctx}
      page="templates"
      crumbs={[{ label: 'Templates', href: home }, { label: template.title }]}
    >
      <RefreshOnLive events={['template.changed', 'revision.changed']} />
      <h1 className="sr-only">
        {template.number} {template.title}
      </h1>
      <TitleBlock
        fields={[
          { label: 'Number', value: template.number, style: 'large' },
          { label: 'Title', value: template.title, style: 'large', grow: 3 },
          { label: 'Client', value: ctx.workspace.name },
          {
            label: 'Due',
            value: template.dueOn ? <DueDay on={template.dueOn} standing={template.standing} /> : 'no date',
          },
          {
            label: 'State',
            value: (
              <span className="flex flex-wrap items-center gap-x-3">
                <span className="inline-flex items-center gap-1.5">
                  {template.standingLetter ? (
                    <span className="font-mono">{template.standingLetter}</span>
                  ) : null}
                  <StandingWord standing={template.standing} />
                </span>
                {template.ahead ? <RevisionAhead here={here} ahead={template.ahead} /> : null}
              </span>
            ),
          },
        ]}
      />
      <div className="mt-4 flex flex-wrap gap-2.5">
        {canPost ? (
          <ButtonLink href={`${here}/post`} variant="primary">
            {template.latestLetter ? 'Work on the next revision' : 'Post the first revision'}
          </ButtonLink>
        ) : null}
        {permits(ctx.role, 'template.change') ? (
          <ChangeTemplate
            path={`/api/v1/workspaces/${ctx.workspace.slug}/templates/${template.id}`}
            title={template.title}
            dueOn={template.dueOn}
            version={template.version}
          />
        ) : null}
      </div>
      <section className="mt-8" aria-labelledby="revisions">
        <SectionHead title="Revisions" id="revisions" count={revisions.length} />
        <div className="mt-3">
          <DataTable
            caption={`Revisions of ${template.number}`}
            columns={columns(here)}
            rows={revisions}
            rowKey={(row) => row.id}
            empty={
              <EmptyState title="Nothing is posted yet" level={3}>
                {canPost
                  ? 'Post the mesh and its recipe as revision A; the check run starts by itself.'
                  : 'You will get a mail as soon as revision A can be looked at.'}
              </EmptyState>
            }
          />
        </div>
      </section>
    </WorkspaceFrame>
  );
}

function columns(here: string): Column<RevisionSummary>[] {
  return [
    {
      key: 'letter',
      label: 'Revision',
      isHead: true,
      cell: (row) => (
        <NextLink
          href={`${here}/${row.letter}`}
          className="font-semibold text-ink underline-offset-2 hover:underline"
        >
          Revision {row.letter}
        </NextLink>
      ),
    },
    {
      key: 'state',
      label: 'State',
      className: 'max-w-xs',
      cell: (row) => (
        <>
          <StandingWord standing={row.state} />
          {row.stateReason ? <span className="block text-sm text-slate">{row.stateReason}</span> : null}
        </>
      ),
    },
    { key: 'check', label: 'Check', cell: (row) => <VerdictWord verdict={row.verdict} /> },
    { key: 'author', label: 'Posted by', cell: (row) => row.authorName },
    { key: 'posted', label: 'Posted', cell: (row) => <Time at={row.postedAt} show="both" /> },
    {
      key: 'note',
      label: 'What to look at',
      className: 'max-w-md',
      cell: (row) => row.note || <span className="text-slate">–</span>,
    },
  ];
}
