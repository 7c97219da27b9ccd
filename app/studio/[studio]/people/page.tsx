import type { Metadata } from 'next';
import { PageHeader } from '@/app/_components/page-header';
import { InvitePerson } from '@/app/_components/people/invite-person';
import { OpenInvitations, PeopleTable } from '@/app/_components/people/people-table';
import { enterStudioPage } from '@/app/_frames/enter-page';
import { StudioFrame } from '@/app/_frames/studio-frame';
import { listStaff } from '@/lib/studio/list-staff';
import { studioRoles } from '@/lib/workspaces/role-names';

type Props = { params: Promise<{ studio: string }> };

export const metadata: Metadata = { title: 'People' };

/** Who works at the studio. */
export default async function StudioPeoplePage({ params }: Props) {
  const ctx = await enterStudioPage((await params).studio);
  const { people, invitations, mayInvite } = await listStaff(ctx);
  const apiPath = `/api/v1/studios/${ctx.studio.slug}`;
  return (
    <StudioFrame ctx={ctx} page="people">
      <PageHeader
        title="People"
        kicker={ctx.studio.name}
        lead="Staff work in every workspace of the studio, in the same role. Clients are invited in their own workspace."
        actions={
          mayInvite ? (
            <InvitePerson
              apiPath={`${apiPath}/invitations`}
              side="studio"
              roles={studioRoles}
              place={ctx.studio.name}
            />
          ) : null
        }
      />
      <PeopleTable
        caption={`People of ${ctx.studio.name}`}
        people={people}
        readerId={ctx.person.id}
        actions={{ apiPath, roles: studioRoles, place: ctx.studio.name, mayChange: mayInvite }}
      />
      <OpenInvitations invitations={invitations} apiPath={apiPath} />
    </StudioFrame>
  );
}
