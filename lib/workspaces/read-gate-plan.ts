import { withTenant } from '@/db/tenant';
import { requirePermission, type WorkspaceContext } from '@/lib/auth/context';
import { notFound } from '@/lib/errors/app-error';
import type { GatePlanView } from './gate-plan-schemas';
import { ruleView } from './gate-rules';
import { planChanges } from './gate-words';
import { listMembers } from './people-data';
import { listGatePlans } from './workspaces-data';

export type GatePlanVersion = GatePlanView & {
  /** Against the version before; empty for the first. */
  changes: string[];
};

const versionsShown = 50;

/**
 * The gate plan that the next posted revision gets, then the versions before it, newest first. Revisions in review keep
 * the version they started with.
 */
export async function readGatePlans(
  ctx: WorkspaceContext,
  limit = versionsShown,
): Promise<GatePlanVersion[]> {
  requirePermission(ctx, 'workspace.read');
  const { rows, people } = await withTenant(ctx, async (tx) => ({
    // One more than is shown: the last one is told by what it changed.
    rows: await listGatePlans(tx, ctx.workspace.id, limit + 1),
    people: await listMembers(tx, ctx.workspace.id),
  }));
  if (!rows.length) throw notFound('gate plan');
  const names = new Map(people.map(({ id, name }) => [id, name]));
  const views = rows.map(({ plan, madeBy }) => ({
    number: plan.number,
    madeAt: plan.createdAt.toISOString(),
    madeBy,
    gates: plan.gates.map((rule) => ruleView(rule, names)),
  }));
  return views.slice(0, limit).map((view, index) => {
    const before = views[index + 1];
    return { ...view, changes: before ? planChanges(before.gates, view.gates) : [] };
  });
}

export async function readGatePlan(ctx: WorkspaceContext): Promise<GatePlanView> {
  const [{ changes: _changes, ...plan }] = await readGatePlans(ctx, 1);
  return plan;
}
