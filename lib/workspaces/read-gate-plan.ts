import { withTenant } from '@/db/tenant';
import { requirePermission, type WorkspaceContext } from '@/lib/auth/context';
import { notFound } from '@/lib/errors/app-error';
import type { GatePlanView } from './schemas';
import { findLatestGatePlan } from './workspaces-data';

/** The gate plan that the next posted revision gets. Revisions in review keep the version they started with. */
export async function readGatePlan(ctx: WorkspaceContext): Promise<GatePlanView> {
  requirePermission(ctx, 'workspace.read');
  const plan = await withTenant(ctx, (tx) => findLatestGatePlan(tx, ctx.workspace.id));
  if (!plan) throw notFound('gate plan');
  return {
    number: plan.number,
    madeAt: plan.createdAt.toISOString(),
    gates: plan.gates as GatePlanView['gates'],
  };
}
