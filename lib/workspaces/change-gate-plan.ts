import { uuidv7 } from 'uuidv7';
import { withTenant } from '@/db/tenant';
import { appendEntry } from '@/lib/audit/append-entry';
import { sameJson } from '@/lib/audit/same-json';
import { requirePermission, type WorkspaceContext } from '@/lib/auth/context';
import { invalid, notFound } from '@/lib/errors/app-error';
import { refuseStale } from '@/lib/http/if-match';
import { parseInput } from '@/lib/http/read-input';
import { queueLive } from '@/lib/jobs/queue-live';
import { peopleProblems, type PlanProblem } from './check-gate-plan';
import { ChangeGatePlanInput, type GatePlanView } from './gate-plan-schemas';
import { fullRule, ruleView, rulesOf } from './gate-rules';
import { planChanges } from './gate-words';
import { listMembers } from './people-data';
import { countInvited, findLatestGatePlan, insertGatePlan, lockWorkspace } from './workspaces-data';

const pointerOf = ({ at, field }: PlanProblem) => (at === null ? '/gates' : `/gates/${at}/${field}`);

/**
 * A lead makes the next version of the gate plan from the version that they saw. Revisions posted from now on get it;
 * those in review keep theirs. Saving again what stands already changes nothing, so a second click does no harm.
 */
export async function changeGatePlan(
  ctx: WorkspaceContext,
  number: number,
  input: unknown,
): Promise<GatePlanView> {
  requirePermission(ctx, 'gate.plan');
  const wanted = parseInput(ChangeGatePlanInput, input);
  const workspaceId = ctx.workspace.id;
  return withTenant(ctx, async (tx) => {
    await lockWorkspace(tx, workspaceId);
    const before = await findLatestGatePlan(tx, workspaceId);
    if (!before) throw notFound('gate plan');
    const people = await listMembers(tx, workspaceId);
    const names = new Map(people.map(({ id, name }) => [id, name]));
    const gates = rulesOf(wanted.gates);
    const old = before.gates.map(fullRule);
    // RFC 9110 §13.1.1: a change that has been made already may be answered as done, whatever the version named.
    if (sameJson(old, gates)) {
      return {
        number: before.number,
        madeAt: before.createdAt.toISOString(),
        madeBy: names.get(before.createdBy ?? '') ?? null,
        gates: old.map((rule) => ruleView(rule, names)),
      };
    }
    refuseStale(before.number, number);
    const problems = peopleProblems(wanted, people, await countInvited(tx, workspaceId));
    if (problems.length)
      throw invalid(
        problems.length === 1
          ? problems[0].detail
          : `This plan cannot stand yet, for ${problems.length} reasons. ${problems[0].detail}`,
        problems.map((problem) => ({ pointer: pointerOf(problem), detail: problem.detail })),
      );
    const made = await insertGatePlan(tx, {
      id: uuidv7(),
      workspaceId,
      number: before.number + 1,
      gates,
      createdBy: ctx.person.id,
    });
    const view = gates.map((rule) => ruleView(rule, names));
    await appendEntry(tx, ctx, {
      action: 'gate-plan.changed',
      subjectKind: 'gate-plan',
      subjectId: made.id,
      detail: {
        number: made.number,
        before: { number: before.number, gates: old },
        after: { number: made.number, gates },
        people: Object.fromEntries(view.flatMap((gate) => gate.people.map(({ id, name }) => [id, name]))),
        endsWithoutClient: wanted.endsWithoutClient,
        changes: planChanges(
          old.map((rule) => ruleView(rule, names)),
          view,
        ),
      },
    });
    await queueLive(tx, ctx, {
      name: 'gate-plan.changed',
      data: { id: workspaceId, version: made.number },
    });
    return {
      number: made.number,
      madeAt: made.createdAt.toISOString(),
      madeBy: ctx.person.name,
      gates: view,
    };
  });
}
