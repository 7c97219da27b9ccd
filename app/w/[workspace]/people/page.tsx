import type { Metadata } from 'next';
import { EmptyState } from '@/app/_components/empty-state';
import { Link } from '@/app/_components/link';
import { RefreshOnLive } from '@/app/_components/live/refresh-on-live';
import { PageHeader } from '@/app/_components/page-header';
import { InvitePerson } from '@/app/_components/people/invite-person';
import { OpenInvitations, PeopleTable } from '@/app/_components/people/people-table';
import { SectionHead } from '@/app/_components/section-head';
import { enterWorkspacePage } from '@/app/_frames/enter-page';
import { WorkspaceFrame } from '@/app/_frames/workspace-frame';
import { listPeople } from '@/lib/workspaces/list-people';
import { clientRoles, isStudioRole } from '@/lib/workspaces/role-names';

type Props = { params: Promise<{ workspace: string }> };

export const metadata: Metadata = { title: 'People' };

/** Who belongs to the workspace: the client's people, and the studio's staff who work for them. */
export default async function WorkspacePeoplePage({ params }: Props) {
  const ctx = await enterWorkspacePage((await params).workspace);
  const { people, invitations, mayInvite } = await listPeople(ctx);
  const apiPath = `/api/v1/workspaces/${ctx.workspace.slug}`;
  const clients = people.filter((person) => person.side === 'client');
  const staff = people.filter((person) => person.side === 'studio');
  const invite = mayInvite ? (
    <InvitePerson
      apiPath={`${apiPath}/invitations`}
      side="client"
      roles={clientRoles}
      place={ctx.workspace.name}
    />
  ) : null;
  return (
    <WorkspaceFrame ctx={ctx} page="people">
      <RefreshOnLive events={['people.changed']} />
      <PageHeader
        title="People"
        kicker={ctx.workspace.name}
        lead="Everybody here sees the templates of this workspace and nothing of any other client."
        actions={invite}
      />
      <section aria-labelledby="client-people">
        <SectionHead id="client-people" title={ctx.workspace.name} count={clients.length} />
        {clients.length ? (
          <PeopleTable
            caption={`People of ${ctx.workspace.name}`}
            people={clients}
            readerId={ctx.person.id}
            actions={{ apiPath, roles: clientRoles, place: ctx.workspace.name, mayChange: mayInvite }}
          />
        ) : (
          <EmptyState level={3} title="Nobody of the client is here yet">
            {mayInvite
              ? 'Invite at least one approver: without one the client gate cannot be signed.'
              : `A lead of ${ctx.studio.name} invites the client’s people.`}
          </EmptyState>
        )}
      </section>
      <OpenInvitations invitations={invitations} apiPath={apiPath} />
      <section aria-labelledby="studio-people" className="mt-8">
        <SectionHead id="studio-people" title={ctx.studio.name} count={staff.length} />
        <PeopleTable caption={`People of ${ctx.studio.name}`} people={staff} readerId={ctx.person.id} />
        {isStudioRole(ctx.role) ? (
          <p className="mt-2 text-sm text-slate">
            Staff join and leave at the studio, for all of its workspaces at once:{' '}
            <Link href={`/studio/${ctx.studio.slug}/people`}>people of {ctx.studio.name}</Link>.
          </p>
        ) : null}
      </section>
    </WorkspaceFrame>
  );
}
