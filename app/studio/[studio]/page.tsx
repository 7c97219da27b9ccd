import type { Metadata } from 'next';
import NextLink from 'next/link';
import { DataTable, type Column } from '@/app/_components/data-table';
import { EmptyState } from '@/app/_components/empty-state';
import { PageHeader } from '@/app/_components/page-header';
import { Time } from '@/app/_components/time';
import { enterStudioPage } from '@/app/_frames/enter-page';
import { StudioFrame } from '@/app/_frames/studio-frame';
import { listWorkspaces } from '@/lib/workspaces/list-workspaces';
import type { WorkspaceView } from '@/lib/workspaces/schemas';
import { OpenWorkspace } from './_components/open-workspace';

type Props = { params: Promise<{ studio: string }> };

export const metadata: Metadata = { title: 'Workspaces' };

/** A studio's workspaces, one for each client organisation. */
export default async function StudioPage({ params }: Props) {
  const ctx = await enterStudioPage((await params).studio);
  const { workspaces } = await listWorkspaces(ctx);
  const isLead = ctx.role === 'lead';
  return (
    <StudioFrame ctx={ctx} page="workspaces">
      <PageHeader
        title="Workspaces"
        kicker={ctx.studio.name}
        lead="One for each client organisation. The studio sees them all; a client sees its own and learns of no other."
        actions={isLead ? <OpenWorkspace studio={ctx.studio.slug} /> : null}
      />
      <DataTable
        caption={`Workspaces of ${ctx.studio.name}`}
        columns={columns}
        rows={workspaces}
        rowKey={(row) => row.id}
        empty={
          <EmptyState title="No workspaces yet">
            {isLead
              ? 'Open the first one for a client, invite an approver of theirs, then post a template.'
              : `A lead of ${ctx.studio.name} opens a workspace for each client.`}
          </EmptyState>
        }
      />
    </StudioFrame>
  );
}

const figure = (value: number) => <span className="font-mono tabular-nums">{value}</span>;

const columns: Column<WorkspaceView>[] = [
  {
    key: 'name',
    label: 'Client',
    isHead: true,
    cell: (row) => (
      <NextLink href={`/w/${row.slug}`} className="font-semibold text-ink underline-offset-2 hover:underline">
        {row.name}
      </NextLink>
    ),
  },
  { key: 'code', label: 'Code', cell: (row) => <span className="font-mono">{row.code}</span> },
  { key: 'templates', label: 'Templates', align: 'end', cell: (row) => figure(row.templates) },
  { key: 'clients', label: 'Client people', align: 'end', cell: (row) => figure(row.clients) },
  { key: 'pending', label: 'Invited', align: 'end', cell: (row) => figure(row.pendingInvitations) },
  { key: 'opened', label: 'Opened', cell: (row) => <Time at={row.openedAt} show="day" /> },
];
