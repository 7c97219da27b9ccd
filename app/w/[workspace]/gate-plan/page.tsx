import type { Metadata } from 'next';
import { RefreshOnLive } from '@/app/_components/live/refresh-on-live';
import { PageHeader } from '@/app/_components/page-header';
import { enterWorkspacePage, orNotFound } from '@/app/_frames/enter-page';
import { WorkspaceFrame } from '@/app/_frames/workspace-frame';
import { listStandIns } from '@/lib/review/list-stand-ins';
import { listPeople } from '@/lib/workspaces/list-people';
import { readGatePlans } from '@/lib/workspaces/read-gate-plan';
import { permits } from '@/lib/workspaces/roles';
import { ChangePlan } from './_components/change-plan';
import { PlanHistory } from './_components/plan-history';
import { PlanList } from './_components/plan-list';
import { StandIns } from './_components/stand-ins';
import { WrittenTime } from './_components/written-time';

type Props = { params: Promise<{ workspace: string }> };

export const metadata: Metadata = { title: 'Gate plan' };

/** The ordered gates that a revision passes before it is locked; a lead changes them here. */
export default async function GatePlanPage({ params }: Props) {
  const ctx = await enterWorkspacePage((await params).workspace);
  const versions = await orNotFound(readGatePlans(ctx));
  const { changes: _changes, ...plan } = versions[0];
  const { people, invitations } = await listPeople(ctx);
  const away = await listStandIns(ctx);
  const apiPath = `/api/v1/workspaces/${ctx.workspace.slug}`;
  const waiting = invitations.filter(({ state }) => state === 'pending');
  const list = (
    <>
      <PlanList gates={plan.gates} />
      <p className="mt-3 text-sm text-slate">
        Made <WrittenTime at={plan.madeAt} show="day" zone={ctx.workspace.timeZone} />. A revision keeps the
        version of the plan that it was posted under.
      </p>
    </>
  );
  return (
    <WorkspaceFrame ctx={ctx} page="gate-plan">
      <RefreshOnLive events={['gate-plan.changed', 'people.changed']} />
      <PageHeader
        title="Gate plan"
        kicker={`${ctx.workspace.name} · version ${plan.number}`}
        lead="The gates open in this order. The last signature locks the revision: from then on nothing that was agreed changes."
      />
      {permits(ctx.role, 'gate.plan') ? (
        <ChangePlan
          apiPath={apiPath}
          plan={plan}
          people={people.map(({ id, name, role }) => ({ id, name, role }))}
          invited={{
            approver: waiting.filter(({ role }) => role === 'approver').length,
            reviewer: waiting.filter(({ role }) => role === 'reviewer').length,
          }}
        >
          {list}
        </ChangePlan>
      ) : (
        list
      )}
      <StandIns
        {...away}
        apiPath={apiPath}
        naming={
          permits(ctx.role, 'gate.sign')
            ? {
                role: ctx.role,
                choices: people
                  .filter(({ id, role }) => role === ctx.role && id !== ctx.person.id)
                  .map(({ id, name }) => ({ id, name })),
              }
            : null
        }
      />
      <PlanHistory versions={versions} zone={ctx.workspace.timeZone} />
    </WorkspaceFrame>
  );
}
