import type { Metadata } from 'next';
import { PageHeader } from '@/app/_components/page-header';
import { Time } from '@/app/_components/time';
import { enterWorkspacePage, orNotFound } from '@/app/_frames/enter-page';
import { WorkspaceFrame } from '@/app/_frames/workspace-frame';
import { readGatePlan } from '@/lib/workspaces/read-gate-plan';
import type { GateRuleView } from '@/lib/workspaces/gate-plan-schemas';
import { whenPasses, whoSigns } from '@/lib/workspaces/gate-words';

type Props = { params: Promise<{ workspace: string }> };

export const metadata: Metadata = { title: 'Gate plan' };

/** The ordered gates that a revision passes before it is locked. */
export default async function GatePlanPage({ params }: Props) {
  const ctx = await enterWorkspacePage((await params).workspace);
  const plan = await orNotFound(readGatePlan(ctx));
  return (
    <WorkspaceFrame ctx={ctx} page="gate-plan">
      <PageHeader
        title="Gate plan"
        kicker={`${ctx.workspace.name} · version ${plan.number}`}
        lead="The gates open in this order. The last signature locks the revision: from then on nothing that was agreed changes."
      />
      <ol className="border border-ink bg-sheet">
        {plan.gates.map((gate, index) => (
          <li
            key={gate.key}
            className="grid gap-x-6 gap-y-1 border-b border-rule px-4 py-4 last:border-b-0 sm:grid-cols-[3rem_12rem_1fr]"
          >
            <span aria-hidden className="font-mono text-lg text-slate">
              {index + 1}
            </span>
            <h2 className="text-lg font-semibold">{gate.name}</h2>
            <div>
              <p>{sentence(gate)}</p>
              <p className="mt-1 text-sm text-slate">
                {gate.kind === 'people' ? <>Signed with the words: “{gate.meaning}”</> : gate.meaning}
              </p>
            </div>
          </li>
        ))}
      </ol>
      <p className="mt-3 text-sm text-slate">
        Made <Time at={plan.madeAt} show="day" />. A revision keeps the version of the plan that it was posted
        under.
      </p>
    </WorkspaceFrame>
  );
}

function sentence(gate: GateRuleView): string {
  if (gate.kind === 'automatic') return whenPasses(gate);
  return gate.fourEyes ? `${sentence(gate)} Never the author of the revision.` : whoSigns(gate);
}
